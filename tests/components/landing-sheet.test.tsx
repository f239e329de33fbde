import { render, screen } from '@testing-library/react'
import { beforeAll, expect, test } from 'vitest'
import { LandingSheet } from '@/components/landing/landing-sheet'
import { samplePicture } from '@/components/landing/sample-picture'
import type { LandingPicture } from '@/lib/figures/landing-picture'

let picture: LandingPicture

beforeAll(async () => {
  picture = await samplePicture()
}, 60_000)

test('the findings stand in the figure as text, the drawings are kept from screen readers', () => {
  render(<LandingSheet picture={picture} />)
  const figure = screen.getByRole('figure')
  for (const finding of Object.values(picture.findings)) expect(figure.textContent).toContain(finding)
  for (const drawing of figure.querySelectorAll('svg')) expect(drawing.getAttribute('aria-hidden')).toBe('true')
})

test('without a worm there is no dial, and nothing speaks of turns', () => {
  const { container } = render(
    <LandingSheet picture={{ ...picture, dial: null, findings: { ...picture.findings, dial: '' } }} />,
  )
  expect(container.querySelectorAll('circle[stroke-dasharray]')).toHaveLength(0)
  expect(container.textContent).not.toContain('Every turn laid over')
})

test('every colour is a token of the theme', () => {
  const { container } = render(<LandingSheet picture={picture} />)
  for (const element of container.querySelectorAll('svg *')) {
    for (const paint of ['fill', 'stroke']) {
      expect([null, 'none', 'stroke'].includes(element.getAttribute(paint))).toBe(true)
    }
    expect(element.getAttribute('style')).toBeNull()
  }
})

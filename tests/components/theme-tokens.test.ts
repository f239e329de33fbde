import { readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'

const css = readFileSync(new URL('../../app/globals.css', import.meta.url), 'utf8')

/** The colours that the first rule with this selector sets. */
function tokens(selector: string): Map<string, string> {
  const start = css.indexOf(selector)
  expect(start, selector).toBeGreaterThanOrEqual(0)
  const body = css.slice(css.indexOf('{', start), css.indexOf('}', start))
  return new Map([...body.matchAll(/--([a-z-]+): (#[0-9a-f]{6});/g)].map(([, name, colour]) => [name, colour]))
}

const day = tokens("html[data-theme='day']")
const dusk = tokens("html[data-theme='dusk']")
const night = tokens("html[data-theme='night']")

const channels = (colour: string) => [1, 3, 5].map((at) => parseInt(colour.slice(at, at + 2), 16))

/** Relative luminance and contrast ratio: WCAG 2.2, definitions of "relative luminance" and "contrast ratio". */
function luminance(colour: string): number {
  const [r, g, b] = channels(colour).map((value) => {
    const share = value / 255
    return share <= 0.04045 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4
  })
  return 0.2126 * r + 0.7152 * g + 0.0722 * b
}

function contrast(a: string, b: string): number {
  const [light, dark] = [luminance(a), luminance(b)].sort((x, y) => y - x)
  return (light + 0.05) / (dark + 0.05)
}

test('contrast: black on white is 21 (WCAG 2.2)', () => {
  expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 10)
})

test('the three themes name the same colours', () => {
  expect([...dusk.keys()]).toEqual([...day.keys()])
  expect([...night.keys()]).toEqual([...day.keys()])
  expect(day.size).toBe(13)
})

test('without a choice a dark system gets Dusk itself', () => {
  expect(tokens('html:not([data-theme])')).toEqual(dusk)
})

test('Night has no green and no blue', () => {
  for (const [name, colour] of night) expect([name, ...channels(colour).slice(1)]).toEqual([name, 0, 0])
})

describe.each([
  ['Day', day],
  ['Dusk', dusk],
])('%s meets AA', (_, theme) => {
  const colour = (name: string) => theme.get(name) ?? ''
  const pairs = ['ink', 'soft', 'brass', 'verdigris', 'oxide', 'plum'].flatMap((text) =>
    ['sheet', 'card'].map((ground) => [text, ground]),
  )
  test.each([
    ...pairs,
    ['ink', 'faint'],
    ['soft', 'faint'],
    ['on-fill', 'brass-fill'],
    ['sheet', 'ink'],
    ['sheet', 'soft'],
  ])('text in %s on %s', (text, ground) => expect(contrast(colour(text), colour(ground))).toBeGreaterThanOrEqual(4.5))
  // WCAG 2.2, 1.4.11: the border that shows where a field is.
  test('the border of a field on a card', () => {
    expect(contrast(colour('steel'), colour('card'))).toBeGreaterThanOrEqual(3)
  })
})

test('outside the tokens the stylesheet has no colour of its own', () => {
  const rules = css.slice(css.indexOf('@layer base'))
  expect(rules).not.toMatch(/#[0-9a-f]{3,8}\b|rgba?\(|hsla?\(|oklch\(|color-mix\(/i)
})

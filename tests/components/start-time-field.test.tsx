import { cleanup, render, screen, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { useState } from 'react'
import { afterEach, expect, test } from 'vitest'
import { StartTimeField } from '@/components/runs/start-time-field'
import { DisplayProvider } from '@/lib/client/display'
import { DEFAULT_PREFERENCES } from '@/lib/schemas/preferences'

afterEach(cleanup)

function Harness({ initial }: { initial: string | null }) {
  const [iso, setIso] = useState(initial)
  return (
    <DisplayProvider preferences={{ ...DEFAULT_PREFERENCES, timeZone: 'Europe/Berlin' }}>
      <StartTimeField value={iso} onValue={setIso} />
      <output>{iso ?? 'not known'}</output>
    </DisplayProvider>
  )
}

const field = () => screen.getByLabelText<HTMLInputElement>('Recording began, Berlin time')

const value = () => screen.getByRole('status').textContent

async function type(text: string) {
  await userEvent.clear(field())
  await userEvent.type(field(), text)
}

test('is typed in the person’s zone, which is named, and kept in UTC', async () => {
  render(<Harness initial="2026-11-14T20:40:00.000Z" />)
  expect(field().value).toBe('2026-11-14 21:40')
  await type('2026-07-01 22:15:30')
  expect(value()).toBe('2026-07-01T20:15:30.000Z')
  expect(field().value).toBe('2026-07-01 22:15:30')
  expect(field().validity.valid).toBe(true)
  await userEvent.clear(field())
  expect(value()).toBe('not known')
  expect(field().validity.valid).toBe(true)
})

test('a time that came twice wants to know which, and either can be had', async () => {
  render(<Harness initial={null} />)
  await type('2026-10-25 02:30')
  expect(value()).toBe('not known')
  expect(field().validity.valid).toBe(false)
  expect(screen.getByRole('alert').textContent).toContain('came twice')
  const which = within(screen.getByRole('radiogroup', { name: 'Which of the two' }))
  await userEvent.click(which.getByRole('radio', { name: 'the second, CET' }))
  expect(value()).toBe('2026-10-25T01:30:00.000Z')
  await userEvent.click(which.getByRole('radio', { name: 'the first, CEST' }))
  expect(value()).toBe('2026-10-25T00:30:00.000Z')
  expect(field().value).toBe('2026-10-25 02:30')
  expect(field().validity.valid).toBe(true)
  expect(screen.queryByRole('alert')).toBeNull()
})

test('a time that never came is refused with the times on either side', async () => {
  render(<Harness initial={null} />)
  await type('2026-03-29 02:30')
  expect(value()).toBe('not known')
  expect(field().validity.valid).toBe(false)
  expect(screen.getByRole('alert').textContent).toContain('It was 2026-03-29 03:30 CEST or 2026-03-29 01:30 CET.')
})

test('what is no time keeps what was typed and says how to write it', async () => {
  render(<Harness initial={null} />)
  await type('last night')
  expect(field().value).toBe('last night')
  expect(field().validity.valid).toBe(false)
  expect(screen.getByRole('alert').textContent).toContain('Write it as 2026-11-14 21:40')
})

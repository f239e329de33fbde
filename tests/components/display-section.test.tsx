import { cleanup, render, screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { afterEach, beforeEach, expect, test, vi } from 'vitest'
import { DisplaySection } from '@/components/account/display-section'
import { DisplayProvider } from '@/lib/client/display'
import { DEFAULT_PREFERENCES, type Preferences, type PreferencesChange } from '@/lib/schemas/preferences'

const refresh = vi.fn()
vi.mock('next/navigation', () => ({ useRouter: () => ({ refresh }) }))

let sent: PreferencesChange[] = []
let answer: (change: PreferencesChange) => Response

beforeEach(() => {
  sent = []
  answer = (change) => Response.json({ ...DEFAULT_PREFERENCES, ...change })
  vi.stubGlobal('fetch', async (url: string, init: RequestInit) => {
    expect([init.method, url]).toEqual(['PATCH', '/api/account/preferences'])
    const change: PreferencesChange = JSON.parse(String(init.body))
    sent.push(change)
    return answer(change)
  })
})

afterEach(() => {
  cleanup()
  refresh.mockReset()
  vi.unstubAllGlobals()
  delete document.documentElement.dataset.theme
  document.cookie = 'theme=; path=/; max-age=0'
})

function open(preferences: Partial<Preferences> = {}) {
  render(
    <DisplayProvider preferences={{ ...DEFAULT_PREFERENCES, ...preferences }}>
      <DisplaySection />
    </DisplayProvider>,
  )
}

const chosen = (group: string) =>
  within(screen.getByRole('radiogroup', { name: group }))
    .getAllByRole<HTMLInputElement>('radio')
    .filter(({ checked }) => checked)
    .map(({ value }) => value)

const choose = (group: string, name: string) =>
  userEvent.click(within(screen.getByRole('radiogroup', { name: group })).getByRole('radio', { name }))

test('shows what is kept, and says what each choice means', () => {
  open({ swingMeasure: 'peak-to-peak', displacementUnit: 'px', timeZone: 'Europe/Berlin' })
  expect(chosen('Size of a swing')).toEqual(['peak-to-peak'])
  expect(chosen('Displacement')).toEqual(['px'])
  expect(screen.getByText(/A swing of amplitude 4″ is 8″ from end to end/)).toBeTruthy()
  expect(screen.getByText(/only where a run was recorded in pixels of a known scale/)).toBeTruthy()
  expect(screen.getByText(/^Berlin time/).textContent).toMatch(/^Berlin time: it is \d\d:\d\d CES?T there$/)
})

test('each choice is sent alone, shown at once, and the page is drawn anew', async () => {
  open()
  await choose('Size of a swing', 'Peak-to-peak')
  expect(chosen('Size of a swing')).toEqual(['peak-to-peak'])
  await choose('Displacement', 'Pixels, px')
  await screen.findByText('Saved.')
  expect(sent).toEqual([{ swingMeasure: 'peak-to-peak' }, { displacementUnit: 'px' }])
  expect(refresh).toHaveBeenCalledTimes(2)
})

test('a theme is on the page and in the cookie before the account has it; “as the system” takes both away', async () => {
  open()
  expect(chosen('Theme of this account')).toEqual(['system'])
  await choose('Theme of this account', 'Night')
  expect(document.documentElement.dataset.theme).toBe('night')
  expect(document.cookie).toContain('theme=night')
  await choose('Theme of this account', 'As the system')
  expect(document.documentElement.dataset.theme).toBeUndefined()
  expect(document.cookie).not.toContain('theme=')
  await waitFor(() => expect(sent).toEqual([{ theme: 'night' }, { theme: null }]))
})

test('a time zone is found by its country and chosen with the time there beside it', async () => {
  open()
  await userEvent.type(screen.getByLabelText('Find a time zone'), 'new zealand')
  const found = screen.getByRole('list', { name: 'Time zones found' })
  await userEvent.click(within(found).getByRole('button', { name: /^Auckland time \d\d:\d\d GMT\+1[23]$/ }))
  expect(sent).toEqual([{ timeZone: 'Pacific/Auckland' }])
  expect(screen.queryByRole('list', { name: 'Time zones found' })).toBeNull()
  expect(screen.getByText(/^Auckland time/)).toBeTruthy()
  await userEvent.click(screen.getByRole('button', { name: 'Use this browser’s' }))
  expect(sent.at(-1)).toEqual({ timeZone: null })
})

test('a place that no zone is called after leads on', async () => {
  open()
  await userEvent.type(screen.getByLabelText('Find a time zone'), 'atlantis')
  expect(screen.getByText(/Try the nearest large city/)).toBeTruthy()
})

test('what could not be saved goes back to what is kept, with the reason', async () => {
  answer = () => Response.json({ error: { code: 'not-signed-in', message: 'You are not signed in' } }, { status: 401 })
  open()
  await choose('Size of a swing', 'Peak-to-peak')
  expect(await screen.findByText('You are not signed in')).toBeTruthy()
  expect(chosen('Size of a swing')).toEqual(['amplitude'])
  expect(refresh).not.toHaveBeenCalled()
})

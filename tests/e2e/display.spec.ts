import { expect, test, type Browser, type Page } from '@playwright/test'
import { BenchPage, firstNumber } from './support/bench-page'
import { demoAddress, firstEntryAddress } from './support/demo-project'
import { browserOf, demoPerson, signIn } from './support/people'
import { SERVER_ORIGIN } from './support/server'

const DEFAULTS = { theme: null, swingMeasure: 'amplitude', displacementUnit: 'arcsec', timeZone: null }

/** The viewer’s account is shared with other tests, so it is left as it was found. */
test.afterEach(async ({ browser }) => {
  const page = await browserOf(browser, 'viewer')
  const options = { data: DEFAULTS, headers: { origin: SERVER_ORIGIN } }
  const answer = await page.request.patch('/api/account/preferences', options)
  expect(answer.status()).toBe(200)
  await page.context().close()
})

/** Signs in by the form, which is when a browser learns the theme of an account. */
async function signedInPage(browser: Browser): Promise<Page> {
  const page = await (await browser.newContext()).newPage()
  await signIn(page, demoPerson('viewer'))
  return page
}

/** The choices look like buttons; the radio lies over its words. */
async function choose(page: Page, group: string, name: string): Promise<void> {
  await saving(page, () =>
    page.getByRole('radiogroup', { name: group }).getByRole('radio', { name, exact: true }).check(),
  )
}

async function chooseZone(page: Page, typed: string, name: RegExp): Promise<void> {
  await page.getByLabel('Find a time zone').fill(typed)
  await saving(page, () => page.getByRole('button', { name }).click())
}

async function saving(page: Page, act: () => Promise<void>): Promise<void> {
  const saved = page.waitForResponse((response) => response.url().endsWith('/api/account/preferences'))
  await act()
  expect((await saved).status()).toBe(200)
}

interface Seen {
  whole: number
  fundamental: number
  fundamentalError: number
  title: string
}

/** Peak-to-peak of the whole worm and the fundamental with its error, as the bench shows them. */
async function seenOnBench(page: Page, head: string): Promise<Seen> {
  const bench = new BenchPage(page)
  const whole = firstNumber(await bench.figure(/^Worm, peak to peak/))
  const table = page.getByRole('region', { name: 'Harmonics' }).getByRole('table', { name: 'Worm harmonics' })
  await expect(table.getByRole('columnheader', { name: head, exact: true })).toBeVisible()
  const [value, error] = (await table.getByRole('row').nth(1).getByRole('cell').nth(1).innerText()).split(' ± ')
  return { whole, fundamental: Number(value), fundamentalError: Number(error), title: await bench.title.innerText() }
}

test('peak-to-peak, pixels and New Zealand time are seen on bench and overview', async ({ browser }) => {
  const page = await browserOf(browser, 'viewer')
  const address = await demoAddress(page)
  const analysis = await firstEntryAddress(page, address, 'analyses')
  await page.goto(analysis)
  const before = await seenOnBench(page, 'ampl. ″')

  await page.goto('/account')
  await choose(page, 'Size of a swing', 'Peak-to-peak')
  await choose(page, 'Displacement', 'Pixels, px')
  await chooseZone(page, 'New Zealand', /^Auckland time/)
  await expect(page.getByText('Saved.')).toBeVisible()
  await expect(page.getByText(/^Auckland time: it is \d\d:\d\d GMT\+1[23] there$/)).toBeVisible()

  await page.goto(analysis)
  const after = await seenOnBench(page, 'peak-to-peak px')
  await expect(page.getByText(/Displacements are shown in pixels of this run/)).toBeVisible()
  expect(after.title).toMatch(/\dpx|\d\spx/)
  const arcsecPerPx = before.whole / after.whole
  expect(arcsecPerPx).toBeGreaterThan(1.01)
  // Figures are shown with four digits or so.
  expect((after.fundamental * arcsecPerPx) / before.fundamental).toBeCloseTo(2, 1)
  expect((after.fundamentalError * arcsecPerPx) / before.fundamentalError).toBeCloseTo(2, 0)
  expect(new URL(page.url()).search).toBe('')

  await page.goto(address)
  await expect(page.getByRole('heading', { level: 1 })).toContainText(/±\s[\d.]+\spx peak to peak/)
  await expect(page.getByText('Its fundamental, peak to peak')).toBeVisible()
  await expect(page.getByText('The history stays in arc seconds')).toBeVisible()

  await page.context().close()
})

test('the start of a run is shown in the zone of the person, named', async ({ browser }) => {
  const page = await browserOf(browser, 'viewer')
  const run = await firstEntryAddress(page, await demoAddress(page), 'runs')
  await page.goto(run)
  const recorded = page.getByText('Recorded', { exact: true }).locator('xpath=following-sibling::dd')
  await expect(recorded).toHaveText(/UTC$/)
  await page.goto('/account')
  await chooseZone(page, 'calcutta', /^Kolkata time/)
  await page.goto(run)
  await expect(recorded).toHaveText(/GMT\+5:30$/)
  await page.context().close()
})

test('the theme follows the account into a second browser, and the switch in the head is kept too', async ({
  browser,
}) => {
  const first = await signedInPage(browser)
  const theme = (page: Page) => page.locator('html').getAttribute('data-theme')
  expect(await theme(first)).toBeNull()
  await choose(first, 'Theme', 'Night')
  expect(await theme(first)).toBe('night')
  const second = await signedInPage(browser)
  expect(await theme(second)).toBe('night')
  await second.goto('/account')
  await expect(
    second.getByRole('radiogroup', { name: 'Theme of this account' }).getByRole('radio', { name: 'Night' }),
  ).toBeChecked()
  await choose(second, 'Theme of this account', 'Dusk')
  const third = await signedInPage(browser)
  expect(await theme(third)).toBe('dusk')
  for (const page of [first, second, third]) await page.context().close()
})

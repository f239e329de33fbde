import { execFileSync } from 'node:child_process'
import { writeFileSync } from 'node:fs'
import { expect, test, type Page } from '@playwright/test'
import { expectNoAxeViolations } from './support/axe'
import { openDemoAnalysis } from './support/demo-project'
import { enterAs } from './support/people'
import { reportIsDrawn, SharePanel, strangersPage } from './support/report-page'

/** The editor on the newest saved analysis of the demo. */
async function openAnalysis(page: Page): Promise<void> {
  await enterAs(page.context(), 'editor')
  await openDemoAnalysis(page)
}

/** Pages of a PDF; its objects name each of them once. */
function pageCount(pdf: Buffer): number {
  return pdf.toString('latin1').match(/\/Type\s*\/Page(?![a-zA-Z])/g)?.length ?? 0
}

/** The words of a PDF, where the machine has a tool to read them; undefined where it has none. */
function wordsOf(pdf: Buffer, path: string): string | undefined {
  writeFileSync(path, pdf)
  try {
    return execFileSync('pdftotext', ['-layout', path, '-'], { encoding: 'utf8' })
  } catch (error) {
    if (error instanceof Error && 'code' in error && error.code === 'ENOENT') return undefined
    throw error
  }
}

test('a link made by an editor opens the report without an account, on screen and on paper, until it is revoked', async ({
  page,
  browser,
}, testInfo) => {
  test.setTimeout(180_000)
  await openAnalysis(page)
  const panel = new SharePanel(page)
  await panel.open()
  const address = await panel.make('For the support desk')

  const { page: reader, context } = await strangersPage(browser)
  const faults: string[] = []
  reader.on('console', (message) => {
    if (message.type() === 'error' || message.type() === 'warning') faults.push(message.text())
  })
  reader.on('pageerror', (error) => faults.push(String(error)))
  const first = await reader.goto(address)
  expect(first?.status()).toBe(200)
  expect(first?.headers()).toMatchObject({
    'x-robots-tag': 'noindex, nofollow, noarchive',
    'referrer-policy': 'no-referrer',
  })
  expect(first?.headers()['cache-control']).toContain('no-store')
  expect(await reader.locator('meta[name="robots"]').getAttribute('content')).toContain('noindex')
  await expect(reader.getByText('For the support desk')).toBeVisible()
  await expect(reader.getByRole('table', { name: /^Harmonics of the worm/ })).toBeVisible()
  await expect(reader.getByRole('link', { name: 'Sign in' })).toHaveCount(0)
  await reportIsDrawn(reader)
  await expect(reader.locator('.js-plotly-plot')).toHaveCount(3)
  await expectNoAxeViolations(reader, 'report')

  for (const format of ['A4', 'Letter'] as const) {
    const pdf = await reader.pdf({ format, preferCSSPageSize: true, printBackground: true })
    const count = pageCount(pdf)
    expect(count, `pages on ${format}`).toBeGreaterThanOrEqual(4)
    expect(count, `pages on ${format}`).toBeLessThanOrEqual(7)
    const words = wordsOf(pdf, testInfo.outputPath(`report-${format}.pdf`))
    if (words === undefined) continue
    expect(words).toContain('Periodic error of Hillside club mount')
    for (let number = 1; number <= count; number++) expect(words).toContain(`Page ${number} of ${count}`)
    const sheets = words.split('\f').slice(0, count)
    for (const sheet of sheets) expect(sheet.trim().split('\n').length, 'lines on a page').toBeGreaterThan(5)
  }

  await page.bringToFront()
  await panel.revoke(address)
  const ended = await reader.goto(address)
  expect(ended?.status()).toBe(410)
  await expect(reader.getByRole('heading', { level: 1 })).toHaveText('This link has ended')
  await expect(reader.getByText('Hillside')).toHaveCount(0)
  const unknown = await reader.goto(`${new URL(address).origin}/share/${'A'.repeat(43)}`)
  expect(unknown?.status()).toBe(404)
  await expect(reader.getByRole('heading', { level: 1 })).toHaveText('There is no report at this address')
  expect(faults.filter((text) => !/4(04|10)/.test(text))).toEqual([])
  await context.close()
})

test('the button prints once every picture has the width of paper, and the page is then as before', async ({
  page,
  browser,
}) => {
  test.setTimeout(120_000)
  await openAnalysis(page)
  const panel = new SharePanel(page)
  await panel.open()
  const address = await panel.make('To print from a phone')
  const { page: reader, context } = await strangersPage(browser)
  await reader.setViewportSize({ width: 390, height: 844 })
  await reader.addInitScript(() => {
    window.print = () => {
      const widths = [...document.querySelectorAll('.plotly-chart')].map((chart) => [
        chart.clientWidth,
        Number(chart.querySelector('.main-svg')?.getAttribute('width')),
      ])
      Object.assign(window, { printed: { widths, theme: document.documentElement.dataset.theme } })
      window.dispatchEvent(new Event('afterprint'))
    }
  })
  await reader.goto(address)
  await reader.getByRole('button', { name: 'Print or save as PDF' }).click()
  const read = () =>
    reader.evaluate(() => (window as { printed?: { widths: [number, number][]; theme?: string } }).printed)
  await expect.poll(read, { timeout: 60_000 }).toBeDefined()
  const printed = await read()
  expect(printed?.theme).toBe('day')
  expect(printed?.widths).toHaveLength(3)
  for (const [place, drawn] of printed?.widths ?? []) expect(Math.abs(place - drawn)).toBeLessThanOrEqual(1)
  expect(Math.max(...(printed?.widths ?? []).map(([place]) => place))).toBeGreaterThan(600)
  await expect(reader.locator('.report-sheet')).not.toHaveAttribute('data-paper')
  await expect(reader.getByRole('button', { name: 'Print or save as PDF' })).toBeEnabled()
  await context.close()
})

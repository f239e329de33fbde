import { expect, type Browser, type BrowserContext, type Page } from '@playwright/test'

/** The bench's panel where links are made and taken back. */
export class SharePanel {
  constructor(readonly page: Page) {}

  async open(): Promise<void> {
    await this.page.getByRole('button', { name: 'Share', exact: true }).click()
    await expect(this.page.getByRole('dialog', { name: 'Share this analysis' })).toBeVisible()
  }

  /** Makes a link for a week, which shows the one note that holds this text, and answers its address. */
  async make(preface: string, shownNote?: string): Promise<string> {
    const another = this.page.getByRole('button', { name: 'Make another link' })
    const send = this.page.getByRole('button', { name: 'Make the link' })
    await expect(another.or(send)).toBeVisible()
    if (await another.isVisible()) await another.click()
    await this.page.getByLabel('How long it lasts').selectOption('week')
    await this.page.getByLabel('Words to the reader').fill(preface)
    if (shownNote) await this.page.getByRole('checkbox', { name: shownNote }).check()
    await send.click()
    const address = this.page.getByLabel(/^Address of the link/).first()
    await expect(address).toHaveValue(/\/share\/[\w-]{43}$/)
    return address.inputValue()
  }

  /** Ends when the panel shows the address no more. */
  async revoke(address: string): Promise<void> {
    const entry = this.page.getByRole('listitem').filter({ has: this.page.locator(`input[value="${address}"]`) })
    await entry.getByRole('button', { name: /^Revoke the link of/ }).click()
    await expect(entry.getByText('Everyone who was given this link will no longer see the report')).toBeVisible()
    await entry.getByRole('button', { name: 'Revoke the link', exact: true }).click()
    await expect(entry).toHaveCount(0)
  }
}

/** A reader who has the link and nothing else. */
export async function strangersPage(browser: Browser): Promise<{ page: Page; context: BrowserContext }> {
  const context = await browser.newContext()
  return { page: await context.newPage(), context }
}

/** Pictures need the recording, a computation and a library. */
export async function reportIsDrawn(page: Page): Promise<void> {
  await expect(page.locator('.js-plotly-plot .main-svg').first()).toBeVisible({ timeout: 45_000 })
  await expect(page.locator('.plotly-chart[aria-busy="true"]')).toHaveCount(0, { timeout: 45_000 })
  await expect(page.getByRole('progressbar')).toHaveCount(0, { timeout: 45_000 })
}

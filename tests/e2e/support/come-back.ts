import { expect, type Locator, type Page } from '@playwright/test'

/**
 * Somebody leaves the tab and comes back to it until it shows what happened meanwhile. A page asks again when it is come
 * back to, but not each time within a few seconds.
 */
export async function comeBackFor(page: Page, news: Locator): Promise<void> {
  await expect(async () => {
    await page.evaluate(() => window.dispatchEvent(new Event('focus')))
    await expect(news).toBeVisible({ timeout: 1000 })
  }).toPass({ timeout: 20_000 })
}

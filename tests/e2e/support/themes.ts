import type { Page } from '@playwright/test'

export type Theme = 'day' | 'dusk' | 'night'

/** Puts the open page into a theme as the switcher does, without a reload, so that what is open stays open. */
export async function showTheme(page: Page, theme: Theme): Promise<void> {
  await page.evaluate((chosen) => (document.documentElement.dataset.theme = chosen), theme)
}

import type { BrowserContext } from '@playwright/test'

export type Theme = 'day' | 'dusk' | 'night'

/** Chooses the theme as the switcher does: by its cookie, before the page is asked for. */
export async function chooseTheme(context: BrowserContext, baseURL: string, theme: Theme): Promise<void> {
  await context.addCookies([{ name: 'theme', value: theme, url: baseURL }])
}

import { expect, type Browser, type Locator, type Page } from '@playwright/test'
import { BenchPage } from './bench-page'
import { demoPerson, signIn, type DemoPerson } from './people'

/** A browser of its own, signed in as this person of the demo. */
export async function browserOf(browser: Browser, role: DemoPerson['role']): Promise<Page> {
  const page = await (await browser.newContext()).newPage()
  await signIn(page, demoPerson(role))
  return page
}

/** Opens the newest analysis of the demo’s mount; its address. */
export async function openDemoAnalysis(page: Page): Promise<string> {
  await page.goto('/projects')
  const address = await page.getByRole('link', { name: 'Hillside club mount' }).first().getAttribute('href')
  await page.goto(`${address}/analyses`)
  const href = await page.getByRole('table').getByRole('link').first().getAttribute('href')
  if (!href) throw new Error('The demo has no analysis')
  await page.goto(href)
  await new BenchPage(page).allFigures()
  return href
}

export function noteWith(page: Page, text: string): Locator {
  return page.getByRole('listitem').filter({ hasText: text })
}

/** Writes a note on the whole analysis. */
export async function addWholeNote(page: Page, text: string): Promise<void> {
  const whole = page.getByRole('region', { name: 'Notes on the whole analysis' })
  await whole.getByRole('button', { name: 'Add a note' }).click()
  await whole.getByRole('textbox', { name: 'Note' }).fill(text)
  await whole.getByRole('button', { name: 'Add note' }).click()
  await expect(noteWith(page, text)).toBeVisible()
}

/** Takes the note with this text away, whoever wrote it. */
export async function removeNote(page: Page, text: string): Promise<void> {
  await noteWith(page, text).getByRole('button', { name: 'Remove' }).click()
  await page.getByRole('dialog').getByRole('button', { name: 'Remove' }).click()
  await expect(noteWith(page, text)).toHaveCount(0)
}

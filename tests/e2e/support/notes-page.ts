import { expect, type Locator, type Page } from '@playwright/test'

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

/** Pins a note to a time of the track, typed in whole minutes. */
export async function addTrackNote(page: Page, text: string, minutes: number): Promise<void> {
  const track = page.getByRole('region', { name: 'Track' })
  await track.getByRole('button', { name: 'Add a note' }).click()
  await track.getByLabel('Time into the run').fill(String(minutes))
  await track.getByRole('textbox', { name: 'Note' }).fill(text)
  await track.getByRole('button', { name: 'Add note' }).click()
  await expect(noteWith(page, text)).toContainText(`at ${minutes} min`)
}

/** Takes the note with this text away, whoever wrote it. */
export async function removeNote(page: Page, text: string): Promise<void> {
  await noteWith(page, text).getByRole('button', { name: 'Remove' }).click()
  await page.getByRole('dialog').getByRole('button', { name: 'Remove' }).click()
  await expect(noteWith(page, text)).toHaveCount(0)
}

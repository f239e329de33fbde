import { readFile } from 'node:fs/promises'
import { expect, test, type Locator, type Page } from '@playwright/test'
import { visitorRecording } from './fixtures/recordings'
import { BenchPage } from './support/bench-page'
import { comeBackFor } from './support/come-back'
import { demoAddress, firstEntryAddress, HILLSIDE } from './support/demo-project'
import { browserOf, enterAs } from './support/people'

/** Next.js keeps an empty alert of its own on every page. */
function refusalOn(page: Page): Locator {
  return page.getByRole('alert').filter({ hasText: 'Nothing was brought in' })
}

/** The figures of the project's first analysis as its page shows them. */
async function figuresOfFirstAnalysis(page: Page, address: string): Promise<string> {
  await page.goto(await firstEntryAddress(page, address, 'analyses'))
  return new BenchPage(page).allFigures()
}

test('everything is downloaded, brought in again, archived, opened and deleted', async ({ page, browser }) => {
  test.setTimeout(300_000)
  await enterAs(page.context(), 'owner')
  const original = await demoAddress(page)
  await page.goto(`${original}/settings`)
  const [download] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('link', { name: 'Download everything' }).click(),
  ])
  expect(download.suggestedFilename()).toBe(`${HILLSIDE}.zip`)
  const archive = await readFile(await download.path())
  const figures = await figuresOfFirstAnalysis(page, original)

  // A stranger to the project brings it in: what is asked for and shown is theirs alone.
  const other = await browserOf(browser, 'viewer')
  await other.goto('/projects')
  await other.getByRole('link', { name: 'Bring in an archive' }).click()
  const input = other.getByLabel('Archive file')
  const zip = { name: `${HILLSIDE}.zip`, mimeType: 'application/zip' }
  await input.setInputFiles({ ...zip, buffer: archive.subarray(0, archive.length / 2) })
  await expect(refusalOn(other)).toContainText('no ZIP that can be read')
  await input.setInputFiles({ ...zip, buffer: archive })
  await expect(other.getByRole('heading', { level: 1 })).toHaveText(`“${HILLSIDE}” is here, with all that was in it`, {
    timeout: 60_000,
  })
  await other.getByRole('link', { name: 'Open the project' }).click()
  await expect(other).toHaveURL(/\/projects\/[0-9a-f-]{36}$/)
  const copy = new URL(other.url()).pathname
  expect(copy).not.toBe(original)
  expect(await figuresOfFirstAnalysis(other, copy)).toBe(figures)

  await other.goto(`${copy}/settings`)
  await other.getByRole('button', { name: 'Archive this project' }).click()
  await expect(other.getByText('This project is archived', { exact: true })).toBeVisible()
  await expect(other.getByRole('button', { name: /Save the name|Add optics|Change|Remove/ })).toHaveCount(0)
  await other.goto(copy)
  await expect(other.getByText('This project is archived', { exact: true })).toBeVisible()
  await expect(other.getByRole('link', { name: 'Bring in a run' })).toHaveCount(0)
  await other.goto(`${copy}/drive`)
  await expect(other.getByLabel('Teeth of the worm wheel')).toBeDisabled()
  await expect(other.getByRole('button', { name: 'Save the drive train' })).toHaveCount(0)
  await other.goto(`${copy}/runs/new`)
  await expect(other.getByRole('heading', { level: 1 })).toHaveText('No run can be brought in here')
  await figuresOfFirstAnalysis(other, copy)
  await expect(other.getByRole('button', { name: /save|add a note|make a correction table/i })).toHaveCount(0)

  await other.goto(`${copy}/settings`)
  await other.getByRole('button', { name: 'Open it again' }).click()
  await expect(other.getByRole('button', { name: 'Archive this project' })).toBeVisible()
  await expect(other.getByText('This project is archived', { exact: true })).toHaveCount(0)
  await expect(other.getByRole('button', { name: 'Add optics' })).toBeVisible()

  // A second tab has it open when it goes.
  const tab = await other.context().newPage()
  await tab.goto(`${copy}/drive`)
  await expect(tab.getByLabel('Teeth of the worm wheel')).toBeEnabled()
  await other.getByRole('button', { name: 'Delete this project' }).click()
  const dialog = other.getByRole('dialog')
  await expect(dialog).toContainText('Eight runs with their files')
  const confirm = dialog.getByRole('button', { name: 'Delete it' })
  await expect(confirm).toBeDisabled()
  await dialog.getByLabel(/^Type/).fill('Hillside')
  await expect(confirm).toBeDisabled()
  await dialog.getByLabel(/^Type/).fill(HILLSIDE)
  await confirm.click()
  await expect(other).toHaveURL(/\/projects$/)
  await expect(other.locator(`a[href="${copy}"]`)).toHaveCount(0)
  await comeBackFor(tab, tab.getByText('This project is not there any more'))
  expect((await tab.goto(copy))?.status()).toBe(404)
})

test('a file that is no archive is refused by name before it is sent', async ({ page }) => {
  await enterAs(page.context(), 'editor')
  await page.goto('/projects/import')
  await page
    .getByLabel('Archive file')
    .setInputFiles({ name: 'empty.zip', mimeType: 'application/zip', buffer: Buffer.of() })
  await expect(refusalOn(page)).toContainText('empty.zip is empty')
  const { name, mimeType, buffer } = visitorRecording().file
  await page.getByLabel('Archive file').setInputFiles({ name, mimeType, buffer })
  await expect(refusalOn(page)).toContainText('no ZIP that can be read')
})

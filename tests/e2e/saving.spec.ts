import { expect, test, type Page, type Route } from '@playwright/test'
import { BenchPage } from './support/bench-page'
import { demoPerson, enterAs } from './support/people'

async function openSample(page: Page): Promise<BenchPage> {
  await page.goto('/bench?sample=1')
  const bench = new BenchPage(page)
  await bench.allFigures()
  await expect(page.getByRole('progressbar')).toHaveCount(0, { timeout: 45_000 })
  return bench
}

test('a session that ended before saving leads through sign-in, and the work is still there', async ({ page }) => {
  const person = demoPerson('editor')
  await enterAs(page.context(), 'editor')
  const bench = await openSample(page)
  await page.getByLabel('Drift', { exact: true }).selectOption('2')
  await expect(page).toHaveURL(/[?&]drift=2/)
  await expect(page.getByRole('button', { name: 'Save analysis' })).toBeEnabled()
  await page.context().clearCookies()

  await page.getByRole('button', { name: 'Save analysis' }).click()
  const way = page.getByRole('dialog', { name: 'Saving needs an account' })
  await expect(way).toContainText('wait in this browser')
  await way.getByRole('link', { name: 'Sign in' }).click()
  await page.getByLabel('E-mail').fill(person.email)
  await page.getByLabel('Password', { exact: true }).fill(person.password)
  await page.getByRole('button', { name: 'Sign in' }).click()

  await expect(page.getByRole('dialog', { name: 'Save this analysis' })).toBeVisible({ timeout: 45_000 })
  await bench.allFigures()
  await expect(page.getByLabel('Drift', { exact: true })).toHaveValue('2')
})

/** The server does what it is asked, but its answer never arrives; the second time all is well. */
async function loseFirstAnswer(page: Page, path: RegExp, method: string): Promise<void> {
  let isLost = false
  await page.route(path, async (route: Route) => {
    if (isLost || route.request().method() !== method) return route.fallback()
    isLost = true
    await route.fetch()
    await route.abort('connectionreset')
  })
}

test('answers that are lost while saving cost a second press, and nothing is stored twice', async ({ page }) => {
  await enterAs(page.context(), 'editor')
  await openSample(page)
  await loseFirstAnswer(page, /\/runs\?/, 'POST')
  await loseFirstAnswer(page, /\/import$/, 'PUT')
  await loseFirstAnswer(page, /\/analyses$/, 'POST')

  await page.getByRole('button', { name: 'Save analysis' }).click()
  const dialog = page.getByRole('dialog', { name: 'Save this analysis' })
  await dialog.getByLabel('Project', { exact: true }).selectOption('new')
  await dialog.getByLabel('Name of the new project').fill(`Far away ${Date.now()}`)
  for (let attempt = 0; attempt < 3; attempt += 1) {
    await dialog.getByRole('button', { name: 'Save' }).click()
    await expect(dialog.getByText('The server can’t be reached')).toBeVisible()
    await expect(dialog.getByRole('button', { name: 'Save' })).toBeEnabled()
  }
  await dialog.getByRole('button', { name: 'Save' }).click()
  await expect(page).toHaveURL(/\/projects\/[0-9a-f-]+\/analyses\/[0-9a-f-]+/, { timeout: 45_000 })

  const project = page
    .url()
    .replace(/\/analyses\/.*/, '')
    .replace('/projects/', '/api/projects/')
  const { runs } = await (await page.request.get(`${project}/runs`)).json()
  const { analyses } = await (await page.request.get(`${project}/analyses`)).json()
  expect([runs.length, analyses.length]).toEqual([1, 1])
})

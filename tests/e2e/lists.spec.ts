import { expect, test, type Page } from '@playwright/test'
import { enterAs } from './support/people'

const RUN_COUNT = 130
const driveTrain = { axisKind: 'worm', wheelTeeth: 152, wormStarts: 1, stages: [] }

/** A project of this test's own with many unread runs, put in through the API as the page itself would do it. */
async function makeLongProject(page: Page): Promise<string> {
  return page.evaluate(
    async ({ count, train }) => {
      const made = await fetch('/api/projects', {
        method: 'POST',
        headers: { 'content-type': 'application/json' },
        body: JSON.stringify({ name: 'Many nights', driveTrain: train }),
      })
      const { id } = await made.json()
      const rows = ['time,ra', ...Array.from({ length: 20 }, (_, i) => `${i * 10},${i % 3}`), ''].join('\n')
      for (let number = 1; number <= count; number += 1) {
        const query = new URLSearchParams({ name: `Night ${number}`, fileName: `log-${number}.csv` })
        const sent = await fetch(`/api/projects/${id}/runs?${query}`, {
          method: 'POST',
          headers: { 'content-type': 'application/octet-stream' },
          body: rows,
        })
        if (!sent.ok) throw new Error(`Run ${number} was refused: ${await sent.text()}`)
      }
      return id as string
    },
    { count: RUN_COUNT, train: driveTrain },
  )
}

async function names(page: Page): Promise<string[]> {
  await expect(page.getByRole('table')).toHaveAttribute('aria-busy', 'false')
  return page.getByRole('rowheader').getByRole('link').allTextContents()
}

const nights = (from: number, to: number) => Array.from({ length: to - from + 1 }, (_, step) => `Night ${from + step}`)
const next = (page: Page) => page.getByRole('button', { name: 'Next', exact: true })

test('a long list is sorted, paged and filtered, and Back returns to the same place', async ({ page }) => {
  test.setTimeout(240_000)
  await enterAs(page.context(), 'owner')
  await page.goto('/projects')
  const id = await makeLongProject(page)
  await page.goto(`/projects/${id}/runs`)
  await expect(page.getByRole('heading', { level: 1 })).toContainText(`${RUN_COUNT} runs`)

  await page.getByRole('button', { name: 'Run', exact: true }).click()
  await expect(page.getByRole('columnheader', { name: 'Run' })).toHaveAttribute('aria-sort', 'ascending')
  await expect(page.getByRole('rowheader').first().getByRole('link')).toHaveText('Night 1')
  const seen: string[] = []
  for (let first = 1; first <= RUN_COUNT; first += 25) {
    const last = Math.min(first + 24, RUN_COUNT)
    await expect(page.getByText(`${first}–${last}`, { exact: true })).toBeVisible()
    seen.push(...(await names(page)))
    if (last < RUN_COUNT) await next(page).click()
  }
  expect(seen).toEqual(nights(1, RUN_COUNT))
  await expect(next(page)).toBeDisabled()

  await names(page)
  await page.getByRole('button', { name: 'Back', exact: true }).click()
  await expect(page.getByText('101–125', { exact: true })).toBeVisible()
  await page.getByRole('link', { name: 'Night 110', exact: true }).click()
  await expect(page).toHaveURL(/runs\/[0-9a-f-]{36}/)
  await page.goBack()
  await expect(page.getByText('101–125', { exact: true })).toBeVisible()
  expect(await names(page)).toEqual(nights(101, 125))
  await page.reload()
  expect(await names(page)).toEqual(nights(101, 125))

  await page.getByRole('link', { name: 'Night 103', exact: true }).focus()
  await page.keyboard.press('PageUp')
  await expect(page.getByRole('link', { name: 'Night 76', exact: true })).toBeFocused()
  await page.keyboard.press('End')
  await expect(page.getByRole('link', { name: 'Night 100', exact: true })).toBeFocused()

  await page.getByRole('searchbox').fill('log-12')
  await expect(page.getByText(`11 of ${RUN_COUNT} runs: with “log-12”`).last()).toBeVisible()
  expect(await names(page)).toEqual(['Night 12', ...nights(120, 129)])
  await page.getByRole('combobox', { name: 'File' }).selectOption('read')
  await expect(page.getByRole('heading', { name: 'No run matches' })).toBeVisible()
  await page.goBack()
  await expect(page.getByRole('combobox', { name: 'File' })).toHaveValue('')
  await page.getByRole('button', { name: 'Show all' }).click()
  await expect(page.getByRole('searchbox')).toHaveValue('')
  await expect(page.getByText('1–25', { exact: true })).toBeVisible()

  await page.goto(`/projects/${id}/runs?cursor=elsewhere`)
  await page.getByRole('button', { name: 'To the beginning of the list' }).click()
  await expect(page.getByText('1–25', { exact: true })).toBeVisible()

  await page.goto(`/projects/${id}/settings/trail`)
  await expect(page.getByRole('row', { name: /Mira Okafor brought in the run Night 130/ })).toBeVisible()
  await page.getByRole('combobox', { name: 'About' }).selectOption({ label: 'The project' })
  await expect(page.getByRole('rowheader')).toHaveCount(1)
  await expect(page.getByRole('row', { name: /made the project Many nights/ })).toBeVisible()
})

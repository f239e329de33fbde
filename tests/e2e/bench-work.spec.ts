import { expect, test } from '@playwright/test'
import { BenchPage } from './support/bench-page'

test('a stretch of the track is left out by dragging, and taken back in', async ({ page }) => {
  const bench = new BenchPage(page)
  await page.goto('/bench?sample=1')
  const before = await bench.allFigures()
  const picture = page.locator('.js-plotly-plot').first()
  await expect(picture.locator('.main-svg').first()).toBeVisible({ timeout: 45_000 })
  await picture.scrollIntoViewIfNeeded()
  const box = await picture.boundingBox()
  if (!box) throw new Error('The track has no picture')
  const y = box.y + box.height / 2
  await page.mouse.move(box.x + box.width * 0.3, y)
  await page.mouse.down()
  await page.mouse.move(box.x + box.width * 0.36, y, { steps: 5 })
  await page.mouse.up()
  await page.getByRole('button', { name: 'Leave out', exact: true }).click()

  await expect(page).toHaveURL(/[?&]leave-out=\d/)
  const again = page.getByRole('button', { name: /^Use .* again$/ })
  await expect(again).toHaveCount(1)
  await expect.poll(() => bench.allFigures()).not.toBe(before)

  await again.click()
  await expect(page).not.toHaveURL(/leave-out=/)
  await expect.poll(() => bench.allFigures()).toBe(before)
  await page.keyboard.press('Control+z')
  await expect(page).toHaveURL(/[?&]leave-out=\d/)
})

test('a link reproduces the view of the sample run', async ({ page, context }) => {
  const bench = new BenchPage(page)
  await page.goto('/bench?sample=1&drift=3&harmonics=2&bins=24')
  const figures = await bench.allFigures()
  await expect(page.getByLabel('Bins')).toHaveValue('24')
  const another = await context.newPage()
  await another.goto(page.url())
  expect(await new BenchPage(another).allFigures()).toBe(figures)
  await expect(another.getByLabel('Bins')).toHaveValue('24')
})

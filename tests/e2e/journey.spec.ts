import { readFile } from 'node:fs/promises'
import { expect, test } from '@playwright/test'
import Papa from 'papaparse'
import { z } from 'zod'
import { pixelRecording, semicolonRecording, visitorRecording } from './fixtures/recordings'
import { BenchPage, firstNumber } from './support/bench-page'
import { newcomer, signUp } from './support/people'

/** A wheel of 180 teeth: 86164.0905 s of a sidereal day / 180 (Aoki et al. 1982, A&A 105, 359). */
const WORM_PERIOD_SECONDS = 478.6894

const writtenTableSchema = z.object({
  value: z.object({ unit: z.string(), meaning: z.string() }),
  bins: z.array(z.object({ bin: z.number(), wormAngle: z.number(), value: z.number() })),
})

test('a visitor drops a file, signs up, saves, re-opens and takes a correction table away', async ({ page }) => {
  const bench = new BenchPage(page)
  const recording = visitorRecording()

  await bench.open()
  await bench.drop(recording.file)
  await expect(bench.title).toHaveText('Which column is what?')
  await bench.measuredOnTheAxis()
  await page.getByLabel('Correction in the mount').selectOption('off')
  await bench.read()

  const period = firstNumber(await bench.figure('Worm period'))
  expect(Math.abs(period - WORM_PERIOD_SECONDS) / WORM_PERIOD_SECONDS).toBeLessThan(0.003)
  await expect(bench.title).toContainText('each turn')

  // A setting of one's own, which must survive the way through sign-up: it stands in the address.
  await page.getByLabel('Bins').fill('60')
  await page.getByLabel('Bins').press('Tab')
  await expect(page).toHaveURL(/[?&]bins=60/)
  const figuresBefore = await bench.allFigures()

  await page.getByRole('button', { name: 'Save analysis' }).click()
  await page.getByRole('link', { name: 'Sign up' }).last().click()
  await signUp(page, newcomer())

  const dialog = page.getByRole('dialog', { name: 'Save this analysis' })
  await expect(dialog).toBeVisible({ timeout: 45_000 })
  expect(await bench.allFigures()).toBe(figuresBefore)
  await dialog.getByLabel('Name of the new project').fill('Garden mount')
  await dialog.getByLabel('Name of the analysis').fill('First night')
  await dialog.getByRole('button', { name: 'Save' }).click()
  await expect(page).toHaveURL(/\/projects\/[0-9a-f-]+\/analyses\/[0-9a-f-]+/, { timeout: 45_000 })
  expect(await bench.allFigures()).toBe(figuresBefore)

  // Computed again from what was stored, in the same engine: not one digit may differ.
  await expect(page.getByText('every figure is the same to the last digit')).toBeVisible({ timeout: 45_000 })
  await page.reload()
  expect(await bench.allFigures()).toBe(figuresBefore)

  await page.getByLabel('I know that the sign of this table is not proven').check()
  await page.getByRole('button', { name: 'Make a correction table' }).click()
  await expect(page).toHaveURL(/\/corrections\/[0-9a-f-]+$/)

  const csvDownload = page.waitForEvent('download')
  await page.getByRole('link', { name: 'Download CSV' }).click()
  const csv = Papa.parse<string[]>(await readFile(await (await csvDownload).path(), 'utf8'), { skipEmptyLines: true })
  expect(csv.errors).toEqual([])
  const [header, ...records] = csv.data
  expect(header.slice(0, 3)).toEqual(['bin', 'worm angle (deg)', 'value (arcsec)'])
  expect(records).toHaveLength(60)
  expect(new Set(records.map((record) => record.length))).toEqual(new Set([header.length]))
  const values = records.map((record) => Number(record[2]))
  // The mean is taken out, so that the table closes. With the default sign a value is what the axis should do: the
  // simulated worm turned round, θ counted from the first row. 0.3″ is more than six
  // standard errors of the curve: 0.4″ of seeing over 800 frames, linked between neighbours, gives some 0.04″.
  expect(Math.abs(values.reduce((sum, value) => sum + value, 0) / values.length)).toBeLessThan(1e-9)
  records.forEach(([, angle], index) => {
    const theta = (Number(angle) * Math.PI) / 180
    const truth = recording.truth.harmonics.reduce(
      (sum, { order, cosArcsec, sinArcsec }) =>
        sum + cosArcsec * Math.cos(order * theta) + sinArcsec * Math.sin(order * theta),
      0,
    )
    expect(Math.abs(values[index] + truth), `bin at ${angle}°`).toBeLessThan(0.3)
  })

  const jsonDownload = page.waitForEvent('download')
  await page.getByRole('link', { name: 'JSON' }).click()
  const json = writtenTableSchema.parse(JSON.parse(await readFile(await (await jsonDownload).path(), 'utf8')))
  expect(json.value).toMatchObject({ unit: 'arcsec', meaning: 'correction' })
  expect(json.bins.map(({ value }) => value)).toEqual(values)
})

test('the sample run shows the worm, and the bench undoes and redoes a setting', async ({ page }) => {
  const bench = new BenchPage(page)
  await bench.open()
  await page.getByRole('button', { name: 'Take the sample run' }).click()
  // 86164.0905 s / 152 teeth.
  expect(Math.abs(firstNumber(await bench.figure('Worm period')) - 566.869)).toBeLessThan(1.5)

  const drift = page.getByLabel('Drift', { exact: true })
  await drift.selectOption('2')
  await expect(page).toHaveURL(/[?&]drift=2/)
  await page.getByRole('button', { name: 'Undo' }).click()
  await expect(page).not.toHaveURL(/drift=/)
  await page.getByRole('button', { name: 'Redo' }).click()
  await expect(page).toHaveURL(/[?&]drift=2/)
  await expect(drift).toHaveValue('2')

  // A reload finds the file and the settings again.
  await page.reload()
  await expect(page.getByLabel('Drift', { exact: true })).toHaveValue('2', { timeout: 45_000 })
  await bench.figure('Worm period')
})

for (const [what, recording] of [
  ['semicolons and decimal commas', semicolonRecording()],
  ['pixels that grow as the axis falls behind', pixelRecording()],
] as const) {
  test(`a recording with ${what} gives the same worm`, async ({ page }) => {
    const bench = new BenchPage(page)
    await bench.open()
    await bench.choose(recording.file)
    await expect(bench.title).toHaveText('Which column is what?')
    if (recording.conversion.displacementUnit === 'px') {
      await page.getByLabel('Image scale', { exact: true }).fill(String(recording.conversion.imageScaleArcsecPerPx))
      await page.getByLabel('Declination of the field').fill(String(recording.conversion.declinationDegrees))
      await page.getByLabel('Growing values mean').selectOption('behind')
    } else await bench.measuredOnTheAxis()
    await bench.read()
    const period = firstNumber(await bench.figure('Worm period'))
    expect(Math.abs(period - WORM_PERIOD_SECONDS) / WORM_PERIOD_SECONDS).toBeLessThan(0.003)
    // 2 × 9″ of the fundamental; the second harmonic of 1.2″ adds or takes a little.
    const peakToPeak = firstNumber(await bench.figure(/peak to peak/i))
    expect(peakToPeak).toBeGreaterThan(17)
    expect(peakToPeak).toBeLessThan(20.5)
  })
}

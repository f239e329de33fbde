import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { expect, test } from '@playwright/test'
import { badFiles, writeOneByteTooLarge } from './fixtures/bad-files'
import { visitorRecording } from './fixtures/recordings'
import { BenchPage } from './support/bench-page'

/** What the visitor is told, and that the next, good file is taken without a reload. */
async function expectRefusal(bench: BenchPage, message: RegExp): Promise<void> {
  const alert = bench.page.getByRole('alert').filter({ hasText: message })
  await expect(alert.first()).toBeVisible()
}

async function expectGoodFileStillWorks(bench: BenchPage): Promise<void> {
  const another = bench.page.getByRole('button', { name: 'Choose another file' })
  if (await another.isVisible()) await another.click()
  await bench.choose(visitorRecording().file)
  await expect(bench.title).toHaveText('Which column is what?')
}

const refusedAtOnce = [
  { name: 'empty', file: badFiles.empty, message: /empty/i },
  { name: 'binary', file: badFiles.binary, message: /not text|binary/i },
] as const

for (const { name, file, message } of refusedAtOnce) {
  test(`an ${name} file is refused with its reason`, async ({ page }) => {
    const bench = new BenchPage(page)
    await bench.open()
    await bench.choose(file())
    await expectRefusal(bench, message)
    await expectGoodFileStillWorks(bench)
  })
}

test('a table of words has no column to choose, and says so', async ({ page }) => {
  const bench = new BenchPage(page)
  await bench.open()
  await bench.choose(badFiles.wrongColumns())
  await expectRefusal(bench, /No table of numbers was found/)
  await expectGoodFileStillWorks(bench)
})

const refusedOnReading = [
  { name: 'five rows', file: badFiles.fiveRows, message: /5 rows|at least 20/i, column: null },
  // A column that never changes is not guessed to be a displacement, so the visitor insists.
  {
    name: 'a constant signal',
    file: badFiles.constantSignal,
    message: /no motion to analyse/,
    column: 'RA displacement',
  },
] as const

for (const { name, file, message, column } of refusedOnReading) {
  test(`${name}: refused on reading, and what was typed stays`, async ({ page }) => {
    const bench = new BenchPage(page)
    await bench.open()
    await bench.choose(file())
    await expect(bench.title).toHaveText('Which column is what?')
    if (column) await page.getByLabel(`Meaning of ${column}`).selectOption('displacement')
    const declination = page.getByLabel('Declination of the field')
    await declination.fill('12.5')
    await page.getByLabel('Teeth of the worm wheel').fill('144')
    await bench.read()
    await expectRefusal(bench, message)
    await expect(page.getByRole('alert').filter({ hasText: message })).toBeInViewport()
    await expect(declination).toHaveValue('12.5')
    await expect(page.getByLabel('Teeth of the worm wheel')).toHaveValue('144')
    await expectGoodFileStillWorks(bench)
  })
}

test('one byte over 64 MB is refused with the limit', async ({ page }) => {
  const folder = await mkdtemp(join(tmpdir(), 'turnwright-e2e-'))
  try {
    const bench = new BenchPage(page)
    await bench.open()
    await bench.choose(await writeOneByteTooLarge(folder))
    await expectRefusal(bench, /64/)
    await expectGoodFileStillWorks(bench)
  } finally {
    await rm(folder, { recursive: true, force: true })
  }
})

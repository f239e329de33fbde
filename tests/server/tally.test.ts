import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { playwrightCounts, Tally, vitestCounts } from '@/db/local/tally.mjs'

let folder: string
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'turnwright-tally-'))
})
afterAll(() => rmSync(folder, { recursive: true }))

function report(content: unknown): string {
  const file = join(folder, 'report.json')
  writeFileSync(file, JSON.stringify(content))
  return file
}

test('counts come from the reports', () => {
  const vitest = report({ numPassedTests: 5, numFailedTests: 2, numPendingTests: 1, numTodoTests: 0 })
  expect(vitestCounts(vitest, 1)).toEqual({ passed: 5, failed: 2, skipped: 1 })
  const playwright = report({ stats: { expected: 4, unexpected: 0, flaky: 0, skipped: 0 } })
  expect(playwrightCounts(playwright, 0)).toEqual({ passed: 4, failed: 0, skipped: 0 })
})

test('a browser test that passes only when repeated has failed', () => {
  const file = report({ stats: { expected: 4, unexpected: 0, flaky: 1, skipped: 0 } })
  expect(playwrightCounts(file, 0).failed).toBe(1)
})

test('a bad end without a failed test counts as a failure', () => {
  expect(vitestCounts(report({ numPassedTests: 5, numFailedTests: 0 }), 1)).toMatchObject({ passed: 5, failed: 1 })
  expect(vitestCounts(join(folder, 'missing.json'), 0)).toMatchObject({ passed: 0, failed: 1 })
  expect(playwrightCounts(report({ stats: {} }), 0)).toMatchObject({ passed: 0, failed: 1 })
})

test('the last line adds everything up', () => {
  const tally = new Tally()
  tally.add({ passed: 3 }, 'Types')
  tally.add({ passed: 10, failed: 2, skipped: 1 }, 'Unit tests')
  expect(tally.summary).toBe('13 passed, 2 failed')
  expect(tally.failures).toEqual(['Unit tests: 2 failed'])
})

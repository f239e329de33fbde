import { expect, test } from 'vitest'
import { analyseAtOnce } from '@/lib/analysis/analyse'
import type { AnalysisResult } from '@/lib/analysis/types'
import { compareResults, rerunFinding } from '@/lib/findings/rerun-finding'
import { defaultRecipe } from '@/lib/schemas/recipe'
import { SAMPLE_CONVERSION, SAMPLE_DRIVE_TRAIN, sampleRun } from '@/lib/simulate/sample'

function sampleResult(): AnalysisResult {
  const recipe = { ...defaultRecipe(), conversion: SAMPLE_CONVERSION, driveTrain: SAMPLE_DRIVE_TRAIN }
  const outcome = analyseAtOnce(sampleRun().columns, recipe)
  if (!outcome.ok) throw new Error(outcome.reason)
  return outcome.result
}

const saved = sampleResult()

test('the same recipe computed again gives the same figures to the last digit, after a way through JSON as well', () => {
  const again = sampleResult()
  expect(compareResults(JSON.parse(JSON.stringify(saved)), again)).toEqual({
    isSame: true,
    largestRelativeDifference: 0,
  })
  expect(rerunFinding(compareResults(saved, again))).toContain('the same to the last digit')
})

test('a figure that differs in its last digits is told by its size', () => {
  const other = structuredClone(saved)
  other.residual.rmsArcsec *= 1 + 3e-11
  const comparison = compareResults(saved, other)
  expect(comparison.isSame).toBe(false)
  expect(comparison.largestRelativeDifference).toBeGreaterThan(2.9e-11)
  expect(comparison.largestRelativeDifference).toBeLessThan(3.1e-11)
  expect(rerunFinding(comparison)).toContain('1 part in 10¹⁰')
})

test('what rounding leaves of zero is no difference, but not the same either', () => {
  const other = structuredClone(saved)
  if (!other.table) throw new Error('The sample run gives a table')
  other.table.closureError = 3.1e-15
  expect(compareResults(saved, other)).toEqual({ isSame: false, largestRelativeDifference: 0 })
})

test('a missing line and a difference of per cent are said as such', () => {
  const fewer = structuredClone(saved)
  fewer.lines.pop()
  expect(rerunFinding(compareResults(saved, fewer))).toContain('in one result and not in the other')
  const other = structuredClone(saved)
  other.spans.rawArcsec *= 1.02
  expect(rerunFinding(compareResults(saved, other))).toContain('2.0\u202f%')
})

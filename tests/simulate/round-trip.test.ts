import { describe, expect, test } from 'vitest'
import { drain } from '@/lib/analysis/drain'
import { hintsFromMetadata } from '@/lib/formats/metadata-hints'
import { parseTable } from '@/lib/formats/parse-table'
import { previewTable } from '@/lib/formats/preview-table'
import type { ImportSettings } from '@/lib/formats/types'
import { demoRuns } from '@/lib/simulate/demo'
import { SAMPLE_CONVERSION, SAMPLE_IMPORT, sampleFileText, sampleRun } from '@/lib/simulate/sample'

const bytesOf = (text: string) => new TextEncoder().encode(text)

function parsed(text: string, settings: ImportSettings) {
  const outcome = drain(parseTable(bytesOf(text), settings))
  if (!outcome.ok) throw new Error(outcome.fault.message)
  return outcome
}

describe('what the simulator writes, the importer reads', () => {
  test('the sample run comes back to the millisecond and the thousandth of a pixel', () => {
    const { columns } = sampleRun()
    const read = parsed(sampleFileText(), SAMPLE_IMPORT).columns
    expect(read.displacement).toHaveLength(columns.displacement.length)
    columns.timeSeconds.forEach((t, i) => expect(Math.abs(read.timeSeconds[i] - t)).toBeLessThan(0.00051))
    columns.displacement.forEach((px, i) => expect(read.displacement[i]).toBeCloseTo(px, 9))
    columns.declinationDisplacement!.forEach((px, i) => expect(read.declinationDisplacement![i]).toBeCloseTo(px, 9))
    expect(read.wormAngleDegrees).toBeNull()
  })

  test.each(demoRuns().map((run) => [run.fileName, run] as const))('%s', (_, run) => {
    const read = parsed(run.text, run.importSettings)
    const { rowCount, columns } = read
    expect(rowCount).toBe(run.truth.wormArcsec.length)
    const last = columns.timeSeconds.at(-1)!
    expect(Math.abs(last - run.truth.options.durationSeconds)).toBeLessThan(run.truth.options.cadenceSeconds + 1)
    expect(columns.wormAngleDegrees !== null).toBe(run.importSettings.columns.wormAngle !== null)
  })
})

test('the preview guesses the sample run as it is', () => {
  const outcome = previewTable(bytesOf(sampleFileText()))
  if (!outcome.ok) throw new Error(outcome.fault.message)
  expect(outcome.preview.layout).toEqual(SAMPLE_IMPORT.layout)
  expect(outcome.preview.suggested).toEqual(SAMPLE_IMPORT.columns)
  expect(hintsFromMetadata(outcome.preview.metadata)).toMatchObject({
    exposureSeconds: SAMPLE_CONVERSION.exposureSeconds,
    declinationDegrees: SAMPLE_CONVERSION.declinationDegrees,
    imageScaleArcsecPerPx: SAMPLE_CONVERSION.imageScaleArcsecPerPx,
  })
})

test.each(demoRuns().map((run) => [run.fileName, run] as const))('the preview guesses %s as it is', (_, run) => {
  const outcome = previewTable(bytesOf(run.text))
  if (!outcome.ok) throw new Error(outcome.fault.message)
  expect(outcome.preview.layout).toEqual(run.importSettings.layout)
  expect(outcome.preview.suggested).toMatchObject({
    time: run.importSettings.columns.time,
    displacement: run.importSettings.columns.displacement,
    declination: run.importSettings.columns.declination,
    wormAngle: run.importSettings.columns.wormAngle,
  })
})

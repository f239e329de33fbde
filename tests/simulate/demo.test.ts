import { describe, expect, test } from 'vitest'
import { importSettingsSchema } from '@/lib/schemas/import'
import { conversionSchema, driveTrainSchema } from '@/lib/schemas/recipe'
import { opticsFieldsSchema } from '@/lib/schemas/api'
import { runFactsSchema } from '@/lib/schemas/run-facts'
import { DEMO_DRIVE_TRAIN, DEMO_OPTICS, DEMO_PEOPLE, demoRuns } from '@/lib/simulate/demo'
import { SAMPLE_STARTED_AT, sampleRun } from '@/lib/simulate/sample'

const runs = demoRuns()
const secondHarmonic = (key: string) => {
  const { harmonics } = runs.find((run) => run.key === key)!.truth
  const found = harmonics.find(({ order }) => order === 2)!
  return Math.hypot(found.cosArcsec, found.sinArcsec)
}

describe('demo runs', () => {
  test('are eight, oldest first', () => {
    expect(runs).toHaveLength(8)
    const starts = runs.map(({ facts }) => Date.parse(facts.startedAt!))
    expect([...starts].sort((a, b) => a - b)).toEqual(starts)
  })

  test('have settings and facts that the API takes', () => {
    for (const run of runs) {
      expect(importSettingsSchema.parse(run.importSettings)).toEqual(run.importSettings)
      expect(conversionSchema.parse(run.conversion)).toEqual(run.conversion)
      expect(runFactsSchema.parse(run.facts)).toEqual(run.facts)
    }
    expect(driveTrainSchema.parse(DEMO_DRIVE_TRAIN)).toEqual(DEMO_DRIVE_TRAIN)
    expect(opticsFieldsSchema.parse(DEMO_OPTICS)).toEqual(DEMO_OPTICS)
  })

  test('the image scale of the optics is 648/π · 3.76 µm / 500.4 mm', () => {
    expect((648 / Math.PI) * (DEMO_OPTICS.pixelSizeUm / DEMO_OPTICS.focalLengthMm)).toBeCloseTo(1.55, 3)
  })

  test('the second harmonic falls from some 1.75″ to some 0.8″ when the mesh is eased', () => {
    for (const key of ['2026-09-26', '2026-10-10', '2026-11-07', '2026-11-14']) {
      expect(Math.abs(secondHarmonic(key) - 1.75)).toBeLessThan(0.15)
    }
    for (const key of ['2026-11-21', '2026-11-28']) expect(Math.abs(secondHarmonic(key) - 0.8)).toBeLessThan(0.15)
  })

  test('were made on both sides of the pier; one is short, one has guiding not noted', () => {
    expect(new Set(runs.map(({ facts }) => facts.sideOfPier))).toEqual(new Set(['east', 'west']))
    expect(runs.filter(({ facts }) => facts.guiding === 'unknown')).toHaveLength(1)
    const turns = runs.map(({ truth }) => truth.options.durationSeconds / truth.wormPeriodSeconds)
    expect(turns.filter((count) => count < 3)).toHaveLength(1)
    expect(Math.min(...turns)).toBeCloseTo(2.2, 6)
  })

  test('the night of the sample run is the sample run, with its worm angle beside it', () => {
    const night = runs.find(({ facts }) => facts.startedAt === SAMPLE_STARTED_AT)!
    expect([...night.truth.wormArcsec]).toEqual([...sampleRun().truth.wormArcsec])
    expect(night.importSettings.columns.wormAngle).toBe(3)
  })

  test('are the same every time', () => {
    expect(demoRuns().map(({ text }) => text)).toEqual(runs.map(({ text }) => text))
  })

  test('come in more than one layout', () => {
    expect(new Set(runs.map(({ importSettings }) => importSettings.layout.delimiter))).toEqual(
      new Set([';', '\t', ',']),
    )
  })
})

test('the demo has one person in each role, with addresses that lead nowhere', () => {
  expect(DEMO_PEOPLE.map(({ role }) => role).sort()).toEqual(['editor', 'owner', 'viewer'])
  // RFC 2606, section 2: .example is reserved for documentation.
  for (const { email } of DEMO_PEOPLE) expect(email).toMatch(/@hillside\.example$/)
})

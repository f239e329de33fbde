import { readFileSync, statSync } from 'node:fs'
import { expect, test } from 'vitest'
import { conversionSchema, driveTrainSchema } from '@/lib/schemas/recipe'
import { importSettingsSchema } from '@/lib/schemas/import'
import {
  SAMPLE_CONVERSION,
  SAMPLE_DRIVE_TRAIN,
  SAMPLE_FILE_NAME,
  SAMPLE_IMPORT,
  sampleFileText,
  sampleRun,
} from '@/lib/simulate/sample'

const path = new URL(`../../public/${SAMPLE_FILE_NAME}`, import.meta.url)

test('the sample run in public/ is what db/make-sample.ts makes, byte for byte', () => {
  expect(readFileSync(path, 'utf8') === sampleFileText()).toBe(true)
})

test('it is below 300 kB', () => {
  expect(statSync(path).size).toBeLessThan(300_000)
})

test('its import settings, conversion and drive train are valid', () => {
  expect(importSettingsSchema.parse(SAMPLE_IMPORT)).toEqual(SAMPLE_IMPORT)
  expect(conversionSchema.parse(SAMPLE_CONVERSION)).toEqual(SAMPLE_CONVERSION)
  expect(driveTrainSchema.parse(SAMPLE_DRIVE_TRAIN)).toEqual(SAMPLE_DRIVE_TRAIN)
})

test('its import settings point at the rows of the text', () => {
  const lines = sampleFileText().split('\n')
  const { headerRow, unitsRow, firstDataRow } = SAMPLE_IMPORT.layout
  expect(lines[headerRow! - 1]).toBe('Time,RA displacement,Dec displacement')
  expect(lines[unitsRow! - 1]).toBe('s,px,px')
  expect(lines[firstDataRow - 1]).toMatch(/^0\.000,-?\d+\.\d{3},-?\d+\.\d{3}$/)
})

test('it covers six turns of a worm of 566.869 s, loses one cloud of some 56 s and has three stray points', () => {
  const { columns, truth } = sampleRun()
  // 86164.0905 s / 152 (mean sidereal day of Aoki et al. 1982, A&A 105, 359).
  expect(truth.wormPeriodSeconds).toBeCloseTo(566.86901645, 7)
  const t = columns.timeSeconds
  const turns = (t.at(-1)! - t[0]) / truth.wormPeriodSeconds
  expect(turns).toBeGreaterThan(6)
  expect(turns).toBeLessThan(6.05)
  const waits = Array.from(t.subarray(1), (value, i) => value - t[i])
  const gaps = waits.filter((wait) => wait > 7.5)
  expect(gaps).toHaveLength(1)
  expect(gaps[0]).toBeGreaterThan(54)
  expect(gaps[0]).toBeLessThan(58)
  expect(truth.strayRows).toHaveLength(3)
})

import { describe, expect, test } from 'vitest'
import {
  ABSENT,
  estimateParts,
  formatBytes,
  formatCount,
  formatDuration,
  formatEstimate,
  formatNumber,
  formatPercent,
  formatPeriod,
  formatProbability,
  formatSignificant,
  imageScaleArcsecPerPx,
  wrapDegrees,
} from '@/lib/units'

/** Tests are written with ~ for the thin space, which cannot be seen. */
const thin = (text: string) => text.replaceAll('~', '\u202f')

test.each([
  [-1.25, 1, {}, '−1.3'],
  [-0.004, 2, {}, '0.00'],
  [0.004, 2, { isSigned: true }, '0.00'],
  [3.14159, 2, { isSigned: true, unit: 's' }, '+3.14~s'],
  [16, 1, { unit: '″' }, '16.0″'],
  [33.4, 0, { unit: '°' }, '33°'],
  [-4.2, 1, { unit: '°C' }, '−4.2~°C'],
  [0.122, 3, { unit: '″/s' }, '0.122″/s'],
  [null, 2, { unit: 's' }, ABSENT],
  [NaN, 2, {}, ABSENT],
  [Infinity, 2, {}, ABSENT],
])('formatNumber(%s, %i, %o) is %s', (value, decimals, options, expected) => {
  expect(formatNumber(value, decimals, options)).toBe(thin(expected))
})

test.each([
  [478.68939167, 4, '478.7'],
  [0.0123449, 3, '0.0123'],
  [99.96, 3, '100'],
  [1234567, 3, '1.23 × 10⁶'],
  [123456, 3, '123000'],
  [-0.000012, 2, '−1.2 × 10⁻⁵'],
  [0, 3, '0.00'],
])('formatSignificant(%d, %i) is %s', (value, digits, expected) => {
  expect(formatSignificant(value, digits)).toBe(expected)
})

describe('formatEstimate cuts value and error at the second digit of the error', () => {
  test.each([
    // A fitted period of 478.7865997825 s with standard error 0.1667895963 s.
    [478.7865997825, 0.1667895963, { unit: 's' }, '478.79 ± 0.17~s'],
    [-16.02, 0.1296, { unit: '″' }, '−16.02 ± 0.13″'],
    [0.351, 0.00199, { unit: '″/min', isSigned: true }, '+0.3510 ± 0.0020″/min'],
    [9.0095, 0.0996, {}, '9.01 ± 0.10'],
    [4567, 123, {}, '4570 ± 120'],
    [0.00001234, 0.0000045, { unit: '″/s' }, '(1.23 ± 0.45) × 10⁻⁵″/s'],
    [0.00001, 5, {}, '0.0 ± 5.0'],
    [12, null, { unit: 's' }, '12.00~s'],
    [12, 0, { unit: 's', significantDigits: 6 }, '12.0000~s'],
  ])('%d with error %d, %o: %s', (value, stderr, options, expected) => {
    expect(formatEstimate({ value, stderr }, options)).toBe(thin(expected))
  })

  test('an absent estimate is a dash without a unit', () => {
    expect(formatEstimate(null, { unit: 's' })).toBe(ABSENT)
    expect(formatEstimate({ value: NaN, stderr: 1 }, { unit: 's' })).toBe(ABSENT)
  })

  test('estimateParts keeps the error apart so that it can be set softer', () => {
    expect(estimateParts({ value: 478.662, stderr: 0.211 }, { unit: 's' })).toEqual({
      value: '478.66',
      error: '0.21',
      unit: thin('~s'),
      scale: null,
    })
  })

  test('the error always shows two significant digits and the value as many decimals', () => {
    for (let i = 0; i < 400; i++) {
      const stderr = 10 ** (-3.9 + i / 80)
      const { value, error } = estimateParts({ value: 123.456789, stderr })
      const digits = error!.replace('.', '').replace(/^0+/, '')
      expect(stderr < 9.95 ? digits.length : 2, `${stderr}`).toBe(2)
      expect(value.split('.')[1]?.length ?? 0).toBe(error!.split('.')[1]?.length ?? 0)
      expect(Math.abs(Number(error) - stderr)).toBeLessThanOrEqual(0.05 * stderr + 1e-12)
    }
  })
})

test.each([
  [0, '0~s'],
  [0.0334, '0.033~s'],
  [2.5, '2.5~s'],
  [59.94, '59.9~s'],
  [59.96, '1~min'],
  [1490, '24~min 50~s'],
  [3599.7, '1~h'],
  [3720, '1~h 02~min'],
  [273600, '3~d 4~h'],
  [-90, '−1~min 30~s'],
  [null, ABSENT],
])('formatDuration(%s) is %s', (seconds, expected) => {
  expect(formatDuration(seconds)).toBe(thin(expected))
})

test('formatPeriod has four digits, whole seconds from 1000 s', () => {
  expect(formatPeriod(566.86901645)).toBe(thin('566.9~s'))
  expect(formatPeriod(999.96)).toBe(thin('1000~s'))
  expect(formatPeriod(3.93659)).toBe(thin('3.937~s'))
})

test.each([
  [0.12, '12~%'],
  [0.05, '1 in 20'],
  [0.001, '1 in 1000'],
  [0.00001, '1 in 100~000'],
  [3e-9, '3 × 10⁻⁹'],
  [0, '< 10⁻³⁰⁰'],
])('formatProbability(%d) is %s', (probability, expected) => {
  expect(formatProbability(probability)).toBe(thin(expected))
})

test('formatPercent, formatCount and formatBytes', () => {
  expect(formatPercent(0.934)).toBe(thin('93~%'))
  expect(formatCount(1366)).toBe('1366')
  expect(formatCount(1000000)).toBe(thin('1~000~000'))
  expect(formatBytes(64 * 1024 * 1024)).toBe(thin('64~MB'))
  expect(formatBytes(1536)).toBe(thin('1.5~kB'))
})

test('wrapDegrees stays in [0, 360) even for a rounding-sized negative', () => {
  expect(wrapDegrees(-90)).toBe(270)
  expect(wrapDegrees(720)).toBe(0)
  expect(wrapDegrees(-1e-17)).toBe(0)
})

test('imageScaleArcsecPerPx: 206.264806247 · p · b / F, from 648000/π arc seconds in a radian', () => {
  // The decimals given were computed with the factor cut to 206.264806, which is low by 1.2e-9 relative.
  expect(imageScaleArcsecPerPx({ focalLengthMillimetres: 240, pixelSizeMicrometres: 3.75, binning: 1 })).toBeCloseTo(
    3.22288759375,
    7,
  )
  expect(imageScaleArcsecPerPx({ focalLengthMillimetres: 1000, pixelSizeMicrometres: 2.9, binning: 2 })).toBeCloseTo(
    1.1963358748,
    8,
  )
  expect(imageScaleArcsecPerPx({ focalLengthMillimetres: 0, pixelSizeMicrometres: 2.9, binning: 2 })).toBeNull()
  expect(imageScaleArcsecPerPx({ focalLengthMillimetres: null, pixelSizeMicrometres: 2.9, binning: 2 })).toBeNull()
})

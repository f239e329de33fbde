import { describe, expect, test } from 'vitest'
import { createRandom } from '@/lib/analysis/random'
import {
  fraction,
  lagOneAutocorrelation,
  mean,
  median,
  medianAbsoluteDeviation,
  medianInPlace,
  normaliseDegrees,
  rootMeanSquare,
  roundHalfUp,
  span,
  standardDeviation,
  sum,
  variance,
} from '@/lib/analysis/statistics'
import published from '../reference/published.json'

// NIST StRD, univariate summary statistics: certified mean, standard deviation and lag-one autocorrelation.
describe.each(Object.entries(published.univariate))('NIST StRD %s', (_, set) => {
  test('mean to 14 digits, deviation to 12, lag-one autocorrelation to 1e-12', () => {
    expect(Math.abs(mean(set.data) / set.mean - 1)).toBeLessThan(1e-14)
    expect(Math.abs(standardDeviation(set.data) / set.sd - 1)).toBeLessThan(1e-12)
    expect(Math.abs(lagOneAutocorrelation(set.data) - set.lag1)).toBeLessThan(1e-12)
  })
})

// NIST StRD NumAcc3 and NumAcc4 in the published pattern: an offset, then offset ∓ 0.1 in turn; certified sd 0.1.
test.each([1_000_000.2, 10_000_000.2])('deviation 0.1 about %f (NIST StRD NumAcc3, NumAcc4)', (offset) => {
  const values = [offset, ...Array.from({ length: 1000 }, (_, i) => offset + (i % 2 === 0 ? -0.1 : 0.1))]
  expect(standardDeviation(values)).toBeCloseTo(0.1, 8)
})

test('sum keeps the small terms beside a large one', () => {
  expect(sum([1, 1e100, 1, -1e100])).toBe(2)
})

test('medianInPlace equals the median by sorting for every size from 1 to 200', () => {
  const { uniform } = createRandom(3)
  for (let count = 1; count <= 200; count++) {
    // coarse values, so that ties occur
    const values = Float64Array.from({ length: count }, () => Math.floor(uniform() * 20))
    const sorted = values.slice().sort()
    const expected = (sorted[(count - 1) >> 1] + sorted[count >> 1]) / 2
    expect(medianInPlace(values)).toBe(expected)
  }
})

test('median leaves its input alone', () => {
  const values = [3, 1, 2]
  expect(median(values)).toBe(2)
  expect(values).toEqual([3, 1, 2])
})

test('medianAbsoluteDeviation([1, 1, 2, 2, 4, 6, 9]) is 1', () => {
  expect(medianAbsoluteDeviation([1, 1, 2, 2, 4, 6, 9])).toBe(1)
})

test('nothing, one value and equal values give numbers, never NaN', () => {
  expect([mean([]), variance([]), variance([5]), median([]), span([]), rootMeanSquare([])]).toEqual([0, 0, 0, 0, 0, 0])
  expect(lagOneAutocorrelation([2, 2, 2])).toBe(0)
  expect(rootMeanSquare([3, 4])).toBeCloseTo(Math.sqrt(12.5), 15)
  expect(span([2, -1, 5])).toBe(6)
})

test('rounding is half up, angles lie in [0, 360)', () => {
  expect([2.5, -2.5, 0.49, -0.2].map(roundHalfUp)).toEqual([3, -2, 0, 0])
  expect(fraction(-1e-18)).toBe(0)
  expect(fraction(-0.25)).toBe(0.75)
  expect(normaliseDegrees(-90)).toBe(270)
  expect(normaliseDegrees(720)).toBe(0)
})

import { expect, test } from 'vitest'
import { createRandom, createRandomFromState } from '@/lib/analysis/random'
import checks from '../reference/checks.json'

const take = (count: number, next: () => number) => Array.from({ length: count }, next)

// Blackman & Vigna (2021), xoshiro128** 1.1; first outputs of the authors' C code for the state 1, 2, 3, 4.
test('state (1, 2, 3, 4) gives 11520, 0, 5927040, 70819200', () => {
  expect(take(4, createRandomFromState([1, 2, 3, 4]).nextUint32)).toEqual([11520, 0, 5927040, 70819200])
})

test('seed 12345 gives the reference outputs, uniforms, normals and indices', () => {
  expect(take(6, createRandom(12345).nextUint32)).toEqual(checks.values['16.xoshiro128ss_seed12345_first6'])
  expect(take(3, createRandom(12345).uniform)).toEqual(checks.values['16.uniform53_first3'])
  const { index } = createRandom(12345)
  expect(take(8, () => index(10))).toEqual(checks.values['16.index_below_10_first8'])
  const normals = take(4, createRandom(12345).normal)
  checks.values['16.normal_first4'].forEach((expected, i) => expect(normals[i]).toBeCloseTo(expected, 14))
})

test('normals have mean 0 and variance 1 within four standard errors (N = 20000)', () => {
  const values = take(20_000, createRandom(7).normal)
  const average = values.reduce((a, b) => a + b) / values.length
  const spread = values.reduce((a, b) => a + (b - average) ** 2, 0) / (values.length - 1)
  expect(Math.abs(average)).toBeLessThan(4 / Math.sqrt(20_000))
  expect(Math.abs(spread - 1)).toBeLessThan(4 * Math.sqrt(2 / 20_000))
})

test('a fraction as seed and a state of zeros are refused', () => {
  expect(() => createRandom(0.5)).toThrow(RangeError)
  expect(() => createRandomFromState([0, 0, 0, 0])).toThrow(RangeError)
})

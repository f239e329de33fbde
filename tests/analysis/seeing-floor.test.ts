import { expect, test } from 'vitest'
import { createRandom } from '@/lib/analysis/random'
import { differenceNoise, guidedLoop, secondDifferenceShareOfAr1 } from '@/lib/analysis/seeing-floor'
import checks from '../reference/checks.json'

const times = (count: number, cadence: number) => Float64Array.from({ length: count }, (_, i) => i * cadence)

function noiseOf(timeSeconds: Float64Array, values: Float64Array) {
  const outcome = differenceNoise(timeSeconds, values)
  if (!outcome.ok) throw new Error(outcome.reason)
  return outcome
}

// von Neumann et al. (1941): in white noise every difference estimate is σ; relative error √(3/4N), √(35/36N).
test('white noise of σ = 0.5 reads 0.5 by all four estimates (N = 40000, five standard errors)', () => {
  const { normal } = createRandom(11)
  const values = Float64Array.from({ length: 40_000 }, () => 0.5 * normal())
  const noise = noiseOf(times(40_000, 2.5), values)
  const tolerance = 5 * 0.5 * Math.sqrt(35 / (36 * 40_000)) * 1.3
  for (const sigma of [noise.sigma1, noise.sigma2, noise.sigma3, noise.robust]) {
    expect(Math.abs(sigma - 0.5)).toBeLessThan(tolerance)
  }
})

// A worm of 9″ at 478.69 s, cadence 2.5 s, whole turns so that the rms over phases is exact to the last sample.
test('a worm leaks 0.148″, 0.0028″, 0.00005″ into first, second, third differences', () => {
  const count = 191_476 // 1000 turns of 478.69 s
  const timeSeconds = times(count, 2.5)
  const noise = noiseOf(
    timeSeconds,
    timeSeconds.map((t) => 9 * Math.sin((2 * Math.PI * t) / 478.69)),
  )
  expect(noise.sigma1).toBeCloseTo(checks.values['15.leak_first_9_478.69_2.5'], 5)
  expect(noise.sigma2).toBeCloseTo(checks.values['15.leak_second'], 7)
  expect(noise.sigma3).toBeCloseTo(checks.values['15.leak_third'], 8)
})

test('a jump across a gap does not count', () => {
  const timeSeconds = Float64Array.of(0, 1, 2, 3, 4, 50, 51, 52, 53, 54)
  const noise = noiseOf(timeSeconds, Float64Array.of(0, 0, 0, 0, 0, 99, 99, 99, 99, 99))
  expect([noise.sigma1, noise.sigma2, noise.sigma3, noise.robust]).toEqual([0, 0, 0, 0])
  expect(noise.count).toBe(6)
})

test('three samples are too few', () => {
  expect(differenceNoise(Float64Array.of(0, 1, 2), Float64Array.of(0, 1, 0))).toEqual({
    ok: false,
    reason: 'few-points',
    needed: 4,
    got: 3,
  })
})

test('AR(1) noise reads low by √((1 − r)(3 − r)/3)', () => {
  expect(secondDifferenceShareOfAr1(0.2)).toBeCloseTo(checks.values['15.sigma2_over_sigma_r0.2'], 12)
  expect(secondDifferenceShareOfAr1(0.6)).toBeCloseTo(checks.values['15.sigma2_over_sigma_r0.6'], 12)
  expect(secondDifferenceShareOfAr1(0.9)).toBeCloseTo(checks.values['15.sigma2_over_sigma_r0.9'], 12)
})

test.each([
  [0.2, checks.values['15.loop_r1_gain0.2'], checks.values['15.loop_rms_factor_gain0.2']],
  [0.5, checks.values['15.loop_r1_gain0.5'], checks.values['15.loop_rms_factor_gain0.5']],
  [1.3, checks.values['15.loop_r1_gain1.3'], checks.values['15.loop_rms_factor_gain1.3']],
])('a guiding loop of gain %f', (gain, lagOne, factor) => {
  expect(guidedLoop(gain).lagOneCorrelation).toBeCloseTo(lagOne, 14)
  expect(guidedLoop(gain).rmsFactor).toBeCloseTo(factor, 12)
})

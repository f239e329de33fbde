import { describe, expect, test } from 'vitest'
import { falseAlarmProbability, powerAtFalseAlarm, timeVariance } from '@/lib/analysis/false-alarm'
import {
  gridFrequencies,
  lineAt,
  lombScargleDirect,
  normalisations,
  prepareLombScargle,
  searchGrid,
  type LombScargleInput,
} from '@/lib/analysis/lomb-scargle'
import { lombScargle, lombScargleFast } from '@/lib/analysis/lomb-scargle-fast'
import { createRandom } from '@/lib/analysis/random'
import gls from '../reference/gls.json'
import jointfit from '../reference/jointfit.json'
import checks from '../reference/checks.json'

const timeSeconds = Float64Array.from(gls.t)
const values = Float64Array.from(gls.y)
const stderr = Float64Array.from(gls.dy)

function prepared(input: LombScargleInput) {
  const outcome = prepareLombScargle(input)
  if (!outcome.ok) throw new Error(outcome.reason)
  return outcome
}

const cases = [
  { name: 'with errors', errors: stderr as Float64Array | null, expected: gls.with_dy },
  { name: 'without errors', errors: null, expected: gls.no_dy },
]

// Zechmeister & Kürster (2009); reference powers by astropy's LombScargle ('slow') and by weighted least squares.
describe.each(cases)('floating mean, $name', ({ errors, expected }) => {
  const problem = prepared({ timeSeconds, values, stderr: errors, polynomialDegree: 0 })

  test('powers of 50 frequencies in four normalisations', () => {
    gls.f.forEach((frequency, j) => {
      const powers = normalisations(lineAt(problem, frequency).power, problem)
      expect(Math.abs(powers.standard - expected.standard[j])).toBeLessThan(1e-9)
      expect(Math.abs(powers.model / expected.model[j] - 1)).toBeLessThan(1e-8)
      expect(Math.abs(powers.log / expected.log[j] - 1)).toBeLessThan(1e-8)
      expect(Math.abs(powers.psd / expected.psd[j] - 1)).toBeLessThan(1e-8)
    })
  })

  test('coefficients, turned from the middle of the run to its start', () => {
    gls.f.forEach((frequency, j) => {
      const { cosArcsec, sinArcsec } = lineAt(problem, frequency)
      const angle = -2 * Math.PI * frequency * problem.middleSeconds
      const [, a, b] = expected.coef_c_a_b[j]
      expect(cosArcsec * Math.cos(angle) + sinArcsec * Math.sin(angle)).toBeCloseTo(a, 8)
      expect(sinArcsec * Math.cos(angle) - cosArcsec * Math.sin(angle)).toBeCloseTo(b, 8)
    })
  })

  test('variance about the mean and χ² of the constant', () => {
    expect(problem.residualVariance).toBeCloseTo(expected.YY_weighted_variance, 11)
    expect(problem.residualVariance * problem.weightSum).toBeCloseTo(expected.chi2_constant, 7)
  })

  // Baluev (2008), with the same formula and astropy's implementation as reference.
  test('false-alarm probabilities up to 1/16 Hz', () => {
    const weights = errors === null ? null : problem.weights
    const search = {
      sampleCount: 300,
      polynomialDegree: 0,
      bandHz: gls.fmax,
      timeVariance: timeVariance(timeSeconds, weights),
    }
    expect(gls.fmax * Math.sqrt(4 * Math.PI * search.timeVariance)).toBeCloseTo(expected.W, 8)
    for (const { power_standard, fap_baluev } of expected.fap) {
      expect(Math.abs(falseAlarmProbability(power_standard, search) / fap_baluev - 1)).toBeLessThan(1e-10)
    }
  })
})

test('the printed Monte Carlo check: 10000 white series reach P = 0.07 in 1.75 %, the formula says 1.7416 %', () => {
  const search = { sampleCount: 300, polynomialDegree: 0, bandHz: gls.fmax, timeVariance: timeVariance(timeSeconds) }
  expect(falseAlarmProbability(0.05, search)).toBeCloseTo(checks.values['6.fap_baluev_N300_P0.05'], 11)
  expect(falseAlarmProbability(0.07, search)).toBeCloseTo(checks.values['6.fap_baluev_N300_P0.07'], 11)
})

test('powerAtFalseAlarm is the inverse of falseAlarmProbability', () => {
  const search = { sampleCount: 800, polynomialDegree: 2, bandHz: 0.2, timeVariance: 2000 ** 2 / 12 }
  for (const probability of [0.1, 1e-3, 1e-6, 1e-12]) {
    const power = powerAtFalseAlarm(probability, search)
    expect(falseAlarmProbability(power, search) / probability).toBeCloseTo(1, 9)
  }
})

test('false alarm: no power is certain, full power impossible, three samples say nothing', () => {
  const search = { sampleCount: 300, polynomialDegree: 1, bandHz: 0.2, timeVariance: 1e6 }
  expect(falseAlarmProbability(0, search)).toBe(1)
  expect(falseAlarmProbability(1, search)).toBeLessThan(1e-300)
  expect(falseAlarmProbability(0.5, { ...search, sampleCount: 4 })).toBe(1)
})

describe('polynomial form, degree 2, on the reference run with drift', () => {
  const problem = prepared({
    timeSeconds: Float64Array.from(jointfit.t),
    values: Float64Array.from(jointfit.y),
    polynomialDegree: 2,
  })

  test.each([
    [478.79, checks.values['6.gls_poly2_power_f1_478.79']],
    [61.3, checks.values['6.gls_poly2_power_f1_61.3']],
    [100, checks.values['6.gls_poly2_power_f1_100']],
    [900, checks.values['6.gls_poly2_power_f1_900']],
  ])('P(1/%f s)', (period, expected) => {
    expect(Math.abs(lineAt(problem, 1 / period).power - expected)).toBeLessThan(1e-9)
  })

  test('any parabola added to the values leaves the power as it is', () => {
    const bent = prepared({
      timeSeconds: Float64Array.from(jointfit.t),
      values: Float64Array.from(jointfit.y, (y, i) => y + 30 - 0.7 * jointfit.t[i] + 2e-4 * jointfit.t[i] ** 2),
      polynomialDegree: 2,
    })
    for (const period of [478.79, 239, 61.3]) {
      expect(lineAt(bent, 1 / period).power).toBeCloseTo(lineAt(problem, 1 / period).power, 10)
    }
  })
})

describe('grids', () => {
  const duration = timeSeconds[timeSeconds.length - 1] - timeSeconds[0]
  const grid = searchGrid(duration, gls.fmax)

  test('searchGrid runs from 1/T in steps of 1/(10T) up to the limit', () => {
    const frequencies = gridFrequencies(grid)
    expect(frequencies[0]).toBeCloseTo(1 / duration, 15)
    expect(frequencies[1] - frequencies[0]).toBeCloseTo(1 / (10 * duration), 15)
    expect(frequencies[grid.count - 1]).toBeLessThanOrEqual(gls.fmax)
    expect(frequencies[grid.count - 1] + grid.stepHz).toBeGreaterThan(gls.fmax)
    expect(searchGrid(100, 1e-3).count).toBe(0)
  })

  test.each([0, 1, 2, 3])('direct and fast powers equal the slow form (degree %i, with errors)', (polynomialDegree) => {
    const problem = prepared({ timeSeconds, values, stderr, polynomialDegree })
    const slow = gridFrequencies(grid).map((frequency) => lineAt(problem, frequency).power)
    const direct = lombScargleDirect(problem, grid)
    const fast = lombScargleFast(problem, grid)
    let [worstDirect, worstFast, isSame] = [0, 0, true]
    slow.forEach((power, j) => {
      worstDirect = Math.max(worstDirect, Math.abs(direct[j] - power))
      worstFast = Math.max(worstFast, Math.abs(fast[j] - power))
      isSame &&= fast[j] === direct[j]
    })
    expect(worstDirect).toBeLessThan(1e-11)
    expect(worstFast).toBeLessThan(1e-8)
    expect(isSame).toBe(false) // the fast form is not the direct one under another name
  })

  test('lombScargle finds the line in a long even run with a gap', () => {
    const { normal } = createRandom(9)
    const time = Float64Array.from({ length: 4000 }, (_, i) => 2 * i).filter((t) => t < 3000 || t > 3500)
    const problem = prepared({ timeSeconds: time, values: time.map((t) => 2 * Math.sin(t / 20) + 0.01 * t + normal()) })
    const longGrid = searchGrid(time[time.length - 1], 0.25)
    const power = lombScargle(problem, longGrid)
    const peak = power.reduce((best, p, j) => (p > power[best] ? j : best), 0)
    expect(Math.abs(gridFrequencies(longGrid)[peak] - 1 / (40 * Math.PI))).toBeLessThan(longGrid.stepHz)
    expect(power[peak]).toBeCloseTo(lineAt(problem, gridFrequencies(longGrid)[peak]).power, 8)
  })
})

test('refusals: nine samples; a straight line has nothing left for a line; a zero error', () => {
  const time = Float64Array.from({ length: 12 }, (_, i) => i)
  expect(prepareLombScargle({ timeSeconds: time.slice(0, 9), values: time.slice(0, 9) })).toEqual({
    ok: false,
    reason: 'few-points',
    needed: 10,
    got: 9,
  })
  expect(prepareLombScargle({ timeSeconds: time, values: time.map((t) => 3 * t + 1) })).toMatchObject({
    reason: 'singular',
  })
  expect(prepareLombScargle({ timeSeconds: time, values: time.map((t) => t * t), stderr: time })).toMatchObject({
    reason: 'not-finite',
  })
})

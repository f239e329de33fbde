import { beforeAll, describe, expect, test } from 'vitest'
import { CliFault } from '@/lib/cli/cli-fault'
import { coverageNoise, type CoverageNoise } from '@/lib/cli/coverage-noise'
import {
  countWithin,
  COVERAGE_CELLS,
  COVERAGE_QUANTITIES,
  HALF_WIDTH_68,
  HALF_WIDTH_95,
  measureCoverage,
  type CoverageDistances,
} from '@/lib/cli/measure-coverage'
import { coverageTable, parseCoverageOptions } from '@/lib/cli/run-coverage'

const RUNS = 50
const promised = COVERAGE_CELLS.filter(({ isPromised }) => isPromised)

/** What is promised of many runs: intervals of 68 % hold the truth in 63 to 75 %, those of 95 % in 91 to 98 %. */
const PROMISE = [
  { halfWidth: HALF_WIDTH_68, least: 0.63, most: 0.75 },
  { halfWidth: HALF_WIDTH_95, least: 0.91, most: 0.98 },
]

/**
 * Each bound is passed by chance with this probability when the share is just at the edge of what is promised. There are
 * 27 + 27 bounds of single cells and 12 of all cells together: seeds drawn anew would fail in fewer than 1 of 150 cases.
 */
const FALSE_ALARM = 1e-4

/** Probability of exactly k of n, by its logarithm so that nothing underflows on the way. */
function binomial(k: number, n: number, share: number): number {
  let logarithm = k * Math.log(share) + (n - k) * Math.log1p(-share)
  for (let i = 1; i <= k; i++) logarithm += Math.log((n - k + i) / i)
  return Math.exp(logarithm)
}

/** The largest count whose lower tail, itself left out, is at most `alarm`. */
function lowestFair(n: number, share: number, alarm: number): number {
  let tail = 0
  for (let k = 0; k <= n; k++) {
    tail += binomial(k, n, share)
    if (tail > alarm) return k
  }
  return n
}

function highestFair(n: number, share: number, alarm: number): number {
  return n - lowestFair(n, 1 - share, alarm)
}

/** What is amiss with the measured distances if each standard error were multiplied by `errorFactor`. */
function faults(measured: CoverageDistances[], errorFactor = 1): string[] {
  return COVERAGE_QUANTITIES.flatMap((quantity) =>
    PROMISE.flatMap(({ halfWidth, least, most }) => {
      const counts = measured.map((distances) => countWithin(distances[quantity], errorFactor * halfWidth))
      const total = counts.reduce((sum, count) => sum + count, 0)
      const all = RUNS * counts.length
      const single = counts.flatMap((count, i) =>
        count < lowestFair(RUNS, least, FALSE_ALARM)
          ? [`${quantity}, ${promised[i].name}, ${promised[i].turns} turns: ${count} of ${RUNS}`]
          : [],
      )
      const isFair = total >= lowestFair(all, least, FALSE_ALARM) && total <= highestFair(all, most, FALSE_ALARM)
      return isFair ? single : [...single, `${quantity}: ${total} of ${all} within ${halfWidth.toFixed(2)} errors`]
    }),
  )
}

describe('intervals hold the truth as often as they say', () => {
  let measured: CoverageDistances[] = []
  // Some 15 s of computing; a busy machine may take many times that.
  beforeAll(() => {
    measured = promised.map((cell) => measureCoverage(cell, RUNS))
  }, 600_000)

  test('white and correlated noise, 3, 4 and 8 turns, 50 runs each', () => {
    expect(faults(measured)).toEqual([])
  })

  // The judge itself: with errors that are wrong by half, in either direction, it must not be content with any quantity.
  test.each([0.5, 2])('errors multiplied by %f would be found out, each of them', (factor) => {
    const found = faults(measured, factor)
    for (const quantity of COVERAGE_QUANTITIES) {
      expect(found.filter((fault) => fault.startsWith(`${quantity}: `)).length).toBeGreaterThan(0)
    }
  })
})

describe('the bounds', () => {
  test('tails of the binomial distribution, by hand', () => {
    // (1/2)^3 · (1, 3, 3, 1)
    expect([0, 1, 2, 3].map((k) => binomial(k, 3, 0.5))).toEqual(
      [0.125, 0.375, 0.375, 0.125].map((p) => expect.closeTo(p, 14)),
    )
    expect(lowestFair(3, 0.5, 0.1)).toBe(0)
    expect(lowestFair(3, 0.5, 0.125001)).toBe(1)
    expect(highestFair(3, 0.5, 0.1)).toBe(3)
    expect(highestFair(3, 0.5, 0.125001)).toBe(2)
  })
})

describe('noise', () => {
  const COUNT = 20_000

  function lagCorrelation(values: Float64Array, lag: number): number {
    let [products, squares] = [0, 0]
    values.forEach((value, i) => {
      squares += value * value
      if (i >= lag) products += value * values[i - lag]
    })
    return products / squares
  }

  // Variance 1; correlation by definition: r, (1 − w)·r, and for the filter’s power law d/(1 − d), d = α/2
  // (Hosking 1981, Biometrika 68, 165). Bounds: four standard errors or more of 20 000 such samples, which are far larger for slow noise.
  test.each<[CoverageNoise, number, number, number]>([
    [{ kind: 'ar1', lagOne: 0 }, 0, 0.04, 0.03],
    [{ kind: 'ar1', lagOne: 0.6 }, 0.6, 0.06, 0.03],
    [{ kind: 'ar1', lagOne: 0.9 }, 0.9, 0.13, 0.02],
    [{ kind: 'mixture', whiteShare: 0.36, lagOne: 0.95 }, 0.64 * 0.95, 0.13, 0.06],
    [{ kind: 'power-law', exponent: 2 / 3 }, 0.5, 0.22, 0.08],
  ])('%j has variance 1 and its correlation', (noise, lagOne, varianceBound, correlationBound) => {
    const values = coverageNoise(noise, COUNT, 7)
    const variance = values.reduce((sum, value) => sum + value * value, 0) / COUNT
    expect(Math.abs(variance - 1)).toBeLessThan(varianceBound)
    expect(Math.abs(lagCorrelation(values, 1) - lagOne)).toBeLessThan(correlationBound)
  })

  test('equal seeds give equal noise, others do not', () => {
    const noise: CoverageNoise = { kind: 'ar1', lagOne: 0.6 }
    expect(coverageNoise(noise, 30, 5)).toEqual(coverageNoise(noise, 30, 5))
    expect(coverageNoise(noise, 30, 5)).not.toEqual(coverageNoise(noise, 30, 6))
  })
})

describe('the command', () => {
  test.each([
    [[], { runs: 1000, isHelp: false }],
    [['--runs', '200'], { runs: 200, isHelp: false }],
    [['--help'], { runs: 1000, isHelp: true }],
  ])('%j', (argv, options) => {
    expect(parseCoverageOptions(argv)).toEqual(options)
  })

  test.each([
    [['--runs', '0'], '--runs takes a whole number from 1 to 100000: got “0”'],
    [['--runs', '1.5'], 'got “1.5”'],
    [['--runs', '100001'], 'got “100001”'],
    [['--runs'], 'argument missing'],
    [['--turns', '3'], "Unknown option '--turns'"],
    [['200'], 'Unexpected argument'],
  ])('%j is refused', (argv, told) => {
    const parse = () => parseCoverageOptions(argv)
    expect(parse).toThrow(CliFault)
    expect(parse).toThrow(told)
  })

  test('a row for each kind of noise, in percent', () => {
    const distances = (...values: number[]) => ({
      period: Float64Array.from(values),
      amplitude: Float64Array.from(values),
      drift: Float64Array.from(values),
    })
    const measured = COVERAGE_CELLS.slice(0, 3).map((cell) => ({ cell, distances: distances(0.5, 1.5, 2.5, Infinity) }))
    const [head, rule, row] = coverageTable(measured, 4).split('\n')
    expect(head).toBe('| noise, 3 · 4 · 8 turns | period | amplitude of order 1 | drift |')
    expect(rule).toBe('| --- | --- | --- | --- |')
    const cells = '25/50 · 25/50 · 25/50'
    expect(row).toBe(`| white | ${cells} | ${cells} | ${cells} |`)
  })
})

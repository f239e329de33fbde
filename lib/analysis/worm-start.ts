import { averageBlocks } from './block-average'
import { amplitudeError, autoregressiveCovariance } from './fit-covariance'
import { driftColumns, centreTime, wormColumns } from './fit-columns'
import { fitJointly } from './joint-fit'
import { compressProblem, factorQr, solveLeastSquares } from './least-squares'
import { lineAt, prepareLombScargle, searchGrid } from './lomb-scargle'
import { lombScargle } from './lomb-scargle-fast'
import { firstOrders, informationCriterion } from './model-choice'
import { correctLagOne, effectiveSampleCount, lagOneCorrelation } from './noise-model'
import type { Failure, Track } from './types'

export interface PeriodSearch {
  track: Track
  cadenceSeconds: number
  highestFrequencyHz: number
  /** Of the polynomial that is fitted together with each frequency. */
  driftDegree: number
  /** Only frequencies in this interval, e.g. round a gear's own. */
  withinHz?: [number, number]
}

/** Longest record that is searched sample by sample; longer ones as block means. */
const SEARCHED_SAMPLE_COUNT = 4000

/**
 * Frequency of the highest peak of the generalised Lomb–Scargle periodogram with a polynomial in every fit: the one-line
 * joint fit. From 1/T to the limit, on a grid of 1/(10T), refined by golden section on the defining sums.
 *
 * @returns hertz, or `few-points`, `singular` (nothing but a polynomial), `no-period` (no frequency in the range)
 */
export function findStrongestPeriod(search: PeriodSearch): { ok: true; frequencyHz: number; power: number } | Failure {
  const { cadenceSeconds, driftDegree, withinHz } = search
  const size = Math.ceil(search.track.timeSeconds.length / SEARCHED_SAMPLE_COUNT)
  const track = size > 1 ? averageBlocks(search.track, { size, cadenceSeconds }).track : search.track
  const { timeSeconds, raArcsec } = track
  const problem = prepareLombScargle({ timeSeconds, values: raArcsec, polynomialDegree: driftDegree })
  if (!problem.ok) return problem
  const span = timeSeconds[timeSeconds.length - 1] - timeSeconds[0]
  const limit = Math.min(search.highestFrequencyHz, size > 1 ? 1 / (4 * size * cadenceSeconds) : Infinity)
  const grid = searchGrid(span, Math.min(limit, withinHz?.[1] ?? Infinity))
  if (withinHz) {
    const first = Math.max(grid.firstIndex, Math.ceil(withinHz[0] / grid.stepHz))
    grid.count -= first - grid.firstIndex
    grid.firstIndex = first
  }
  if (grid.count < 1) return { ok: false, reason: 'no-period' }
  const powers = lombScargle(problem, grid)
  let best = 0
  for (let j = 1; j < grid.count; j++) if (powers[j] > powers[best]) best = j
  if (!(powers[best] > 0)) return { ok: false, reason: 'no-period' }
  const middle = (grid.firstIndex + best) * grid.stepHz
  const frequencyHz = refine((f) => lineAt(problem, f).power, middle - grid.stepHz, middle + grid.stepHz)
  return { ok: true, frequencyHz, power: lineAt(problem, frequencyHz).power }
}

function refine(power: (f: number) => number, low: number, high: number): number {
  const golden = (Math.sqrt(5) - 1) / 2
  let [a, b] = [low, high]
  for (let i = 0; i < 24; i++) {
    const c = b - golden * (b - a)
    const d = a + golden * (b - a)
    if (power(c) > power(d)) b = d
    else a = c
  }
  return (a + b) / 2
}

/**
 * Whether the strongest swing is the m-th harmonic of a slower worm (m = 2, 3): fits at m times the period, with up to
 * 4m harmonics, against those at the period itself with up to 4. Taken when BIC falls by more than 2 and an order that
 * is no multiple of m has an amplitude of at least 5 AR(1) standard errors.
 *
 * @returns m, or 1 where the strongest swing is the fundamental
 */
export function findSubharmonic(options: {
  track: Track
  cadenceSeconds: number
  highestFrequencyHz: number
  driftDegree: number
  frequencyHz: number
}): 1 | 2 | 3 {
  const { track, frequencyHz } = options
  const span = track.timeSeconds[track.timeSeconds.length - 1] - track.timeSeconds[0]
  let best: { factor: 1 | 2 | 3; fall: number } = { factor: 1, fall: 2 }
  for (const factor of [2, 3] as const) {
    if ((span * frequencyHz) / factor < 3) continue
    const fall = criterionFall(options, factor)
    if (fall > best.fall) best = { factor, fall }
  }
  return best.factor
}

/** By how much BIC falls with the slower fundamental, −∞ where none of its own orders stands out. */
function criterionFall(options: Parameters<typeof findSubharmonic>[0], factor: 2 | 3): number {
  const { track, cadenceSeconds, driftDegree, frequencyHz, highestFrequencyHz } = options
  const sampleCount = track.timeSeconds.length
  const slowHz = frequencyHz / factor
  const largest = Math.min(4 * factor, Math.floor(highestFrequencyHz / slowHz))
  const fit = fitJointly({
    track,
    driftDegree,
    worm: { orders: firstOrders(largest), frequencyHz: slowHz, isFree: false },
    lines: [],
    highestFrequencyHz,
    isPolished: false,
  })
  if (!fit.ok) return -Infinity
  const lagOne = lagOneCorrelation(track.timeSeconds, fit.residual, cadenceSeconds)
  const corrected = correctLagOne(lagOne, sampleCount, fit.parameterCount)
  const effectiveCount = effectiveSampleCount(sampleCount, corrected)
  const qr = factorQr(fit.jacobian)
  if (!qr.ok) return -Infinity
  const covariance = autoregressiveCovariance({
    fit,
    qr,
    timeSeconds: track.timeSeconds,
    cadenceSeconds,
    lagOne: corrected,
  })
  const stands = firstOrders(largest).some((order) => {
    const column = driftDegree + 1 + 2 * (order - 1)
    const [a, b] = [fit.coefficients[column], fit.coefficients[column + 1]]
    return order % factor !== 0 && Math.hypot(a, b) >= 5 * amplitudeError(a, b, covariance, column)
  })
  if (!stands) return -Infinity
  const time = centreTime(track.timeSeconds)
  const smallest = (hertz: number, count: number) => {
    const columns = [...driftColumns(time, driftDegree), ...wormColumns(time.offsetSeconds, hertz, firstOrders(count))]
    const compressed = compressProblem(columns, track.raArcsec)
    if (!Array.isArray(compressed)) return Infinity
    const values = compressed[compressed.length - 1]
    let lowest = Infinity
    for (let k = 1; k <= count; k++) {
      const parameterCount = driftDegree + 1 + 2 * k
      const solution = solveLeastSquares(compressed.slice(0, parameterCount), values)
      if (!solution.ok || !(solution.rss > 0)) continue
      lowest = Math.min(
        lowest,
        informationCriterion({ rss: solution.rss, sampleCount, effectiveCount, parameterCount }),
      )
    }
    return lowest
  }
  return smallest(frequencyHz, Math.min(4, Math.floor(highestFrequencyHz / frequencyHz))) - smallest(slowHz, largest)
}

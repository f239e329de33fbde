import { SIDEREAL_RATE_ARCSEC_PER_SECOND } from './constants'
import { curveExtrema, harmonicValue, shiftHarmonics, steepestPoint } from './harmonic-curve'
import type { HarmonicCoefficients, RateResult } from './types'

export interface RateDemandInput {
  /** Empty without a worm figure. */
  harmonics: readonly HarmonicCoefficients[]
  periodSeconds: number
  driftArcsecPerSecond: number
  lines: readonly { amplitudeArcsec: number; frequencyHz: number }[]
  /** Peak motion that a picture tolerates, on the sky. */
  toleranceSkyArcsec: number
  /** Null: the tolerance counts on the axis. */
  declinationDegrees: number | null
  pictureExposureSeconds: number
}

/** How fast the error changes and what follows for guiding and for unguided pictures. */
export function rateDemand(input: RateDemandInput): RateResult {
  const { harmonics, periodSeconds, driftArcsecPerSecond, lines, toleranceSkyArcsec, declinationDegrees } = input
  const cosDeclination = declinationDegrees === null ? 1 : Math.cos((declinationDegrees * Math.PI) / 180)
  const toleranceAxisArcsec = toleranceSkyArcsec / cosDeclination
  const steepest = (Math.abs(steepestPoint(harmonics).value) * 2 * Math.PI) / periodSeconds
  const lineRate = lines.reduce((total, line) => total + 2 * Math.PI * line.amplitudeArcsec * line.frequencyHz, 0)
  return {
    steepestArcsecPerSecond: steepest,
    steepestWithDriftArcsecPerSecond: steepest + Math.abs(driftArcsecPerSecond) + lineRate,
    percentOfSidereal: (100 * steepest) / SIDEREAL_RATE_ARCSEC_PER_SECOND,
    longestCorrectionIntervalSeconds: longestInterval(input, toleranceAxisArcsec),
    framesKeptShare: shareOfFramesKept({ ...input, toleranceArcsec: toleranceAxisArcsec }),
    toleranceAxisArcsec,
  }
}

/**
 * Smallest h at which max_t |e(t + h) − e(t)| reaches the tolerance, in seconds: the worm's part exactly (the
 * difference of two harmonic curves is one itself), drift and lines added in the worst case. Null when a whole turn
 * stays within it. For one line it is (P/π)·asin(q/(2A)).
 */
export function longestInterval(
  input: Pick<RateDemandInput, 'harmonics' | 'periodSeconds' | 'driftArcsecPerSecond' | 'lines'>,
  toleranceArcsec: number,
): number | null {
  const { harmonics, periodSeconds, driftArcsecPerSecond, lines } = input
  const motion = (h: number) => {
    const moved = shiftHarmonics(harmonics, (2 * Math.PI * h) / periodSeconds)
    const difference = moved.map((harmonic, i) => ({
      order: harmonic.order,
      cosArcsec: harmonic.cosArcsec - harmonics[i].cosArcsec,
      sinArcsec: harmonic.sinArcsec - harmonics[i].sinArcsec,
    }))
    const { highest, lowest } = curveExtrema(difference)
    const lineMotion = lines.reduce(
      (total, { amplitudeArcsec, frequencyHz }) =>
        total + 2 * amplitudeArcsec * Math.sin(Math.PI * Math.min(0.5, frequencyHz * h)),
      0,
    )
    return Math.max(highest.value, -lowest.value) + Math.abs(driftArcsecPerSecond) * h + lineMotion
  }
  const steepest = (Math.abs(steepestPoint(harmonics).value) * 2 * Math.PI) / periodSeconds
  const lineRate = lines.reduce((total, line) => total + 2 * Math.PI * line.amplitudeArcsec * line.frequencyHz, 0)
  const fastest = steepest + Math.abs(driftArcsecPerSecond) + lineRate
  if (!(fastest > 0)) return null
  // No motion is faster than the steepest rate, so the answer is not below tolerance/rate.
  let low = toleranceArcsec / fastest
  if (low > periodSeconds) return null
  if (motion(low) >= toleranceArcsec) return low
  let high = low
  const step = Math.max(0.05 * low, periodSeconds / 300)
  while (motion(high) < toleranceArcsec) {
    if (high >= periodSeconds) return null
    low = high
    high = Math.min(high + step, periodSeconds)
  }
  for (let iteration = 0; iteration < 60 && high - low > 1e-13 * high; iteration++) {
    const middle = (low + high) / 2
    if (motion(middle) < toleranceArcsec) low = middle
    else high = middle
  }
  return (low + high) / 2
}

/** Phases at which an exposure may start, per turn. */
const PHASES_PER_TURN = 7200
const LARGEST_SCAN = 2_000_000

/**
 * Share of worm phases at which an exposure may start so that the error, drift included, spans no more than the
 * tolerance while it lasts.
 */
export function shareOfFramesKept(options: {
  harmonics: readonly HarmonicCoefficients[]
  periodSeconds: number
  driftArcsecPerSecond: number
  pictureExposureSeconds: number
  toleranceArcsec: number
}): number {
  const { harmonics, periodSeconds, driftArcsecPerSecond, pictureExposureSeconds, toleranceArcsec } = options
  if (harmonics.length === 0) {
    return Math.abs(driftArcsecPerSecond) * pictureExposureSeconds <= toleranceArcsec ? 1 : 0
  }
  const turns = pictureExposureSeconds / periodSeconds
  const phases = Math.max(360, Math.min(PHASES_PER_TURN, Math.floor(LARGEST_SCAN / (1 + turns))))
  const cells = turns * phases
  const whole = Math.floor(cells)
  const error = (position: number) =>
    harmonicValue(harmonics, (2 * Math.PI * position) / phases) +
    (driftArcsecPerSecond * periodSeconds * position) / phases
  const values = Float64Array.from({ length: phases + whole }, (_, i) => error(i))
  const highest = slidingExtreme(values, whole + 1, 1)
  const lowest = slidingExtreme(values, whole + 1, -1)
  let kept = 0
  for (let start = 0; start < phases; start++) {
    const end = error(start + cells)
    const motion = Math.max(highest[start], end) - Math.min(lowest[start], end)
    if (motion <= toleranceArcsec) kept++
  }
  return kept / phases
}

/** Maximum (sign 1) or minimum (sign −1) of every window of `width` values, by a queue of candidates. */
function slidingExtreme(values: Float64Array, width: number, sign: 1 | -1): Float64Array {
  const result = new Float64Array(values.length - width + 1)
  const queue = new Int32Array(values.length)
  let head = 0
  let tail = 0
  for (let i = 0; i < values.length; i++) {
    while (tail > head && sign * values[queue[tail - 1]] <= sign * values[i]) tail--
    queue[tail++] = i
    if (queue[head] <= i - width) head++
    if (i >= width - 1) result[i - width + 1] = values[queue[head]]
  }
  return result
}

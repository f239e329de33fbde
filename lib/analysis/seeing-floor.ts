import { failure } from './failure'
import { medianCadence } from './sampling'
import { medianInPlace } from './statistics'
import type { Failure } from './types'

export interface DifferenceNoise {
  ok: true
  /** From first, second and third differences, in the unit of the values. */
  sigma1: number
  sigma2: number
  sigma3: number
  /** From the median of the second differences' size; strays do not raise it. 0 for values on a coarse grid. */
  robust: number
  /** Second differences used. */
  count: number
}

/** median |second difference| · this = σ of Gaussian noise: 1.4826022185/√6. */
const ROBUST_SECOND_DIFFERENCE_FACTOR = 0.6052698211428428

/** Samples whose spacing differs from the median cadence by more than this share take no part. */
const SPACING_TOLERANCE = 0.2

/**
 * Noise per sample from differences of neighbours, which slow motion hardly enters: σ₁ = rms(Δx)/√2,
 * σ₂ = rms(Δ²x)/√6, σ₃ = rms(Δ³x)/√20. A swing A sin(2πt/P) leaks A sin x, (2/√3) A sin² x and 8 A sin³ x/√40 into
 * them, x = πΔ/P. Valid for noise that is independent from frame to frame; correlated noise reads low.
 *
 * @returns `few-points` when not even one group of four evenly spaced neighbours exists
 * @see von Neumann, Kent, Bellinson & Hart (1941), Ann. Math. Stat. 12, 153
 */
export function differenceNoise(timeSeconds: Float64Array, values: Float64Array): DifferenceNoise | Failure {
  const cadence = medianCadence(timeSeconds)
  const longest = cadence * (1 + SPACING_TOLERANCE)
  const shortest = cadence * (1 - SPACING_TOLERANCE)
  const secondDifferences = new Float64Array(Math.max(0, values.length - 2))
  const counts = [0, 0, 0]
  const squares = [0, 0, 0]
  let run = 0 // evenly spaced intervals that end at sample i
  for (let i = 1; i < values.length; i++) {
    const spacing = timeSeconds[i] - timeSeconds[i - 1]
    run = spacing >= shortest && spacing <= longest ? run + 1 : 0
    if (run >= 1) {
      squares[0] += (values[i] - values[i - 1]) ** 2
      counts[0]++
    }
    if (run >= 2) {
      const second = values[i] - 2 * values[i - 1] + values[i - 2]
      squares[1] += second * second
      secondDifferences[counts[1]++] = Math.abs(second)
    }
    if (run >= 3) {
      squares[2] += (values[i] - 3 * values[i - 1] + 3 * values[i - 2] - values[i - 3]) ** 2
      counts[2]++
    }
  }
  if (counts[2] === 0) return failure('few-points', { needed: 4, got: values.length })
  return {
    ok: true,
    sigma1: Math.sqrt(squares[0] / (2 * counts[0])),
    sigma2: Math.sqrt(squares[1] / (6 * counts[1])),
    sigma3: Math.sqrt(squares[2] / (20 * counts[2])),
    robust: ROBUST_SECOND_DIFFERENCE_FACTOR * medianInPlace(secondDifferences.subarray(0, counts[1])),
    count: counts[1],
  }
}

/** σ₂/σ in AR(1) noise of lag-one correlation r, √((1 − r)(3 − r)/3): how far the floor reads low there. */
export function secondDifferenceShareOfAr1(lagOneCorrelation: number): number {
  return Math.sqrt(((1 - lagOneCorrelation) * (3 - lagOneCorrelation)) / 3)
}

/** A floor measured over residuals whose lag-one correlation exceeds this is only a lower bound. */
export const LOWER_BOUND_CORRELATION = 0.2

/**
 * A guiding loop that takes out the share g of each measured error before the next frame, in white measuring noise:
 * its record has lag-one correlation −g/2 and rms σ√(2/(2 − g)).
 */
export function guidedLoop(gain: number): { lagOneCorrelation: number; rmsFactor: number } {
  return { lagOneCorrelation: -gain / 2, rmsFactor: Math.sqrt(2 / (2 - gain)) }
}

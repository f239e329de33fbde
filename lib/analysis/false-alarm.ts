import { gammaRatio } from './special-functions'
import { sumOfSquaredDeviations } from './statistics'

export interface FalseAlarmSearch {
  /** N. */
  sampleCount: number
  /** d of the polynomial in the null model; 0 for a floating mean. */
  polynomialDegree: number
  /** Searched band, highest minus lowest frequency (the highest alone when the search starts near 0). */
  bandHz: number
  /** Weighted variance of the sample times, s². */
  timeVariance: number
}

/**
 * Probability that the highest peak of white noise in the band reaches the standard power P, Baluev's bound for the
 * generalised periodogram: 1 − (1 − single)·e^{−τ} with single = (1 − P)^{N_K/2},
 * τ = γ W (1 − P)^{(N_K − 1)/2} √(N_H P/2), W = band·√(4π var t), N_H = N − 1 − d, N_K = N_H − 2. Other normalisations
 * are monotone in P: convert first. In correlated noise it is far too small.
 *
 * @param power standard power, clipped to [0, 1 − 1e-15]
 * @see Baluev (2008), MNRAS 385, 1279, eq. 5 and 6 and table 1
 */
export function falseAlarmProbability(power: number, search: FalseAlarmSearch): number {
  const p = Math.min(Math.max(power, 0), 1 - 1e-15)
  const nullDegrees = search.sampleCount - 1 - search.polynomialDegree
  const lineDegrees = nullDegrees - 2
  if (lineDegrees < 1) return 1
  const logRest = Math.log1p(-p)
  const single = Math.exp((lineDegrees / 2) * logRest)
  const width = search.bandHz * Math.sqrt(4 * Math.PI * search.timeVariance)
  const tau =
    gammaRatio(nullDegrees) * width * Math.exp(((lineDegrees - 1) / 2) * logRest) * Math.sqrt((nullDegrees * p) / 2)
  return Math.min(1, -Math.expm1(-tau) + single * Math.exp(-tau))
}

/** Standard power whose false-alarm probability is the given one, by bisection; the larger root where there are two. */
export function powerAtFalseAlarm(probability: number, search: FalseAlarmSearch): number {
  // τ rises first, then falls; beyond its maximum at P = 1/N_K the probability only falls.
  let low = Math.min(0.5, 1 / Math.max(2, search.sampleCount - 3 - search.polynomialDegree))
  let high = 1 - 1e-15
  if (falseAlarmProbability(low, search) <= probability) return low
  for (let iteration = 0; iteration < 200 && high - low > 1e-16; iteration++) {
    const middle = (low + high) / 2
    if (falseAlarmProbability(middle, search) > probability) low = middle
    else high = middle
  }
  return high
}

/** Variance of sample times, Σw(t − t̄)² with weights that sum to 1 (equal ones when not given). */
export function timeVariance(timeSeconds: Float64Array, weights: Float64Array | null = null): number {
  if (weights === null) return sumOfSquaredDeviations(timeSeconds) / timeSeconds.length
  const centre = timeSeconds.reduce((total, t, i) => total + weights[i] * t, 0)
  return timeSeconds.reduce((total, t, i) => total + weights[i] * (t - centre) ** 2, 0)
}

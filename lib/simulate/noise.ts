import { createRandom } from '@/lib/analysis/random'
import type { SimulatedSeeing } from './options'

/** Sources of chance; each has a stream of random numbers of its own. */
export const CHANCE = { seeing: 1, declination: 2, wander: 3, cadence: 4, night: 5 } as const

/**
 * Standard normal numbers for one source of chance of one run. The stream's number is mixed into the seed by an odd
 * multiplier, other than those of the seeding itself, so that neighbouring seeds and streams share nothing.
 */
export function gaussianStream(seed: number, stream: number): () => number {
  return createRandom((seed ^ Math.imul(stream, 0x5bd1e995)) >>> 0).normal
}

/**
 * Displacement of the star by the air at the given times, on the sky, in arc seconds: white noise plus a first-order
 * autoregression x_i = q x_{i−1} + σ√(1 − q²) ε_i with q = exp(−Δt/τ), which keeps its variance σ² and its correlation
 * exp(−|t_i − t_j|/τ) at any spacing (Priestley 1981, Spectral Analysis and Time Series, 3.7).
 */
export function seeingSeries(
  { whiteSkyArcsec, correlatedSkyArcsec, correlationSeconds }: SimulatedSeeing,
  timeSeconds: Float64Array,
  seed: number,
  stream: number,
): Float64Array {
  const next = gaussianStream(seed, stream)
  let correlated = 0
  return timeSeconds.map((t, i) => {
    const q = i === 0 ? 0 : Math.exp((timeSeconds[i - 1] - t) / correlationSeconds)
    correlated = q * correlated + correlatedSkyArcsec * Math.sqrt(1 - q * q) * next()
    return correlated + whiteSkyArcsec * next()
  })
}

import type { SpectrumWindow, WindowName } from './types'

/**
 * Coefficients of the cosine-sum windows, w[n] = Σ (−1)^k a_k cos(2πkn/N).
 *
 * @see Harris (1978), Proc. IEEE 66, 51; Nuttall (1981), IEEE Trans. ASSP 29, 84; Heinzel, Rüdiger & Schilling (2002),
 * Spectrum and spectral density estimation by the DFT (HFT70, HFT95, HFT116D)
 */
export const COSINE_WINDOWS = {
  rectangular: [1],
  hann: [0.5, 0.5],
  hamming: [0.54, 0.46],
  blackman: [0.42, 0.5, 0.08],
  'blackman-harris': [0.35875, 0.48829, 0.14128, 0.01168],
  hft70: [1, 1.90796, 1.07349, 0.18199],
  hft95: [1, 1.9383379, 1.3045202, 0.402827, 0.0350665],
  hft116d: [1, 1.9575375, 1.4780705, 0.6367431, 0.1228389, 0.0066288],
} as const

export type CosineWindowName = keyof typeof COSINE_WINDOWS

/**
 * A cosine-sum window in its periodic form, w[n] = Σ_k (−1)^k a_k cos(2πkn/N), n = 0 … N−1.
 *
 * @param sampleCount N, an integer of at least 2
 * @returns N dimensionless weights; those of a flat-top reach from below 0 to above 4
 * @throws {RangeError} if sampleCount is not such an integer
 */
export function cosineWindow(name: CosineWindowName, sampleCount: number): Float64Array {
  checkSampleCount(sampleCount)
  const weights = new Float64Array(sampleCount)
  COSINE_WINDOWS[name].forEach((a, k) => {
    const signed = k % 2 === 0 ? a : -a
    for (let n = 0; n < sampleCount; n++) weights[n] += signed * Math.cos((2 * Math.PI * k * n) / sampleCount)
  })
  return weights
}

/**
 * Kaiser window in its periodic form, w[n] = I₀(β√(1 − (2n/N − 1)²))/I₀(β); β = πα, with the α that tables list.
 *
 * @throws {RangeError} if sampleCount is not an integer of at least 2, or beta is negative or not finite
 * @see Harris (1978), Proc. IEEE 66, 51, eq. 46
 */
export function kaiserWindow(beta: number, sampleCount: number): Float64Array {
  checkSampleCount(sampleCount)
  if (!(beta >= 0 && beta < Infinity)) throw new RangeError(`beta must be at least 0 and finite: got ${beta}`)
  const peak = besselI0(beta)
  return Float64Array.from({ length: sampleCount }, (_, n) => {
    const x = (2 * n) / sampleCount - 1
    return besselI0(beta * Math.sqrt(Math.max(0, 1 - x * x))) / peak
  })
}

/** The weights of a window as a recipe names it; 'flat-top' is HFT95. */
export function windowWeights(window: SpectrumWindow, sampleCount: number): Float64Array {
  if (typeof window !== 'string') return kaiserWindow(window.beta, sampleCount)
  return cosineWindow(window === 'flat-top' ? 'hft95' : window, sampleCount)
}

/** Half width of the main lobe in bins: a window needs at least as many worm turns, or drift covers the fundamental. */
const HALF_MAIN_LOBE_BINS: Record<WindowName, number> = {
  rectangular: 1,
  hann: 2,
  hamming: 2,
  blackman: 3,
  'blackman-harris': 4,
  'flat-top': 5,
}

/** The first null of a Kaiser window lies at √(1 + α²) bins. */
export function turnsNeededByWindow(window: SpectrumWindow): number {
  return typeof window === 'string' ? HALF_MAIN_LOBE_BINS[window] : Math.hypot(1, window.beta / Math.PI)
}

export interface WindowFigures {
  /** Σw/N: line amplitudes are divided by it. */
  coherentGain: number
  /** N Σw²/(Σw)², in bins. */
  noiseBandwidthBins: number
  /** −20 log₁₀(|W(½)|/|W(0)|): what a line halfway between two bins loses, in dB. */
  scallopingLossDb: number
}

/** Figures of merit from the definition; nothing is copied from a printed table. */
export function windowFigures(weights: Float64Array): WindowFigures {
  let total = 0
  let squares = 0
  let re = 0
  let im = 0
  weights.forEach((w, n) => {
    total += w
    squares += w * w
    re += w * Math.cos((Math.PI * n) / weights.length)
    im += w * Math.sin((Math.PI * n) / weights.length)
  })
  return {
    coherentGain: total / weights.length,
    noiseBandwidthBins: (weights.length * squares) / (total * total),
    scallopingLossDb: -20 * Math.log10(Math.hypot(re, im) / Math.abs(total)),
  }
}

/** Modified Bessel function of the first kind, order 0: Σ ((x/2)^m/m!)², all terms positive. */
function besselI0(x: number): number {
  const quarterSquare = (x * x) / 4
  let term = 1
  let total = 1
  for (let m = 1; term > total * 1e-17; m++) {
    term *= quarterSquare / (m * m)
    total += term
  }
  return total
}

function checkSampleCount(sampleCount: number): void {
  if (!Number.isInteger(sampleCount) || sampleCount < 2) {
    throw new RangeError(`sampleCount must be an integer of at least 2: got ${sampleCount}`)
  }
}

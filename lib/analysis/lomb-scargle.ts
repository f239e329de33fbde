import { failure } from './failure'
import type { Failure } from './types'

/** Fewer samples carry no periodogram. */
const FEWEST_SAMPLES = 10

/** A fit whose determinant is smaller says nothing at that frequency: power 0. */
const SMALLEST_DETERMINANT = 1e-10

/** Rotated sines and cosines are computed afresh after so many steps, so that rounding does not pile up. */
const RESEED_STEPS = 64

export interface LombScargleInput {
  timeSeconds: Float64Array
  values: Float64Array
  /** Standard error of each sample; null weighs all alike. */
  stderr?: Float64Array | null
  /** d of the polynomial that is fitted together with each line: 0 is the floating mean, 1 (default) takes drift too. */
  polynomialDegree?: number
}

/** A run made ready: weights that sum to 1, the polynomial projected out of the values. */
export interface LombScargleProblem {
  ok: true
  /** Seconds from `middleSeconds`. */
  time: Float64Array
  middleSeconds: number
  weights: Float64Array
  /** Polynomials up to degree d on the sample times, orthonormal in the weights. */
  basis: Float64Array[]
  /** w·(y − polynomial). */
  weightedResidual: Float64Array
  /** Σw(y − polynomial)²; times Σσ⁻² it is the χ² of the polynomial alone. */
  residualVariance: number
  /** Σσ⁻², or N without errors. */
  weightSum: number
}

/** Frequencies (firstIndex + j)·stepHz, j = 0 … count − 1. */
export interface FrequencyGrid {
  stepHz: number
  firstIndex: number
  count: number
}

export interface LineFit {
  /** Standard power, 1 − RSS(polynomial + line)/RSS(polynomial), in [0, 1]. */
  power: number
  /** a cos 2πf(t − middle) + b sin 2πf(t − middle). */
  cosArcsec: number
  sinArcsec: number
}

/** The sums that decide the power at one frequency, the polynomial already projected out. */
export interface LineSums {
  yc: number
  ys: number
  cc: number
  ss: number
  cs: number
}

/** Grid from 1/T to the highest frequency with the step 1/(10T) that finds every peak. */
export function searchGrid(durationSeconds: number, highestHz: number): FrequencyGrid {
  const firstIndex = 10
  const stepHz = 1 / (10 * durationSeconds)
  return { stepHz, firstIndex, count: Math.max(0, Math.floor(highestHz / stepHz + 1e-9) - firstIndex + 1) }
}

export function gridFrequencies({ stepHz, firstIndex, count }: FrequencyGrid): Float64Array {
  return Float64Array.from({ length: count }, (_, j) => (firstIndex + j) * stepHz)
}

/**
 * Centres time, weighs the samples and projects the polynomial out (Gram–Schmidt, twice).
 *
 * @returns `few-points` under 10 samples, `singular` when nothing but the polynomial is in the values
 */
export function prepareLombScargle(input: LombScargleInput): LombScargleProblem | Failure {
  const { timeSeconds, values, stderr = null, polynomialDegree = 1 } = input
  const count = values.length
  if (count < FEWEST_SAMPLES) return failure('few-points', { needed: FEWEST_SAMPLES, got: count })
  const middleSeconds = (timeSeconds[0] + timeSeconds[count - 1]) / 2
  const time = timeSeconds.map((t) => t - middleSeconds)
  const half = time[count - 1]
  if (!(half > 0)) return failure('singular')

  const inverseVariance = stderr === null ? new Float64Array(count).fill(1) : stderr.map((s) => 1 / (s * s))
  if (!inverseVariance.every((w) => Number.isFinite(w) && w > 0)) return failure('not-finite')
  const weightSum = inverseVariance.reduce((a, b) => a + b, 0)
  const weights = inverseVariance.map((w) => w / weightSum)

  const basis: Float64Array[] = []
  for (let degree = 0; degree <= polynomialDegree; degree++) {
    const column = time.map((t) => (t / half) ** degree)
    projectOutInPlace(column, basis, weights)
    const norm = Math.sqrt(dot(column, column, weights))
    if (!(norm > 1e-10)) return failure('singular')
    basis.push(column.map((x) => x / norm))
  }
  const residual = values.slice()
  const meanSquare = dot(residual, residual, weights)
  projectOutInPlace(residual, basis, weights)
  const residualVariance = dot(residual, residual, weights)
  if (!(residualVariance > 1e-24 * meanSquare) || !Number.isFinite(meanSquare)) return failure('singular')
  const weightedResidual = residual.map((r, i) => r * weights[i])
  return { ok: true, time, middleSeconds, weights, basis, weightedResidual, residualVariance, weightSum }
}

function dot(a: Float64Array, b: Float64Array, weights: Float64Array): number {
  let total = 0
  for (let i = 0; i < a.length; i++) total += weights[i] * a[i] * b[i]
  return total
}

function projectOutInPlace(column: Float64Array, basis: readonly Float64Array[], weights: Float64Array): void {
  for (let pass = 0; pass < 2; pass++) {
    for (const p of basis) {
      const share = dot(column, p, weights)
      for (let i = 0; i < column.length; i++) column[i] -= share * p[i]
    }
  }
}

/**
 * P = (SS·YC² + CC·YS² − 2CS·YC·YS)/(YY·D), D = CC·SS − CS²; a = (YC·SS − YS·CS)/D, b = (YS·CC − YC·CS)/D.
 *
 * @see Zechmeister & Kürster (2009), A&A 496, 577, eq. 5 and A.5
 */
export function lineFromSums({ yc, ys, cc, ss, cs }: LineSums, residualVariance: number): LineFit {
  const determinant = cc * ss - cs * cs
  if (!(determinant > SMALLEST_DETERMINANT)) return { power: 0, cosArcsec: 0, sinArcsec: 0 }
  const power = (ss * yc * yc + cc * ys * ys - 2 * cs * yc * ys) / (residualVariance * determinant)
  return {
    power: Math.min(Math.max(power, 0), 1),
    cosArcsec: (yc * ss - ys * cs) / determinant,
    sinArcsec: (ys * cc - yc * cs) / determinant,
  }
}

/** The line of one frequency fitted together with the polynomial, by the defining sums. */
export function lineAt(problem: LombScargleProblem, frequencyHz: number): LineFit {
  const { time, weights, basis, weightedResidual, residualVariance } = problem
  const projections = new Float64Array(2 * basis.length)
  let [yc, ys, cc, ss, cs] = [0, 0, 0, 0, 0]
  for (let i = 0; i < time.length; i++) {
    const angle = 2 * Math.PI * frequencyHz * time[i]
    const c = Math.cos(angle)
    const s = Math.sin(angle)
    const w = weights[i]
    yc += weightedResidual[i] * c
    ys += weightedResidual[i] * s
    cc += w * c * c
    ss += w * s * s
    cs += w * c * s
    for (let k = 0; k < basis.length; k++) {
      projections[2 * k] += w * basis[k][i] * c
      projections[2 * k + 1] += w * basis[k][i] * s
    }
  }
  return lineFromSums(withoutPolynomial({ yc, ys, cc, ss, cs }, projections), residualVariance)
}

/** Takes ⟨c, p_k⟩ and ⟨s, p_k⟩ (interleaved) out of the raw sums. */
export function withoutPolynomial(sums: LineSums, projections: ArrayLike<number>): LineSums {
  let { cc, ss, cs } = sums
  for (let k = 0; k < projections.length; k += 2) {
    cc -= projections[k] * projections[k]
    ss -= projections[k + 1] * projections[k + 1]
    cs -= projections[k] * projections[k + 1]
  }
  return { ...sums, cc, ss, cs }
}

/**
 * Standard powers on a linear grid by the defining sums; sines and cosines are rotated from step to step and computed
 * afresh every 64 steps. Cost N · count.
 */
export function lombScargleDirect(problem: LombScargleProblem, grid: FrequencyGrid): Float64Array {
  const { time, weights, basis, weightedResidual, residualVariance } = problem
  const power = new Float64Array(grid.count)
  const width = 4 + 2 * basis.length
  // One block of frequencies at a time keeps the sums in the cache while the samples stream past once per block.
  const sums = new Float64Array(RESEED_STEPS * width)
  const weightedBasis = basis.map((p) => p.map((x, i) => x * weights[i]))
  for (let from = 0; from < grid.count; from += RESEED_STEPS) {
    const steps = Math.min(RESEED_STEPS, grid.count - from)
    sums.fill(0)
    for (let i = 0; i < time.length; i++) {
      const turn = 2 * Math.PI * time[i]
      const stepC = Math.cos(turn * grid.stepHz)
      const stepS = Math.sin(turn * grid.stepHz)
      let c = Math.cos(turn * (grid.firstIndex + from) * grid.stepHz)
      let s = Math.sin(turn * (grid.firstIndex + from) * grid.stepHz)
      const w = weights[i]
      const y = weightedResidual[i]
      for (let step = 0, at = 0; step < steps; step++, at += width) {
        sums[at] += y * c
        sums[at + 1] += y * s
        sums[at + 2] += w * c * c
        sums[at + 3] += w * c * s
        for (let k = 0; k < weightedBasis.length; k++) {
          const p = weightedBasis[k][i]
          sums[at + 4 + 2 * k] += p * c
          sums[at + 5 + 2 * k] += p * s
        }
        const next = c * stepC - s * stepS
        s = s * stepC + c * stepS
        c = next
      }
    }
    for (let step = 0; step < steps; step++) {
      const at = step * width
      const cc = sums[at + 2]
      const raw = { yc: sums[at], ys: sums[at + 1], cc, ss: 1 - cc, cs: sums[at + 3] }
      const line = lineFromSums(withoutPolynomial(raw, sums.subarray(at + 4, at + width)), residualVariance)
      power[from + step] = line.power
    }
  }
  return power
}

export interface PowerNormalisations {
  standard: number
  model: number
  log: number
  /** Half the drop of χ²; in arcsec² when no errors were given. */
  psd: number
}

/**
 * The four usual normalisations of one power: standard P, model P/(1 − P), log −ln(1 − P), psd (χ²₀ − χ²)/2.
 *
 * @see VanderPlas (2018), ApJS 236, 16, section 7.2
 */
export function normalisations(power: number, problem: LombScargleProblem): PowerNormalisations {
  const clipped = Math.min(power, 1 - 1e-15)
  return {
    standard: power,
    model: clipped / (1 - clipped),
    log: -Math.log1p(-clipped),
    psd: 0.5 * power * problem.residualVariance * problem.weightSum,
  }
}

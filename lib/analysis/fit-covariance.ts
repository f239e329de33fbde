import { drain } from './drain'
import { dot, factorQr, inverseGram, solveUpper, solveUpperTransposed } from './least-squares'
import type { QrFactors } from './least-squares'
import { lineBlock, wormBlock } from './fit-columns'
import type { FrequencyBlock } from './fit-columns'
import type { JointFit } from './joint-fit'
import {
  autoregressiveFactor,
  correctLagOne,
  effectiveSampleCount,
  fitPowerLaw,
  lagOneCorrelation,
  localAmplitudeError,
} from './noise-model'
import type { PowerLaw } from './noise-model'
import { residualSpectrum } from './residual-spectrum'
import type { ResidualSpectrum } from './residual-spectrum'
import type { ErrorModel, Estimate, Failure } from './types'

/** Covariances of all parameters of a joint fit in the order of its Jacobian (frequencies in hertz), and how they came. */
export interface FitErrors {
  ok: true
  /** s²(JᵀJ)^{−1}. */
  white: Float64Array[]
  /** AR(1) sandwich. */
  autoregressive: Float64Array[]
  /** The default: the sandwich, every parameter's error raised to the largest of the three estimates. */
  reported: Float64Array[]
  /** Per frequency (worm's orders in turn, then the lines), which estimate was the largest. */
  models: ErrorModel[]
  lagOne: number
  correctedLagOne: number
  effectiveSampleCount: number
  powerLaw: PowerLaw
  spectrum: ResidualSpectrum
}

/** s²(JᵀJ)^{−1} from the full Jacobian, s² = RSS/(N − p). */
export function whiteCovariance(fit: JointFit, qr: QrFactors): Float64Array[] {
  const variance = fit.rss / (fit.residual.length - fit.parameterCount)
  return inverseGram(qr).map((row) => row.map((entry) => entry * variance))
}

/**
 * AR(1) sandwich σ_c²(JᵀJ)^{−1} JᵀSJ (JᵀJ)^{−1}, S_ij = r^{|t_i − t_j|/Δ}, σ_c² = RSS/(N − tr QᵀSQ). S is never formed:
 * S·v is two recursive passes, whatever the gaps. With r = 0 it is the white covariance.
 */
export function autoregressiveCovariance(options: {
  fit: JointFit
  qr: QrFactors
  timeSeconds: Float64Array
  cadenceSeconds: number
  lagOne: number
}): Float64Array[] {
  const { fit, qr, timeSeconds, cadenceSeconds, lagOne } = options
  const count = qr.columnCount
  const decay = new Float64Array(timeSeconds.length)
  for (let i = 1; i < decay.length; i++) {
    decay[i] = lagOne > 0 ? lagOne ** ((timeSeconds[i] - timeSeconds[i - 1]) / cadenceSeconds) : 0
  }
  // JᵀSJ by its columns; QᵀSQ = R^{−T} JᵀSJ R^{−1} follows on p × p alone.
  const inner: Float64Array[] = Array.from({ length: count }, () => new Float64Array(count))
  for (let j = 0; j < count; j++) {
    const smoothed = multiplyByCorrelation(fit.jacobian[j], decay)
    for (let i = 0; i <= j; i++) inner[i][j] = inner[j][i] = dot(fit.jacobian[i], smoothed)
  }
  const left = inner.map((column) => solveUpperTransposed(qr, column))
  const middle: Float64Array[] = []
  let trace = 0
  for (let i = 0; i < count; i++) {
    middle.push(
      solveUpperTransposed(
        qr,
        Float64Array.from(left, (column) => column[i]),
      ),
    )
    trace += middle[i][i]
  }
  const variance = fit.rss / (fit.residual.length - trace)
  // R^{−1} M R^{−T}: solve for the columns of M, then for the rows of what came out.
  const half = middle.map((column) => solveUpper(qr, column))
  const covariance: Float64Array[] = []
  for (let i = 0; i < count; i++) {
    covariance.push(
      solveUpper(
        qr,
        Float64Array.from(half, (column) => column[i] * variance),
      ),
    )
  }
  for (let i = 0; i < count; i++) {
    for (let j = 0; j < i; j++) covariance[i][j] = covariance[j][i] = (covariance[i][j] + covariance[j][i]) / 2
  }
  return covariance
}

/** u_i = v_i + q_i u_{i−1} forwards, the same backwards, their sum less v. */
function multiplyByCorrelation(values: Float64Array, decay: Float64Array): Float64Array {
  const result = new Float64Array(values.length)
  let running = 0
  for (let i = 0; i < values.length; i++) {
    running = values[i] + decay[i] * running
    result[i] = running
  }
  running = 0
  for (let i = values.length - 1; i >= 0; i--) {
    running = values[i] + (i + 1 < values.length ? decay[i + 1] * running : 0)
    result[i] += running - values[i]
  }
  return result
}

/** Every frequency of a fit: its block of two columns, and the parameter that is its frequency (null where held). */
export interface FitOscillation {
  frequencyHz: number
  /** Index of the cosine's column; the sine's follows. */
  column: number
  frequencyParameter: number | null
  /** What one hertz of the parameter adds to this frequency: the order for a worm harmonic, 1 for a line. */
  frequencyGain: number
}

export function listOscillations(fit: JointFit): FitOscillation[] {
  const linearCount = fit.coefficients.length
  const oscillations: FitOscillation[] = []
  const expand = (block: FrequencyBlock, hertz: number, parameter: number | null) =>
    block.orders.forEach((order, index) =>
      oscillations.push({
        frequencyHz: order * hertz,
        column: block.firstColumn + 2 * index,
        frequencyParameter: parameter,
        frequencyGain: order,
      }),
    )
  expand(wormBlock(fit.shape), fit.frequencies.wormHz, fit.isWormFree ? linearCount : null)
  let next = linearCount + (fit.isWormFree ? 1 : 0)
  fit.freeLines.forEach((isFree, index) =>
    expand(lineBlock(fit.shape, index), fit.frequencies.linesHz[index], isFree ? next++ : null),
  )
  return oscillations
}

/**
 * The standard errors that are reported: the largest of an AR(1) sandwich, a power law (where it describes the residual
 * better) and, for oscillations, the residual's own level round them. A frequency and a phase scale with their amplitude.
 *
 * @returns all covariances, or `singular` where the full Jacobian's columns depend on each other
 */
export function estimateErrors(fit: JointFit, timeSeconds: Float64Array, cadenceSeconds: number): FitErrors | Failure {
  return drain(estimateErrorsInSteps(fit, timeSeconds, cadenceSeconds))
}

/** The same between pauses, for long records. */
export function* estimateErrorsInSteps(
  fit: JointFit,
  timeSeconds: Float64Array,
  cadenceSeconds: number,
): Generator<void, FitErrors | Failure> {
  const qr = factorQr(fit.jacobian)
  if (!qr.ok) return qr
  const { residual, rss, parameterCount } = fit
  const sampleCount = residual.length
  const lagOne = lagOneCorrelation(timeSeconds, residual, cadenceSeconds)
  const correctedLagOne = correctLagOne(lagOne, sampleCount, parameterCount)
  const white = whiteCovariance(fit, qr)
  yield
  const autoregressive = autoregressiveCovariance({ fit, qr, timeSeconds, cadenceSeconds, lagOne: correctedLagOne })
  const oscillations = listOscillations(fit)
  const linesHz = oscillations.map(({ frequencyHz }) => frequencyHz)
  yield
  const spectrum = residualSpectrum(timeSeconds, residual, 0.5 / cadenceSeconds)
  yield
  const powerLaw = fitPowerLaw(spectrum, { cadenceSeconds, linesHz })
  const variance = rss / (sampleCount - parameterCount)
  const span = timeSeconds[sampleCount - 1] - timeSeconds[0]

  // Factors on the white standard errors that each way asks for.
  const powerLawFactor = (hertz: number) =>
    powerLaw.isPreferred && variance > 0 ? Math.sqrt(powerLaw.at(hertz) / variance) : 0
  const raise = new Float64Array(fit.jacobian.length).fill(1)
  const raiseTo = (parameter: number, factor: number) => {
    const sandwich = autoregressive[parameter][parameter]
    if (!(sandwich > 0)) return
    raise[parameter] = Math.max(raise[parameter], factor * Math.sqrt(white[parameter][parameter] / sandwich))
  }
  for (let j = 0; j <= fit.shape.driftDegree; j++) raiseTo(j, powerLawFactor(0.7 / span))

  const seen = new Set<number>()
  const models = oscillations.map(({ frequencyHz, column, frequencyParameter }): ErrorModel => {
    const a = fit.coefficients[column]
    const b = fit.coefficients[column + 1]
    const whiteError = amplitudeError(a, b, white, column)
    const sandwichError = amplitudeError(a, b, autoregressive, column)
    if (!(whiteError > 0) || !(sandwichError > 0)) return correctedLagOne > 0 ? 'ar1' : 'white'
    const local = localAmplitudeError(spectrum, frequencyHz, linesHz) ?? 0
    const ways: { model: ErrorModel; factor: number }[] = [
      { model: correctedLagOne > 0 ? 'ar1' : 'white', factor: sandwichError / whiteError },
      { model: 'power-law', factor: powerLawFactor(frequencyHz) },
      { model: 'local-spectrum', factor: local / whiteError },
    ]
    const largest = ways.reduce((best, way) => (way.factor > best.factor ? way : best))
    const others = Math.max(ways[1].factor, ways[2].factor)
    const ratio = Math.max(1, (others * whiteError) / sandwichError)
    raise[column] = Math.max(raise[column], ratio)
    raise[column + 1] = Math.max(raise[column + 1], ratio)
    // The period of a series follows its lowest order; a line's follows the line.
    if (frequencyParameter !== null && !seen.has(frequencyParameter)) {
      seen.add(frequencyParameter)
      raiseTo(frequencyParameter, others)
    }
    return largest.model
  })
  const reported = autoregressive.map((row, i) => row.map((entry, j) => entry * raise[i] * raise[j]))
  return {
    ok: true,
    white,
    autoregressive,
    reported,
    models,
    lagOne,
    correctedLagOne,
    effectiveSampleCount: effectiveSampleCount(sampleCount, correctedLagOne),
    powerLaw,
    spectrum,
  }
}

/** Standard error of A = hypot(a, b): σ_A² = (a²V_aa + b²V_bb + 2abV_ab)/A²; at A = 0 the mean of both. */
export function amplitudeError(a: number, b: number, covariance: readonly Float64Array[], column: number): number {
  const aa = covariance[column][column]
  const bb = covariance[column + 1][column + 1]
  const ab = covariance[column][column + 1]
  const power = a * a + b * b
  if (power === 0) return Math.sqrt((aa + bb) / 2)
  return Math.sqrt(Math.max(0, (a * a * aa + b * b * bb + 2 * a * b * ab) / power))
}

/** gᵀCg as a standard error. */
export function propagate(gradient: Float64Array, covariance: readonly Float64Array[]): number {
  let variance = 0
  for (let i = 0; i < gradient.length; i++) {
    if (gradient[i] === 0) continue
    for (let j = 0; j < gradient.length; j++) variance += gradient[i] * covariance[i][j] * gradient[j]
  }
  return Math.sqrt(Math.max(0, variance))
}

export interface OscillationFigures {
  frequencyHz: Estimate
  periodSeconds: Estimate
  amplitude: Estimate
  /** Radians at the chosen origin, in [0, 2π). */
  phaseRadians: Estimate
  isPhaseMeaningful: boolean
  /** Coefficients at the chosen origin and their covariance [aa, ab, bb], the frequency's error included. */
  cos: number
  sin: number
  covariance: [number, number, number]
}

/**
 * Figures of one oscillation with its phase referred to another time t_0: φ(t_0) = φ(t_ref) + 2πf(t_ref − t_0). The
 * error of the frequency enters in proportion to |t_ref − t_0|.
 */
export function describeOscillation(
  fit: JointFit,
  covariance: readonly Float64Array[],
  oscillation: FitOscillation,
  originSeconds: number,
): OscillationFigures {
  const { column, frequencyHz, frequencyParameter, frequencyGain } = oscillation
  const a = fit.coefficients[column]
  const b = fit.coefficients[column + 1]
  const shift = fit.time.referenceSeconds - originSeconds
  const angle = 2 * Math.PI * frequencyHz * shift
  const [c, s] = [Math.cos(angle), Math.sin(angle)]
  const cos = a * c - b * s
  const sin = a * s + b * c
  const count = covariance.length
  const gradientA = new Float64Array(count)
  const gradientB = new Float64Array(count)
  gradientA[column] = c
  gradientA[column + 1] = -s
  gradientB[column] = s
  gradientB[column + 1] = c
  if (frequencyParameter !== null) {
    const turn = 2 * Math.PI * shift * frequencyGain
    gradientA[frequencyParameter] = -turn * sin
    gradientB[frequencyParameter] = turn * cos
  }
  const cross = (u: Float64Array, v: Float64Array) => {
    let sum = 0
    for (let i = 0; i < count; i++) {
      if (u[i] === 0) continue
      for (let j = 0; j < count; j++) sum += u[i] * covariance[i][j] * v[j]
    }
    return sum
  }
  const amplitude = Math.hypot(a, b)
  const aa = cross(gradientA, gradientA)
  const ab = cross(gradientA, gradientB)
  const bb = cross(gradientB, gradientB)
  const phaseError =
    amplitude > 0 ? Math.sqrt(Math.max(0, sin * sin * aa + cos * cos * bb - 2 * sin * cos * ab)) / amplitude ** 2 : null
  const amplitudeStderr = amplitudeError(a, b, covariance, column)
  const frequencyStderr =
    frequencyParameter === null ? null : frequencyGain * Math.sqrt(covariance[frequencyParameter][frequencyParameter])
  const phase = Math.atan2(sin, cos)
  return {
    frequencyHz: { value: frequencyHz, stderr: frequencyStderr },
    periodSeconds: {
      value: 1 / frequencyHz,
      stderr: frequencyStderr === null ? null : frequencyStderr / frequencyHz ** 2,
    },
    amplitude: { value: amplitude, stderr: amplitudeStderr },
    phaseRadians: { value: phase < 0 ? phase + 2 * Math.PI : phase, stderr: phaseError },
    isPhaseMeaningful: amplitude >= 3 * amplitudeStderr && amplitude > 0,
    cos,
    sin,
    covariance: [aa, ab, bb],
  }
}

/** White variance × F(r, f)(1 − p/N)/(1 − p·min(F, N/3p)/N): the AR(1) error by hand, to check the sandwich against. */
export function handAutoregressiveFactor(options: {
  lagOne: number
  frequencyHz: number
  cadenceSeconds: number
  sampleCount: number
  parameterCount: number
}): number {
  const { lagOne, frequencyHz, cadenceSeconds, sampleCount: n, parameterCount: p } = options
  const factor = autoregressiveFactor(lagOne, frequencyHz, cadenceSeconds)
  return (factor * (1 - p / n)) / (1 - (p * Math.min(factor, n / (3 * p))) / n)
}

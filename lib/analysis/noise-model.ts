import { STEPS_PER_RESOLUTION, meanAmplitude } from './residual-spectrum'
import type { ResidualSpectrum } from './residual-spectrum'

/**
 * Lag-one correlation of residuals over neighbours spaced Δ ± 20 %: r_1 = [Σ r_i r_{i+1}/(pairs + 1)]/(RSS/N).
 *
 * @returns r_1, or 0 where no two neighbours are so spaced
 */
export function lagOneCorrelation(timeSeconds: Float64Array, residual: Float64Array, cadenceSeconds: number): number {
  let products = 0
  let pairs = 0
  let squares = 0
  for (let i = 0; i < residual.length; i++) {
    squares += residual[i] * residual[i]
    if (i === 0) continue
    if (Math.abs(timeSeconds[i] - timeSeconds[i - 1] - cadenceSeconds) <= 0.2 * cadenceSeconds) {
      products += residual[i] * residual[i - 1]
      pairs += 1
    }
  }
  if (pairs === 0 || !(squares > 0)) return 0
  return products / (pairs + 1) / (squares / residual.length)
}

/**
 * Lag-one correlation freed of the fit's pull: r_c = r_1 + (1 + 3 r_1 + p(1 + r_1))/N, clipped to [0, 0.985].
 * A fit with p parameters takes that much of the correlation of N residuals with it.
 */
export function correctLagOne(lagOne: number, sampleCount: number, parameterCount: number): number {
  const corrected = lagOne + (1 + 3 * lagOne + parameterCount * (1 + lagOne)) / sampleCount
  return Math.min(0.985, Math.max(0, corrected))
}

/** N(1 − r_c)/(1 + r_c): how many independent samples the correlated ones are worth at low frequency. */
export function effectiveSampleCount(sampleCount: number, correctedLagOne: number): number {
  return (sampleCount * (1 - correctedLagOne)) / (1 + correctedLagOne)
}

/** Spectrum of AR(1) noise against white noise of the same variance, F(r, f) = (1 − r²)/(1 − 2r cos 2πfΔ + r²). */
export function autoregressiveFactor(lagOne: number, frequencyHz: number, cadenceSeconds: number): number {
  const cosine = Math.cos(2 * Math.PI * frequencyHz * cadenceSeconds)
  return (1 - lagOne * lagOne) / (1 - 2 * lagOne * cosine + lagOne * lagOne)
}

/** A power-law spectrum κ(2 sin πfΔ)^{−α} that describes the residual better than AR(1), or not. */
export interface PowerLaw {
  isPreferred: boolean
  exponent: number
  level: number
  /** κS(f): variance per sample that white noise of this level at f would have, in the values' unit squared. */
  at(frequencyHz: number): number
}

/** Relative width of a group of ordinates, over which α ≤ 1.5 changes a power law by 0.8 %, evenly about its middle. */
const GROUP_WIDTH = 0.005

/**
 * Whittle's likelihood of the residual's periodogram I_j = |Σ r_i e^{−2πif_j t_i}|²/N at f_j = j/T: a power law against
 * AR(1), leaving out f_j < 1.2/T and 1/T round every fitted line. D(S) = Σ[ln κS_j + 1], κ = mean(I_j/S_j); the power law
 * is preferred when its D is smaller by more than 1.
 *
 * @see Whittle (1953), Ark. Mat. 2, 423
 */
export function fitPowerLaw(
  spectrum: ResidualSpectrum,
  options: { cadenceSeconds: number; linesHz: readonly number[] },
): PowerLaw {
  const { cadenceSeconds, linesHz } = options
  const { sampleCount, spanSeconds, stepHz, firstIndex, power } = spectrum
  const none: PowerLaw = { isPreferred: false, exponent: 0, level: 0, at: () => 0 }
  // Where both spectra hardly change, neighbouring ordinates are taken together: a group is 0.5 % of its frequency wide.
  const counts: number[] = []
  const logSines: number[] = []
  const cosines: number[] = []
  const powers: number[] = []
  let total = 0
  let groupEnd = 0
  for (let j = 0; j < power.length; j += STEPS_PER_RESOLUTION) {
    const f = (firstIndex + j) * stepHz
    if (f >= 0.5 / cadenceSeconds - 1 / spanSeconds) break
    if (f < 1.2 / spanSeconds || linesHz.some((line) => Math.abs(f - line) < 1 / spanSeconds)) continue
    if (f >= groupEnd) {
      groupEnd = f * (1 + GROUP_WIDTH)
      counts.push(0)
      logSines.push(0)
      cosines.push(0)
      powers.push(0)
    }
    const group = counts.length - 1
    counts[group] += 1
    logSines[group] += Math.log(2 * Math.sin(Math.PI * f * cadenceSeconds))
    cosines[group] += Math.cos(2 * Math.PI * f * cadenceSeconds)
    powers[group] += power[j] / sampleCount
    total += 1
  }
  if (total < 8 || !powers.some((power) => power > 0)) return none
  const allLogSines = logSines.reduce((sum, value) => sum + value, 0)
  for (let group = 0; group < counts.length; group++) {
    logSines[group] /= counts[group]
    cosines[group] /= counts[group]
  }
  const deviance = (logarithms: number, ratios: number) => {
    const level = ratios / total
    return { level, value: logarithms + total * (Math.log(level) + 1) }
  }
  const ofAutoregressive = (r: number) => {
    let logarithms = total * Math.log(1 - r * r)
    let ratios = 0
    for (let group = 0; group < counts.length; group++) {
      const inverse = 1 - 2 * r * cosines[group] + r * r
      logarithms -= counts[group] * Math.log(inverse)
      ratios += powers[group] * inverse
    }
    return deviance(logarithms, ratios / (1 - r * r))
  }
  const ofPowerLaw = (alpha: number) => {
    let ratios = 0
    for (let group = 0; group < counts.length; group++) ratios += powers[group] * Math.exp(alpha * logSines[group])
    return deviance(-alpha * allLogSines, ratios)
  }
  const r = minimiseOnInterval((x) => ofAutoregressive(x).value, 0, 0.99)
  const exponent = minimiseOnInterval((x) => ofPowerLaw(x).value, 0, 1.5)
  const best = ofPowerLaw(exponent)
  return {
    isPreferred: best.value < ofAutoregressive(r).value - 1,
    exponent,
    level: best.level,
    at: (f) => best.level * (2 * Math.sin(Math.PI * Math.min(f, 0.5 / cadenceSeconds) * cadenceSeconds)) ** -exponent,
  }
}

/**
 * Standard error of an amplitude from what is left around it: σ_A = √(2/π)·mean residual amplitude 2|Σ r e^{−2πift}|/N
 * within ±5/T of f, leaving out 1/T round every fitted line and everything below 1/T.
 *
 * @returns arc seconds (the values' unit), or null where nothing is left of the interval
 */
export function localAmplitudeError(
  spectrum: ResidualSpectrum,
  frequencyHz: number,
  linesHz: readonly number[],
): number | null {
  const resolution = 1 / spectrum.spanSeconds
  const mean = meanAmplitude(spectrum, {
    lowestHz: Math.max(resolution, frequencyHz - 5 * resolution),
    highestHz: frequencyHz + 5 * resolution,
    linesHz,
    marginHz: resolution,
  })
  return mean === null ? null : Math.sqrt(2 / Math.PI) * mean
}

/** Golden-section search after a coarse scan of 12 points, so that a second valley is not missed. */
function minimiseOnInterval(evaluate: (x: number) => number, low: number, high: number): number {
  const points = 12
  let best = 0
  let bestValue = Infinity
  for (let i = 0; i <= points; i++) {
    const value = evaluate(low + ((high - low) * i) / points)
    if (value < bestValue) {
      bestValue = value
      best = i
    }
  }
  let a = low + ((high - low) * Math.max(0, best - 1)) / points
  let b = low + ((high - low) * Math.min(points, best + 1)) / points
  const golden = (Math.sqrt(5) - 1) / 2
  let c = b - golden * (b - a)
  let d = a + golden * (b - a)
  let fc = evaluate(c)
  let fd = evaluate(d)
  for (let i = 0; i < 40 && b - a > 1e-6; i++) {
    if (fc < fd) {
      ;[b, d, fd] = [d, c, fc]
      c = b - golden * (b - a)
      fc = evaluate(c)
    } else {
      ;[a, c, fc] = [c, d, fd]
      d = a + golden * (b - a)
      fd = evaluate(d)
    }
  }
  const middle = (a + b) / 2
  const edge = low + ((high - low) * best) / points
  return evaluate(middle) <= bestValue ? middle : edge
}

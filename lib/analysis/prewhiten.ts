import { amplitudeError, autoregressiveCovariance, listOscillations, whiteCovariance } from './fit-covariance'
import { fitJointlyInSteps } from './joint-fit'
import type { JointFit, JointFitRequest } from './joint-fit'
import { factorQr } from './least-squares'
import { autoregressiveFactor, correctLagOne, fitPowerLaw, lagOneCorrelation } from './noise-model'
import { falseAlarmProbability as chanceOfPeak, timeVariance } from './false-alarm'
import { highestPeak, meanAmplitude, residualSpectrum } from './residual-spectrum'
import type { ResidualSpectrum } from './residual-spectrum'
import type { Failure, Track } from './types'

export interface PrewhitenRequest {
  track: Track
  cadenceSeconds: number
  driftDegree: number
  worm: JointFitRequest['worm']
  highestFrequencyHz: number
  /** False-alarm probability that a line must stay under. */
  chanceLevel: number
}

export interface FoundLine {
  frequencyHz: number
  falseAlarmProbability: number
  signalToNoise: number
  /** Within 1/T of another line or harmonic. */
  isUnresolved: boolean
}

export interface PrewhitenResult {
  ok: true
  lines: FoundLine[]
  /** The worm's frequency in the last fit, a good start for the final one. */
  wormHz: number | null
  /** Why the search ended; told to people where a limit was met. */
  stoppedBy: 'nothing-left' | 'line-limit' | 'escaped' | 'singular'
  /** A peak that noise would not give, but too close to a line or harmonic to be one of its own; null: none. */
  unresolvedHz: number | null
}

const LARGEST_LINE_COUNT = 20
const SMALLEST_SIGNAL_TO_NOISE = 4
const SMALLEST_STANDARD_ERRORS = 5
const SMALLEST_RSS_SHARE = 1e-4

/**
 * Looks for lines that are not yet in the model, one at a time: the highest peak of the residual's amplitude spectrum is
 * added, everything is fitted jointly again, and the line stays if its signal-to-noise ratio is at least 4, its
 * false-alarm probability within the level and its amplitude at least 5 standard errors in correlated noise. The first
 * that fails ends the search. A line is never subtracted with its one-line amplitude: leakage would make false weak ones.
 *
 * Yields between steps (the share of the work done is not known beforehand).
 *
 * @see Breger et al. (1993), A&A 271, 482 for the signal-to-noise criterion
 */
export function* prewhiten(request: PrewhitenRequest): Generator<void, PrewhitenResult | Failure> {
  const { track, highestFrequencyHz } = request
  const span = track.timeSeconds[track.timeSeconds.length - 1] - track.timeSeconds[0]
  // What is left of a noise-free signal is the arithmetic's rounding and no line.
  const largestValue = track.raArcsec.reduce((most, value) => Math.max(most, Math.abs(value)), 0)
  const roundingRss = track.raArcsec.length * (1e-9 * largestValue) ** 2
  const nyquistHz = 0.5 / request.cadenceSeconds
  const lines: FoundLine[] = []
  let wormHz = request.worm?.frequencyHz ?? null
  let unresolvedHz: number | null = null
  const fitWith = (frequenciesHz: readonly number[]) =>
    fitJointlyInSteps({
      track,
      driftDegree: request.driftDegree,
      worm: request.worm && wormHz !== null ? { ...request.worm, frequencyHz: wormHz } : null,
      lines: frequenciesHz.map((frequencyHz) => ({ frequencyHz, isFree: true })),
      highestFrequencyHz,
      isPolished: false,
    })
  const first = yield* fitWith([])
  if (!first.ok) return first
  let fit: JointFit = first
  let spectrum = residualSpectrum(track.timeSeconds, fit.residual, nyquistHz)
  yield
  while (lines.length < LARGEST_LINE_COUNT) {
    yield
    if (fit.rss <= roundingRss) return finish('nothing-left')
    const peak = highestPeak(spectrum, highestFrequencyHz)
    if (peak === null || !isWorthFitting(spectrum, peak, highestFrequencyHz)) return finish('nothing-left')
    const known = listOscillations(fit).map((oscillation) => oscillation.frequencyHz)
    const distance = Math.min(...known.map((f) => Math.abs(f - peak.frequencyHz)))
    // Kept only if the search ends here: a peak that becomes a line of its own is resolved.
    unresolvedHz = distance < 1 / span && standsOut(request, fit, spectrum, peak) ? peak.frequencyHz : null
    if (distance < 0.5 / span) return finish('nothing-left')
    const next: JointFit | Failure = yield* fitWith([...fit.frequencies.linesHz, peak.frequencyHz])
    yield
    if (!next.ok) return finish('singular')
    const index = lines.length
    if (next.escapedLines.length > 0) return finish('escaped')
    if (fit.rss - next.rss < SMALLEST_RSS_SHARE * fit.rss) return finish('nothing-left')
    yield
    const verdict: Verdict | null = yield* judgeLine(request, fit, next, index)
    if (verdict === null) return finish('nothing-left')
    const found = next.frequencies.linesHz[index]
    // Less than one whole cycle in the record is drift by another name.
    if (found < 1 / span) return finish('nothing-left')
    const others = listOscillations(next).map((oscillation) => oscillation.frequencyHz)
    others.splice(others.length - 1, 1)
    const nearest = Math.min(Infinity, ...others.map((f) => Math.abs(f - found)))
    if (nearest < 0.5 / span) return finish('nothing-left')
    unresolvedHz = null
    const { falseAlarmProbability, signalToNoise } = verdict
    lines.push({ frequencyHz: found, falseAlarmProbability, signalToNoise, isUnresolved: nearest < 1 / span })
    next.frequencies.linesHz.forEach((frequencyHz, k) => {
      lines[k] = { ...lines[k], frequencyHz }
    })
    if (next.isWormFree) wormHz = next.frequencies.wormHz
    fit = next
    spectrum = verdict.spectrum
  }
  return finish('line-limit')

  function finish(stoppedBy: PrewhitenResult['stoppedBy']): PrewhitenResult {
    return { ok: true, lines, wormHz, stoppedBy, unresolvedHz }
  }
}

/**
 * Whether a peak is worth a joint fit: against the mean level round it without itself it must reach 3, where 4 will be
 * asked of the fitted line. Saves a fit where only noise is left.
 */
function isWorthFitting(
  spectrum: ResidualSpectrum,
  peak: { frequencyHz: number; amplitude: number },
  highestHz: number,
): boolean {
  const width = Math.max(5 / spectrum.spanSeconds, 0.01)
  const level = meanAmplitude(spectrum, {
    lowestHz: peak.frequencyHz - width,
    highestHz: Math.min(highestHz, peak.frequencyHz + width),
    linesHz: [peak.frequencyHz],
    marginHz: 1 / spectrum.spanSeconds,
  })
  return level === null || peak.amplitude > 3 * level
}

/** Whether a peak of a residual meets, without a fit of its own, what is asked of a line: 4 times the level, 5 errors. */
function standsOut(
  { track, cadenceSeconds, highestFrequencyHz }: PrewhitenRequest,
  fit: JointFit,
  spectrum: ResidualSpectrum,
  { frequencyHz, amplitude }: { frequencyHz: number; amplitude: number },
): boolean {
  const level = amplitudeAround(spectrum, frequencyHz, highestFrequencyHz)
  if (amplitude < SMALLEST_SIGNAL_TO_NOISE * level) return false
  const sampleCount = fit.residual.length
  const lagOne = lagOneCorrelation(track.timeSeconds, fit.residual, cadenceSeconds)
  const corrected = correctLagOne(lagOne, sampleCount, fit.parameterCount)
  const variance = (fit.rss / (sampleCount - fit.parameterCount)) * (2 / sampleCount)
  const error = Math.sqrt(variance * autoregressiveFactor(corrected, frequencyHz, cadenceSeconds))
  return amplitude >= SMALLEST_STANDARD_ERRORS * error
}

interface Verdict {
  falseAlarmProbability: number
  signalToNoise: number
  spectrum: ResidualSpectrum
}

/** The three conditions; null when one is not met. The spectrum of what is left serves the next search. */
function* judgeLine(
  { track, cadenceSeconds, highestFrequencyHz, chanceLevel }: PrewhitenRequest,
  before: JointFit,
  after: JointFit,
  index: number,
): Generator<void, Verdict | null> {
  const { timeSeconds } = track
  const oscillation = listOscillations(after)[after.shape.wormOrders.length + index]
  const { column, frequencyHz } = oscillation
  const [a, b] = [after.coefficients[column], after.coefficients[column + 1]]
  const amplitude = Math.hypot(a, b)
  const spectrum = residualSpectrum(timeSeconds, after.residual, 0.5 / cadenceSeconds)
  const signalToNoise = amplitude / amplitudeAround(spectrum, frequencyHz, highestFrequencyHz)
  if (!(signalToNoise >= SMALLEST_SIGNAL_TO_NOISE)) return null
  const falseAlarmProbability = chanceOfPeak(1 - after.rss / before.rss, {
    sampleCount: timeSeconds.length,
    polynomialDegree: before.parameterCount - 1,
    bandHz: highestFrequencyHz,
    timeVariance: timeVariance(timeSeconds),
  })
  if (falseAlarmProbability > chanceLevel) return null

  yield
  const qr = factorQr(after.jacobian)
  if (!qr.ok) return null
  const lagOne = lagOneCorrelation(timeSeconds, after.residual, cadenceSeconds)
  const corrected = correctLagOne(lagOne, timeSeconds.length, after.parameterCount)
  const sandwich = autoregressiveCovariance({ fit: after, qr, timeSeconds, cadenceSeconds, lagOne: corrected })
  if (amplitude < SMALLEST_STANDARD_ERRORS * amplitudeError(a, b, sandwich, column)) return null
  yield
  const linesHz = listOscillations(after).map((other) => other.frequencyHz)
  const powerLaw = fitPowerLaw(spectrum, { cadenceSeconds, linesHz })
  if (powerLaw.isPreferred) {
    const variance = after.rss / (timeSeconds.length - after.parameterCount)
    const white = amplitudeError(a, b, whiteCovariance(after, qr), column)
    if (amplitude < SMALLEST_STANDARD_ERRORS * white * Math.sqrt(powerLaw.at(frequencyHz) / variance)) return null
  }
  return { falseAlarmProbability, signalToNoise, spectrum }
}

/** Mean amplitude of the residual within max(5/T, 0.01 Hz) of f, cut to the searched range, at least 1/T. */
function amplitudeAround(spectrum: ResidualSpectrum, frequencyHz: number, highestHz: number): number {
  const width = Math.max(5 / spectrum.spanSeconds, 0.01)
  const range = { lowestHz: frequencyHz - width, highestHz: Math.min(highestHz, frequencyHz + width) }
  return meanAmplitude(spectrum, range) ?? Infinity
}

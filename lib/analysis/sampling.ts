import { failure } from './failure'
import { medianInPlace } from './statistics'
import type { Failure } from './types'

/** Median spacing of strictly increasing times, in their unit; 0 for fewer than two. */
export function medianCadence(timeSeconds: Float64Array): number {
  if (timeSeconds.length < 2) return 0
  const spacing = new Float64Array(timeSeconds.length - 1)
  for (let i = 0; i < spacing.length; i++) spacing[i] = timeSeconds[i + 1] - timeSeconds[i]
  return medianInPlace(spacing)
}

/** sin(πx)/(πx). */
export function sinc(x: number): number {
  return x === 0 ? 1 : Math.sin(Math.PI * x) / (Math.PI * x)
}

/**
 * Highest frequency worth searching: min(1/(2Δ), 1/(2T_exp)) in Hz.
 *
 * Jitter of the time stamps lifts the Nyquist limit in theory (Eyer & Bartholdi 1999, A&AS 135, 1), but an alias still
 * keeps the share exp(−2π²σ_j²f_s²) of its amplitude, so the limit of the regular cadence is kept.
 */
export function highestFrequency(cadenceSeconds: number, exposureSeconds: number | null): number {
  return 1 / (2 * Math.max(cadenceSeconds, exposureSeconds ?? 0))
}

/** Share of its amplitude that an alias keeps when sampling times jitter by σ_j (rms, seconds) at rate f_s. */
export function jitterAliasShare(jitterSeconds: number, samplingHz: number): number {
  return Math.exp(-2 * Math.PI ** 2 * jitterSeconds ** 2 * samplingHz ** 2)
}

/** Frequency in [0, 1/(2Δ)] at which a line shows when sampled every Δ seconds: |f − m f_s| for the nearest m. */
export function aliasFrequency(frequencyHz: number, cadenceSeconds: number): number {
  const samplingHz = 1 / cadenceSeconds
  return Math.abs(frequencyHz - Math.round(frequencyHz / samplingHz) * samplingHz)
}

/** Two lines closer than 1/T (Rayleigh) cannot be told apart; 1.5/T shows them as two peaks (Loumos & Deeming 1978). */
export function resolution(durationSeconds: number): { rayleighHz: number; twoPeaksHz: number } {
  return { rayleighHz: 1 / durationSeconds, twoPeaksHz: 1.5 / durationSeconds }
}

/** Orders that two lines must lie apart to be told apart in a record of T seconds: P/T. */
export function finestSplitOrders(wormPeriodSeconds: number, durationSeconds: number): number {
  return wormPeriodSeconds / durationSeconds
}

/** Periods that a record of T seconds cannot tell from P: 1/(f + 0.5/T) … 1/(f − 0.5/T); the upper end may be endless. */
export function periodInterval(periodSeconds: number, durationSeconds: number): [number, number] | Failure {
  const frequency = 1 / periodSeconds
  const half = 0.5 / durationSeconds
  if (frequency <= half) return failure('short-run')
  return [1 / (frequency + half), 1 / (frequency - half)]
}

export interface ExposureAttenuation {
  /** sinc(f·T_exp): what averaging over the exposure leaves of the amplitude; negative means turned by 180°. */
  factor: number
  /** False where |factor| < 0.5: the amplitude is then reported uncorrected, with a warning. */
  isCorrectable: boolean
}

export function exposureAttenuation(frequencyHz: number, exposureSeconds: number | null): ExposureAttenuation {
  const factor = sinc(frequencyHz * (exposureSeconds ?? 0))
  return { factor, isCorrectable: Math.abs(factor) >= 0.5 }
}

/** How much too small (degrees) a fitted phase is when stamps mark the start of the exposure: 180°·f·T_exp. */
export function startStampPhaseErrorDegrees(frequencyHz: number, exposureSeconds: number): number {
  return 180 * frequencyHz * exposureSeconds
}

/**
 * What a record of so many worm turns may say (common practice, no source): under one turn nothing about the worm;
 * under three the period must come from the gear; from three it is free and a curved drift is allowed.
 */
export function runLengthRule(turns: number): 'no-worm' | 'period-from-gear' | 'period-free' {
  return turns < 1 ? 'no-worm' : turns < 3 ? 'period-from-gear' : 'period-free'
}

/** Highest drift degree for a record of so many turns: a parabola or cubic under three turns would eat the worm. */
export function highestDriftDegree(turns: number): 1 | 3 {
  return turns < 3 ? 1 : 3
}

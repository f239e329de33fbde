import type { Conversion, Estimate } from '@/lib/analysis/types'
import { DECLINATION_LIMIT_DEGREES } from '@/lib/analysis/convert'
import type { Preferences } from '@/lib/schemas/preferences'
import { formatEstimate, formatNumber, type EstimateOptions } from '@/lib/units'

/**
 * How swings and displacements of one run are shown. What is computed, saved, exported and kept in addresses is always an
 * amplitude in arc seconds of the axis; only the last step before a person's eye goes through these functions.
 */
export interface Display {
  swingMeasure: Preferences['swingMeasure']
  /** Arc seconds of the axis in a pixel of this run; null: shown in arc seconds. */
  arcsecPerPx: number | null
  /** The same across, in declination, where cos δ plays no part. */
  declinationArcsecPerPx: number | null
}

/** What visitors see, and what everything that leaves the page keeps to. */
export const PLAIN_DISPLAY: Display = { swingMeasure: 'amplitude', arcsecPerPx: null, declinationArcsecPerPx: null }

type DisplayPreferences = Pick<Preferences, 'swingMeasure' | 'displacementUnit'>

/**
 * The display of one run. Pixels are shown only where the run was recorded in pixels and their size on the axis is one
 * known number: scale / cos δ for a displacement on the sky, as in lib/analysis/convert.ts, so that they are the pixels
 * of the recording again.
 */
export function displayOf(
  { swingMeasure, displacementUnit }: DisplayPreferences,
  conversion: Conversion | null,
): Display {
  const arcsecPerPx = displacementUnit === 'px' && conversion ? axisArcsecPerPx(conversion) : null
  return {
    swingMeasure,
    arcsecPerPx,
    declinationArcsecPerPx: arcsecPerPx === null ? null : (conversion?.imageScaleArcsecPerPx ?? null),
  }
}

/** The display of a displacement in declination, which is measured on the sky. */
export function acrossTheAxis(display: Display): Display {
  return { ...display, arcsecPerPx: display.declinationArcsecPerPx }
}

/** Whether someone who prefers pixels is shown arc seconds, because this run has no pixels of a known size. */
export function isWithoutPixels(preferences: DisplayPreferences, display: Display): boolean {
  return preferences.displacementUnit === 'px' && display.arcsecPerPx === null
}

function axisArcsecPerPx(conversion: Conversion): number | null {
  const { displacementUnit, imageScaleArcsecPerPx: scale, frame, declinationDegrees } = conversion
  if (displacementUnit !== 'px' || scale === null || !Number.isFinite(scale) || scale <= 0) return null
  if (frame === 'axis') return scale
  if (declinationDegrees === null || !Number.isFinite(declinationDegrees)) return null
  if (Math.abs(declinationDegrees) >= DECLINATION_LIMIT_DEGREES) return null
  return scale / Math.cos((declinationDegrees * Math.PI) / 180)
}

export function displacementUnitOf({ arcsecPerPx }: Display): '″' | 'px' {
  return arcsecPerPx === null ? '″' : 'px'
}

/** The unit in words, on axes and in the heads of CSV: “arcsec”, “px”. */
export function displacementUnitWord({ arcsecPerPx }: Display): 'arcsec' | 'px' {
  return arcsecPerPx === null ? 'arcsec' : 'px'
}

/** The measure of a swing on axes and in the heads of tables. */
export function swingWord({ swingMeasure }: Pick<Display, 'swingMeasure'>): 'amplitude' | 'peak-to-peak' {
  return swingMeasure
}

/** The same for narrow tables: “ampl.” where it must be short; the longer word breaks at its hyphens. */
export function shortSwingWord({ swingMeasure }: Pick<Display, 'swingMeasure'>): 'ampl.' | 'peak-to-peak' {
  return swingMeasure === 'amplitude' ? 'ampl.' : 'peak-to-peak'
}

/** The head of a CSV column that holds amplitudes: amplitude_arcsec, peak_to_peak_px. */
export function swingColumn(display: Display, part: 'value' | 'stderr' = 'value'): string {
  const measure = display.swingMeasure === 'amplitude' ? 'amplitude' : 'peak_to_peak'
  return `${measure}${part === 'stderr' ? '_stderr' : ''}_${displacementUnitWord(display)}`
}

/** What an arc second of displacement is multiplied by to be shown. */
export function displacementFactor({ arcsecPerPx }: Display): number {
  return arcsecPerPx === null ? 1 : 1 / arcsecPerPx
}

/** What an amplitude in arc seconds is multiplied by to be shown: from end to end a swing is twice as large. */
export function swingFactor(display: Display): number {
  return displacementFactor(display) * (display.swingMeasure === 'peak-to-peak' ? 2 : 1)
}

/** Values and errors times a factor; untouched by a factor of 1, so that the plain display is the result itself. */
export function scaledValues(values: Float64Array, factor: number): Float64Array {
  return factor === 1 ? values : values.map((value) => value * factor)
}

/** An amplitude and its standard error as they are shown. Spans from end to end and RMS are no swings: `shownDisplacement`. */
export function shownSwing(amplitudeArcsec: Estimate, display: Display): Estimate {
  return scaled(amplitudeArcsec, swingFactor(display))
}

export function shownDisplacement(arcsec: Estimate, display: Display): Estimate {
  return scaled(arcsec, displacementFactor(display))
}

function scaled({ value, stderr }: Estimate, factor: number): Estimate {
  return { value: value * factor, stderr: stderr === null ? null : stderr * factor }
}

/** 7.350 ± 0.042″, 14.700 ± 0.084″. */
export function formatSwing(amplitudeArcsec: Estimate, display: Display, options: EstimateOptions = {}): string {
  return formatEstimate(shownSwing(amplitudeArcsec, display), { ...options, unit: displacementUnitOf(display) })
}

export function formatDisplacement(arcsec: Estimate, display: Display, options: EstimateOptions = {}): string {
  return formatEstimate(shownDisplacement(arcsec, display), { ...options, unit: displacementUnitOf(display) })
}

/** A displacement with digits that suit its size: 33″, 16.0″, 0.42″, 8.1 px. */
export function sizedDisplacement(arcsec: number, display: Display): string {
  return sized(arcsec * displacementFactor(display), displacementUnitOf(display))
}

/** An amplitude in the same way, as the person measures swings. */
export function sizedSwing(amplitudeArcsec: number, display: Display): string {
  return sized(amplitudeArcsec * swingFactor(display), displacementUnitOf(display))
}

function sized(value: number, unit: string): string {
  const size = Math.abs(value)
  const decimals = size >= 100 ? 0 : size >= 1 ? 1 : size >= 0.1 || size === 0 ? 2 : 3
  return formatNumber(value, decimals, { unit })
}

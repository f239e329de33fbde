import { IMAGE_SCALE_FACTOR } from '@/lib/analysis/constants'
import type { Estimate } from '@/lib/analysis/types'

/** U+2212, the sign of negative figures; a hyphen is too short beside tabular digits. */
export const MINUS = '\u2212'
/** U+202F, as narrow as a thin space and never broken at the end of a line: between a figure and its unit. */
export const THIN_SPACE = '\u202f'
/** Stands where a figure cannot be given (U+2013). */
export const ABSENT = '\u2013'

export interface NumberOptions {
  unit?: string
  /** Writes + before positive figures. */
  isSigned?: boolean
}

export interface EstimateOptions extends NumberOptions {
  /** Significant digits of a value that has no standard error; 4 unless given. */
  significantDigits?: number
}

/** A figure in parts, so that a screen can set its uncertainty smaller and softer. */
export interface EstimateParts {
  value: string
  /** Without the ± sign; null where there is none. */
  error: string | null
  /** With the space that belongs before it; empty where there is no unit. */
  unit: string
  /** Power of ten that value and error share, e.g. 10⁻⁵; null for ordinary figures. */
  scale: string | null
}

/** The unit with the space before it: none before the marks ″ ′ ° (16.0″), a thin one otherwise (478.66 s, 21 °C). */
export function withSpace(unit: string): string {
  if (unit === '') return ''
  return /^(″|′|°(?!C))/.test(unit) ? unit : THIN_SPACE + unit
}

/** A fixed number of decimals, 0 … 20, with a true minus sign; a value that rounds to zero has no sign. */
export function formatNumber(value: number | null, decimals: number, options: NumberOptions = {}): string {
  if (value === null || !Number.isFinite(value)) return ABSENT
  return signed(fixed(value, decimals), options) + withSpace(options.unit ?? '')
}

/** A fixed number of significant digits: 478.7, 0.01234, 1.2 × 10⁻⁵. */
export function formatSignificant(value: number | null, digits: number, options: NumberOptions = {}): string {
  if (value === null || !Number.isFinite(value)) return ABSENT
  const exponent = decimalExponent(value, digits)
  const isPowerNeeded = value !== 0 && isPowerOfTenNeeded(exponent)
  const text = fixed(
    isPowerNeeded ? scaleByPowerOfTen(value, -exponent) : value,
    isPowerNeeded ? digits - 1 : digits - 1 - exponent,
  )
  return signed(text, options) + (isPowerNeeded ? times(exponent) : '') + withSpace(options.unit ?? '')
}

/**
 * A value beside its standard error, both cut at the second significant digit of the error: 478.66 ± 0.21.
 *
 * Without a standard error the value has `significantDigits`. Figures below 10⁻⁴ or from 10⁶ share a power of ten.
 */
export function estimateParts(estimate: Estimate | null, options: EstimateOptions = {}): EstimateParts {
  const unit = withSpace(options.unit ?? '')
  if (estimate === null || !Number.isFinite(estimate.value))
    return { value: ABSENT, error: null, unit: '', scale: null }
  const { value, stderr } = estimate
  if (stderr === null || !Number.isFinite(stderr) || stderr <= 0) {
    const text = formatSignificant(value, options.significantDigits ?? 4, { isSigned: options.isSigned })
    return { value: text, error: null, unit, scale: null }
  }
  const exponent = decimalExponent(Math.max(Math.abs(value), stderr), 3)
  const shift = isPowerOfTenNeeded(exponent) ? exponent : 0
  const scaledError = scaleByPowerOfTen(stderr, -shift)
  const decimals = 1 - decimalExponent(scaledError, 2)
  return {
    value: signed(fixed(scaleByPowerOfTen(value, -shift), decimals), options),
    error: fixed(scaledError, decimals),
    unit,
    scale: shift === 0 ? null : powerOfTen(shift),
  }
}

/** `estimateParts` in one piece: 478.66 ± 0.21 s, (1.23 ± 0.45) × 10⁻⁵″/s. */
export function formatEstimate(estimate: Estimate | null, options: EstimateOptions = {}): string {
  const { value, error, unit, scale } = estimateParts(estimate, options)
  if (error === null) return value + unit
  if (scale !== null) return `(${value} ± ${error}) × ${scale}${unit}`
  return `${value} ± ${error}${unit}`
}

/** A share 0 … 1 as a percentage: 0.934 → 93 %. */
export function formatPercent(share: number | null, decimals = 0): string {
  return formatNumber(share === null ? null : share * 100, decimals, { unit: '%' })
}

/** A count with its thousands set apart from 10 000 on. */
export function formatCount(count: number): string {
  const digits = fixed(count, 0)
  return Math.abs(count) < 10_000 ? digits : digits.replace(/\B(?=(\d{3})+$)/g, THIN_SPACE)
}

/** A span of time as people say it: 2.5 s, 24 min 50 s, 1 h 02 min, 3 d 4 h. */
export function formatDuration(seconds: number | null): string {
  if (seconds === null || !Number.isFinite(seconds)) return ABSENT
  const size = Math.abs(seconds)
  const sign = seconds < 0 ? MINUS : ''
  if (size < 59.95) return sign + trimZeros(fixed(size, size < 1 ? 3 : 1)) + THIN_SPACE + 's'
  const whole = Math.round(size)
  const parts =
    whole < 3600
      ? twoParts({ total: whole, size: 60, units: ['min', 's'] })
      : Math.round(size / 60) < 2880
        ? twoParts({ total: Math.round(size / 60), size: 60, units: ['h', 'min'] })
        : twoParts({ total: Math.round(size / 3600), size: 24, units: ['d', 'h'] })
  return sign + parts
}

/** A period of the drive as a label: four significant digits, whole seconds from 1000 s. */
export function formatPeriod(seconds: number | null): string {
  if (seconds === null || !Number.isFinite(seconds)) return ABSENT
  return Math.abs(seconds) >= 999.95
    ? formatNumber(seconds, 0, { unit: 's' })
    : formatSignificant(seconds, 4, { unit: 's' })
}

/** A probability as odds: 12 %, 1 in 1000, 3 × 10⁻⁹; below 10⁻³⁰⁰ it is only bounded. */
export function formatProbability(probability: number | null): string {
  if (probability === null || !Number.isFinite(probability)) return ABSENT
  if (probability < 1e-300) return '< ' + powerOfTen(-300)
  if (probability >= 0.095) return formatPercent(probability)
  if (probability >= 1e-6) return `1 in ${formatCount(Number((1 / probability).toPrecision(2)))}`
  return formatSignificant(probability, 1)
}

/** A file's size in bytes, kB or MB of 1024. */
export function formatBytes(bytes: number): string {
  if (bytes < 1024) return formatNumber(bytes, 0, { unit: bytes === 1 ? 'byte' : 'bytes' })
  const [size, unit] = bytes < 1024 * 1024 ? [bytes / 1024, 'kB'] : [bytes / (1024 * 1024), 'MB']
  return trimZeros(fixed(size, size < 10 ? 1 : 0)) + THIN_SPACE + unit
}

/** An angle in degrees brought into [0, 360). */
export function wrapDegrees(degrees: number): number {
  const turns = degrees / 360
  const wrapped = (turns - Math.floor(turns)) * 360
  return wrapped >= 360 ? 0 : wrapped
}

/**
 * Image scale in ″/px: 648/π · pixel size [µm] · binning / focal length [mm]; null where an input is not positive.
 * The factor is the number of arc seconds in a radian over 1000.
 */
export function imageScaleArcsecPerPx(optics: {
  focalLengthMillimetres: number | null
  pixelSizeMicrometres: number | null
  binning: number | null
}): number | null {
  const { focalLengthMillimetres, pixelSizeMicrometres, binning } = optics
  if (!isPositive(focalLengthMillimetres) || !isPositive(pixelSizeMicrometres) || !isPositive(binning)) return null
  const scale = (IMAGE_SCALE_FACTOR * pixelSizeMicrometres * binning) / focalLengthMillimetres
  return isPositive(scale) ? scale : null
}

function isPositive(value: number | null): value is number {
  return value !== null && Number.isFinite(value) && value > 0
}

/** Exponent of the leading digit after rounding to `digits` significant ones; 0 for zero. */
function decimalExponent(value: number, digits: number): number {
  return value === 0 ? 0 : Number(value.toExponential(Math.max(digits - 1, 0)).split('e')[1])
}

function isPowerOfTenNeeded(exponent: number): boolean {
  return exponent < -4 || exponent >= 6
}

/** value · 10^exponent through the decimal text, so that 1.2e-5 becomes 1.2 and not 1.2000000000000002. */
function scaleByPowerOfTen(value: number, exponent: number): number {
  if (exponent === 0) return value
  const [mantissa, power] = value.toExponential().split('e')
  return Number(`${mantissa}e${Number(power) + exponent}`)
}

/** Like toFixed, but negative decimals round before the point and zero has no sign; the minus sign is true. */
function fixed(value: number, decimals: number): string {
  const text =
    decimals >= 0
      ? value.toFixed(Math.min(decimals, 20))
      : scaleByPowerOfTen(Math.round(scaleByPowerOfTen(value, decimals)), -decimals).toFixed(0)
  if (!text.startsWith('-')) return text
  return /[1-9]/.test(text) ? MINUS + text.slice(1) : text.slice(1)
}

function signed(text: string, options: NumberOptions): string {
  return options.isSigned && /[1-9]/.test(text) && !text.startsWith(MINUS) ? `+${text}` : text
}

function times(exponent: number): string {
  return ` × ${powerOfTen(exponent)}`
}

function powerOfTen(exponent: number): string {
  return '10' + [...String(exponent)].map((digit) => (digit === '-' ? '⁻' : '⁰¹²³⁴⁵⁶⁷⁸⁹'[Number(digit)])).join('')
}

function trimZeros(text: string): string {
  return text.includes('.') ? text.replace(/\.?0+$/, '') : text
}

function twoParts({ total, size, units }: { total: number; size: number; units: [string, string] }): string {
  const [large, small] = [Math.floor(total / size), total % size]
  const head = large + THIN_SPACE + units[0]
  if (small === 0) return head
  const padded = units[0] === 'd' ? String(small) : String(small).padStart(2, '0')
  return `${head} ${padded}${THIN_SPACE}${units[1]}`
}

/** Powers of ten that a double holds exactly. */
const EXACT_POWERS = Float64Array.from({ length: 23 }, (_, i) => Number(`1e${i}`))
const MAX_EXACT_INTEGER = 2 ** 53

const isDigit = (byte: number) => byte >= 48 && byte <= 57

/**
 * The number written in bytes[start…end), NaN where it is none. Blanks must already be cut off.
 *
 * Same result as Number(text), to the bit: where the digits form an integer below 2⁵³ and the power of ten is at most 22,
 * both are exact and one multiplication or division rounds once (Clinger 1990, doi:10.1145/93542.93557); the rest goes
 * through Number. Infinities are not numbers here. Also read: a true minus (U+2212), D for the exponent.
 *
 * @param decimalMark byte of the decimal mark, 46 (point) or 44 (comma)
 */
export function scanNumber(bytes: Uint8Array, start: number, end: number, decimalMark: number): number {
  let i = start
  let isNegative = false
  if (i < end && (bytes[i] === 45 || bytes[i] === 43)) isNegative = bytes[i++] === 45
  let mantissa = 0
  let digitCount = 0
  let scale = 0
  for (; i < end && isDigit(bytes[i]); i++, digitCount++) mantissa = mantissa * 10 + (bytes[i] - 48)
  if (i < end && bytes[i] === decimalMark) {
    i++
    for (; i < end && isDigit(bytes[i]); i++, digitCount++, scale--) mantissa = mantissa * 10 + (bytes[i] - 48)
  }
  if (digitCount > 0 && i < end && (bytes[i] | 32) === 101) {
    const exponent = scanExponent(bytes, i + 1, end)
    if (exponent === null) return NaN
    scale += exponent
    i = end
  }
  if (digitCount === 0 || i !== end) return slowNumber(bytes, { start, end, decimalMark })
  if (mantissa >= MAX_EXACT_INTEGER || scale < -22 || scale > 22) return slowNumber(bytes, { start, end, decimalMark })
  const size = scale < 0 ? mantissa / EXACT_POWERS[-scale] : mantissa * EXACT_POWERS[scale]
  return isNegative ? -size : size
}

/** Whether the cell says that there is no value: nothing, -, --, NaN, null, none, n/a (in any case). */
export function isMissingCell(bytes: Uint8Array, start: number, end: number): boolean {
  const length = end - start
  if (length === 0) return true
  if (length > 4) return false
  const text = String.fromCharCode(...bytes.subarray(start, end)).toLowerCase()
  return MISSING_WORDS.has(text)
}

export const MISSING_WORDS: ReadonlySet<string> = new Set(['', '-', '--', 'nan', 'null', 'none', 'n/a', 'na'])

/** Nearest double to 0.ddd… of a run of digits; used where the whole part is kept apart for precision. */
export function scanFraction(bytes: Uint8Array, start: number, end: number): number {
  let text = '0.'
  let value = 0
  if (end - start <= 15) {
    for (let i = start; i < end; i++) value = value * 10 + (bytes[i] - 48)
    return value / EXACT_POWERS[end - start]
  }
  for (let i = start; i < end; i++) text += String.fromCharCode(bytes[i])
  return Number(text)
}

function scanExponent(bytes: Uint8Array, start: number, end: number): number | null {
  let i = start
  let isNegative = false
  if (i < end && (bytes[i] === 45 || bytes[i] === 43)) isNegative = bytes[i++] === 45
  if (i === end) return null
  let exponent = 0
  for (; i < end; i++) {
    if (!isDigit(bytes[i])) return null
    exponent = Math.min(exponent * 10 + (bytes[i] - 48), 99_999)
  }
  return isNegative ? -exponent : exponent
}

function slowNumber(bytes: Uint8Array, cell: { start: number; end: number; decimalMark: number }): number {
  const { start, end, decimalMark } = cell
  if (end - start > 400) return NaN
  let text = ''
  for (let i = start; i < end; i++) {
    // U+2212 in UTF-8.
    if (bytes[i] === 0xe2 && bytes[i + 1] === 0x88 && bytes[i + 2] === 0x92) {
      text += '-'
      i += 2
    } else text += bytes[i] === decimalMark ? '.' : bytes[i] === 46 ? '?' : String.fromCharCode(bytes[i])
  }
  if (!/^[-+]?(\d+\.?\d*|\.\d+)([eEdD][-+]?\d+)?$/.test(text)) return NaN
  const value = Number(text.replace(/[dD]/, 'e'))
  return Number.isFinite(value) ? value : NaN
}

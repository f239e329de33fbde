import { MISSING_WORDS, scanNumber } from './number-scanner'
import { scanIsoStamp } from './time-stamps'
import type { TextLayout } from './types'

export type CellKind = 'number' | 'time-stamp' | 'missing' | 'text'

const encoder = new TextEncoder()

/** The number that the text writes, NaN where it is none; the same rules as for the body of a file. */
export function numberOfText(text: string, decimalMark: TextLayout['decimalMark']): number {
  const bytes = encoder.encode(text)
  return scanNumber(bytes, 0, bytes.length, decimalMark.charCodeAt(0))
}

export function isTimeStampText(text: string): boolean {
  const bytes = encoder.encode(text)
  return /\D/.test(text) && scanIsoStamp(bytes, 0, bytes.length) !== null
}

export function cellKind(text: string, decimalMark: TextLayout['decimalMark']): CellKind {
  if (MISSING_WORDS.has(text.toLowerCase())) return 'missing'
  if (!Number.isNaN(numberOfText(text, decimalMark)) && !(decimalMark === ',' && text.endsWith(','))) return 'number'
  return isTimeStampText(text) ? 'time-stamp' : 'text'
}

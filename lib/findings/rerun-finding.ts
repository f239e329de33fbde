import type { AnalysisResult } from '@/lib/analysis/types'

export interface RerunComparison {
  isSame: boolean
  /** Largest |a − b| / max(|a|, |b|) over all figures; infinite where one has a figure that the other lacks. */
  largestRelativeDifference: number
}

/** Below this, two figures are what rounding leaves of zero: how far a table is from closing, a chance of 1 in 10¹². */
const ROUNDING = 1e-12

/** Compares every figure of a saved result with those of the same recipe computed again. */
export function compareResults(saved: AnalysisResult, again: AnalysisResult): RerunComparison {
  return { isSame: isEqual(saved, again), largestRelativeDifference: difference(saved, again) }
}

/** The sentence for it. */
export function rerunFinding({ isSame, largestRelativeDifference }: RerunComparison): string {
  if (isSame) return 'Computed again from the stored recording, every figure is the same to the last digit.'
  if (!Number.isFinite(largestRelativeDifference)) {
    return 'Computed again from the stored recording, some figures are there in one result and not in the other. The saved ones are shown.'
  }
  const exponent = Math.ceil(Math.log10(Math.max(largestRelativeDifference, 1e-16)))
  if (exponent > -3) {
    const percent = (100 * largestRelativeDifference).toPrecision(2)
    return `Computed again from the stored recording, a figure differs by ${percent}\u202f%. The saved ones are shown.`
  }
  return `Computed again from the stored recording by another engine, no figure differs by more than 1 part in 10${superscript(-exponent)}. The saved ones are shown.`
}

function isEqual(a: unknown, b: unknown): boolean {
  return everyLeaf(a, b, (x, y) => x === y)
}

function difference(a: unknown, b: unknown): number {
  let largest = 0
  everyLeaf(a, b, (x, y) => {
    largest = Math.max(largest, leafDifference(x, y))
    return true
  })
  return largest
}

function leafDifference(a: unknown, b: unknown): number {
  if (typeof a !== 'number' || typeof b !== 'number') return a === b ? 0 : Infinity
  const size = Math.max(Math.abs(a), Math.abs(b))
  return size < ROUNDING ? 0 : Math.abs(a - b) / size
}

/** Walks two results side by side; what only one of them has is compared with undefined. */
function everyLeaf(a: unknown, b: unknown, test: (a: unknown, b: unknown) => boolean): boolean {
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null) return test(a, b)
  const left = a as Record<string, unknown>
  const right = b as Record<string, unknown>
  const keys = [...new Set([...Object.keys(left), ...Object.keys(right)])]
  return keys.every((key) => everyLeaf(left[key], right[key], test))
}

const SUPERSCRIPT_DIGITS = '⁰¹²³⁴⁵⁶⁷⁸⁹'

function superscript(value: number): string {
  const digits = [...String(Math.abs(value))].map((digit) => SUPERSCRIPT_DIGITS[Number(digit)]).join('')
  return value < 0 ? `⁻${digits}` : digits
}

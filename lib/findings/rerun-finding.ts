import type { AnalysisResult } from '@/lib/analysis/types'

export interface RerunComparison {
  isSame: boolean
  /** Largest |a − b| / max(|a|, |b|) over all figures; infinite where one has a figure that the other lacks. */
  largestRelativeDifference: number
}

/** Compares every figure of a saved result with those of the same recipe computed again. */
export function compareResults(saved: AnalysisResult, again: AnalysisResult): RerunComparison {
  const largest = difference(saved, again)
  return { isSame: largest === 0, largestRelativeDifference: largest }
}

/** The sentence for it. */
export function rerunFinding({ isSame, largestRelativeDifference }: RerunComparison): string {
  if (isSame) return 'Computed again from the stored recording, every figure is the same to the last digit.'
  if (!Number.isFinite(largestRelativeDifference)) {
    return 'Computed again from the stored recording, some figures are there in one result and not in the other. The saved ones are shown.'
  }
  const exponent = Math.ceil(Math.log10(largestRelativeDifference))
  return `Computed again from the stored recording, no figure differs by more than 1 part in 10${superscript(-exponent)}. The saved ones are shown.`
}

function difference(a: unknown, b: unknown): number {
  if (typeof a === 'number' && typeof b === 'number') {
    if (a === b) return 0
    return Math.abs(a - b) / Math.max(Math.abs(a), Math.abs(b))
  }
  if (typeof a === 'object' && typeof b === 'object' && a !== null && b !== null) {
    const left = a as Record<string, unknown>
    const right = b as Record<string, unknown>
    const keys = new Set([...Object.keys(left), ...Object.keys(right)])
    return Math.max(0, ...[...keys].map((key) => difference(left[key], right[key])))
  }
  return a === b ? 0 : Infinity
}

const SUPERSCRIPT_DIGITS = '⁰¹²³⁴⁵⁶⁷⁸⁹'

function superscript(value: number): string {
  const digits = [...String(Math.abs(value))].map((digit) => SUPERSCRIPT_DIGITS[Number(digit)]).join('')
  return value < 0 ? `⁻${digits}` : digits
}

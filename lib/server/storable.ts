import 'server-only'

/** Deeper than anything that we keep; what lies deeper was made to break a reader. */
const DEEPEST = 64

/**
 * Whether a parsed JSON value can be kept: no text holds what PostgreSQL takes neither as text nor in JSON (NUL and single
 * surrogates), no number is past what a double holds, and nothing is nested beyond reason.
 */
export function isStorable(value: unknown, depth = 0): boolean {
  if (typeof value === 'string') return !/\0|\p{Surrogate}/u.test(value)
  if (typeof value === 'number') return Number.isFinite(value)
  if (value === null || typeof value !== 'object') return true
  if (depth > DEEPEST) return false
  return Object.entries(value).every(([key, item]) => isStorable(key) && isStorable(item, depth + 1))
}

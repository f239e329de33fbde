import type { FieldValues, Path, UseFormSetError } from 'react-hook-form'
import { RequestError } from './fetcher'

/**
 * Puts what the server found wrong beside the fields it names.
 *
 * @returns what is left to say above the form, or null when every fault has its field
 */
export function showServerFaults<Values extends FieldValues>(
  error: unknown,
  names: readonly Path<Values>[],
  setError: UseFormSetError<Values>,
): string | null {
  if (!(error instanceof RequestError)) return 'Something went wrong on this page. Reload it and try again.'
  const known = names.filter((name) => error.fields[name] !== undefined)
  known.forEach((name, index) => setError(name, { message: error.fields[name] }, { shouldFocus: index === 0 }))
  return known.length > 0 ? null : error.message
}

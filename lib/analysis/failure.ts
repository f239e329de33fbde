import type { Failure, Reason } from './types'

/** What data may fairly do, as a value: one reason word and, where it helps, how many were needed and how many came. */
export function failure(reason: Reason, counts: { needed?: number; got?: number } = {}): Failure {
  return { ok: false, reason, ...counts }
}

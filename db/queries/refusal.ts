export interface Change {
  by: string
  at: Date
}

/**
 * Why the data layer refuses. 'unknown' also stands for what the asker may not know to exist; 'changed' carries who
 * changed the thing, when, and the thing as it is now; `current` of 'already-invited' is the invitation that waits.
 */
export type RefusalReason =
  | { kind: 'unknown' }
  | { kind: 'forbidden' }
  | { kind: 'changed'; change: Change | null; current: unknown }
  | { kind: 'in-use' }
  | { kind: 'archived' }
  | { kind: 'not-valid'; fields: Record<string, string> }
  | { kind: 'last-owner' }
  | { kind: 'already-member' }
  | { kind: 'already-invited'; current: unknown }
  | { kind: 'link-ended' }

/** Thrown by queries; lib/server/errors.ts turns it into an answer. */
export class Refusal extends Error {
  constructor(
    readonly reason: RefusalReason,
    message: string,
  ) {
    super(message)
    this.name = 'Refusal'
  }
}

export function unknownThing(what: string): Refusal {
  return new Refusal({ kind: 'unknown' }, `There is no such ${what}`)
}

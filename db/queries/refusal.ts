export interface Change {
  by: string
  at: Date
}

/**
 * Why the data layer refuses. 'unknown' also stands for what the asker may not know to exist; 'changed' carries who
 * changed the thing, when, and the thing as it is now.
 */
export type RefusalReason =
  | { kind: 'unknown' }
  | { kind: 'forbidden' }
  | { kind: 'changed'; change: Change; current: unknown }
  | { kind: 'in-use' }
  | { kind: 'archived' }

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

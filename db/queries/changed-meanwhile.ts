import type { Kysely } from 'kysely'
import type { Database } from '../schema'
import { Refusal, unknownThing } from './refusal'

interface Versioned {
  table: 'projects' | 'opticsPresets' | 'runs' | 'analyses' | 'notes'
  id: string
  what: string
  /** The thing as it is now, in the form that its readers get. */
  current: unknown
}

/** The refusal of a change that was made from an older version: by whom and when it was overtaken, and by what. */
export async function changedMeanwhile(
  db: Kysely<Database>,
  { table, id, what, current }: Versioned,
): Promise<Refusal> {
  const last = await db
    .selectFrom(table)
    .innerJoin('users', 'users.id', `${table}.updatedBy`)
    .select(['users.displayName as by', `${table}.updatedAt as at`])
    .where(`${table}.id`, '=', id)
    .executeTakeFirst()
  if (!last) return unknownThing(what)
  const { by, at } = last
  return new Refusal(
    { kind: 'changed', change: { by, at }, current },
    `This ${what} was changed by ${by} meanwhile. Your version is still in the form; look at theirs before you save again.`,
  )
}

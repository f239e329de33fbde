import { sql, type Kysely } from 'kysely'
import type { Database } from '../schema'

export interface Limit {
  /** What is counted and for whom, e.g. `sign-in account <hash>`. */
  key: string
  most: number
  windowSeconds: number
}

export interface LimitState {
  isOver: boolean
  /** Until the window ends and counting starts anew. */
  secondsLeft: number
}

function stateOf(row: { hits: number; expiresAt: Date } | undefined, most: number): LimitState {
  const secondsLeft = row ? Math.max(0, Math.ceil((row.expiresAt.getTime() - Date.now()) / 1000)) : 0
  return { isOver: row !== undefined && row.hits > most, secondsLeft }
}

/** Counts one more attempt in one atomic statement, so that several instances of the server share the count. */
export async function countAttempt(db: Kysely<Database>, { key, most, windowSeconds }: Limit): Promise<LimitState> {
  const expiresAt = sql<Date>`now() + make_interval(secs => ${windowSeconds})`
  const row = await db
    .insertInto('rateLimits')
    .values({ key, hits: 1, expiresAt })
    .onConflict((conflict) =>
      conflict.column('key').doUpdateSet({
        hits: sql<number>`case when rate_limits.expires_at <= now() then 1 else rate_limits.hits + 1 end`,
        expiresAt: sql<Date>`case when rate_limits.expires_at <= now() then excluded.expires_at
          else rate_limits.expires_at end`,
      }),
    )
    .returning(['hits', 'expiresAt'])
    .executeTakeFirst()
  return stateOf(row, most)
}

export async function forgetAttempts(db: Kysely<Database>, key: string): Promise<void> {
  await db.deleteFrom('rateLimits').where('key', '=', key).execute()
}

/** Takes one attempt back that turned out not to be one to count. */
export async function returnAttempt(db: Kysely<Database>, key: string): Promise<void> {
  await db.deleteFrom('rateLimits').where('key', '=', key).where('hits', '<=', 1).execute()
  await db
    .updateTable('rateLimits')
    .set({ hits: sql<number>`hits - 1` })
    .where('key', '=', key)
    .where('hits', '>', 1)
    .execute()
}

export async function deleteExpiredLimits(db: Kysely<Database>): Promise<void> {
  await db
    .deleteFrom('rateLimits')
    .where('expiresAt', '<=', sql<Date>`now()`)
    .execute()
}

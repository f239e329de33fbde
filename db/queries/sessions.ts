import { sql, type Kysely } from 'kysely'
import type { Database } from '../schema'

export interface NewSession {
  /** SHA-256 of the token in the cookie. */
  id: string
  userId: string
  userAgent: string | null
  validDays: number
}

export async function insertSession(db: Kysely<Database>, { validDays, ...session }: NewSession): Promise<void> {
  await db
    .insertInto('sessions')
    .values({ ...session, expiresAt: sql<Date>`now() + make_interval(days => ${validDays})` })
    .execute()
}

export async function touchSession(db: Kysely<Database>, sessionId: string): Promise<void> {
  await db
    .updateTable('sessions')
    .set({ lastSeenAt: sql<Date>`now()` })
    .where('id', '=', sessionId)
    .execute()
}

/** A person's open sessions, the one that asks first, then the last used ones. */
export function listSessions(db: Kysely<Database>, { userId, present }: { userId: string; present: string | null }) {
  return db
    .selectFrom('sessions')
    .select([
      'publicId as id',
      'userAgent',
      'createdAt',
      'lastSeenAt',
      sql<boolean>`id is not distinct from ${present}`.as('isThis'),
    ])
    .where('userId', '=', userId)
    .where('expiresAt', '>', sql<Date>`now()`)
    .orderBy('isThis', 'desc')
    .orderBy('lastSeenAt', 'desc')
    .orderBy('publicId')
    .execute()
}

/** False where the person has no such session. */
export async function deleteSession(
  db: Kysely<Database>,
  { userId, publicId }: { userId: string; publicId: string },
): Promise<boolean> {
  const row = await db
    .deleteFrom('sessions')
    .where('userId', '=', userId)
    .where('publicId', '=', publicId)
    .returning('id')
    .executeTakeFirst()
  return row !== undefined
}

/** Ends every session of a person, except `keep` where it is one of theirs. */
export async function deleteSessions(
  db: Kysely<Database>,
  { userId, keep }: { userId: string; keep: string | null },
): Promise<void> {
  let query = db.deleteFrom('sessions').where('userId', '=', userId)
  if (keep) query = query.where('id', '<>', keep)
  await query.execute()
}

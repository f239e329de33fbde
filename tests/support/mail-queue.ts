import type { Kysely } from 'kysely'
import { sql } from 'kysely'
import type { Database } from '@/db/schema'
import { newToken, sha256Of } from '@/db/tokens'
import { mailJobSchema, type MailJob } from '@/lib/schemas/mail-job'

/** The mails that wait to be sent, the oldest first, and takes them out of the queue. */
export async function takeMailJobs(db: Kysely<Database>): Promise<MailJob[]> {
  const { rows } = await sql<{ id: string; payload: unknown }>`
    select id, payload from graphile_worker._private_jobs order by id`.execute(db)
  await sql`delete from graphile_worker._private_jobs`.execute(db)
  return rows.map(({ payload }) => mailJobSchema.parse(payload))
}

/** Gives the newest sign-up with this address the token that its mail would carry. */
export async function writeSignUpMail(db: Kysely<Database>, email: string): Promise<string> {
  const token = newToken()
  const { id } = await db
    .selectFrom('signUps')
    .select('id')
    .where(sql<string>`lower(email)`, '=', email.toLowerCase())
    .where('tokenSha256', 'is', null)
    .orderBy('createdAt', 'desc')
    .executeTakeFirstOrThrow()
  await db
    .updateTable('signUps')
    .set({ tokenSha256: sha256Of(token) })
    .where('id', '=', id)
    .execute()
  return token
}

/** The token that a mail to this person would carry. */
export async function writeTokenMail(
  db: Kysely<Database>,
  purpose: 'reset-password' | 'change-email',
  { userId, email }: { userId: string; email: string },
): Promise<string> {
  const token = newToken()
  const expiresAt = new Date(Date.now() + 3_600_000)
  await db
    .insertInto('emailTokens')
    .values({ id: sha256Of(token), userId, purpose, email, expiresAt })
    .execute()
  return token
}

import { sql, type Kysely } from 'kysely'
import type { Database } from '../schema'
import type { EmailTokensTable } from '../tables/accounts'
import { withdrawChangeEmail } from './mail-jobs'

interface Wanted {
  tokenSha256: string
  purpose: EmailTokensTable['purpose']
}

/** The person and address of a mail's token, while it holds. */
export function findEmailToken(db: Kysely<Database>, { tokenSha256, purpose }: Wanted) {
  return db
    .selectFrom('emailTokens')
    .select(['userId', 'email'])
    .where('id', '=', tokenSha256)
    .where('purpose', '=', purpose)
    .where('expiresAt', '>', sql<Date>`now()`)
    .executeTakeFirst()
}

/** The same, and takes it out: a link works once, also for two who follow it at once. */
export function takeEmailToken(db: Kysely<Database>, { tokenSha256, purpose }: Wanted) {
  return db
    .deleteFrom('emailTokens')
    .where('id', '=', tokenSha256)
    .where('purpose', '=', purpose)
    .where('expiresAt', '>', sql<Date>`now()`)
    .returning(['userId', 'email'])
    .executeTakeFirst()
}

/**
 * Ends every link that was sent to a person, whatever for, and the one to a new address that waits to be sent: it would be
 * written days later, long after the password of whoever asked for it was changed.
 */
export async function deleteEmailTokens(db: Kysely<Database>, userId: string): Promise<void> {
  await withdrawChangeEmail(db, userId)
  await db.deleteFrom('emailTokens').where('userId', '=', userId).execute()
}

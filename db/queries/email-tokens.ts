import { sql, type Kysely } from 'kysely'
import type { Database } from '../schema'
import type { EmailTokensTable } from '../tables/accounts'

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

/** Ends every link that was sent to a person, whatever for: a password or an address that changed leaves none behind. */
export async function deleteEmailTokens(db: Kysely<Database>, userId: string): Promise<void> {
  await db.deleteFrom('emailTokens').where('userId', '=', userId).execute()
}

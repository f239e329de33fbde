import { sql, type Kysely, type Transaction } from 'kysely'
import type { Database } from '../schema'
import type { EmailTokensTable } from '../tables/accounts'

/** False when the sign-up was used or ran out in the meantime. */
export async function updateSignUpToken(
  db: Kysely<Database>,
  { signUpId, tokenSha256 }: { signUpId: string; tokenSha256: string },
): Promise<boolean> {
  const row = await db
    .updateTable('signUps')
    .set({ tokenSha256 })
    .where('id', '=', signUpId)
    .where('expiresAt', '>', sql<Date>`now()`)
    .returning('id')
    .executeTakeFirst()
  return row !== undefined
}

function openInvitation(db: Kysely<Database>, invitationId: string) {
  return db
    .updateTable('invitations')
    .where('id', '=', invitationId)
    .where('acceptedAt', 'is', null)
    .where('revokedAt', 'is', null)
}

/** False when the invitation was accepted, revoked or ran out in the meantime. */
export async function updateInvitationToken(
  db: Kysely<Database>,
  { invitationId, tokenSha256 }: { invitationId: string; tokenSha256: string },
): Promise<boolean> {
  const row = await openInvitation(db, invitationId)
    .set({ tokenSha256 })
    .where('expiresAt', '>', sql<Date>`now()`)
    .returning('id')
    .executeTakeFirst()
  return row !== undefined
}

/** For the People screen: when the mail went out, or why it has not. */
export async function updateInvitationSending(
  db: Kysely<Database>,
  { invitationId, fault }: { invitationId: string; fault: string | null },
): Promise<void> {
  const outcome = fault === null ? { sentAt: sql<Date>`now()`, sendFault: null } : { sendFault: fault }
  await openInvitation(db, invitationId).set(outcome).execute()
}

export interface NewEmailToken extends Pick<EmailTokensTable, 'userId' | 'purpose' | 'email'> {
  tokenSha256: string
  validSeconds: number
}

/** Keeps a token's hash; it holds from now on. A newer wish to change the address replaces the older ones. */
export async function insertEmailToken(
  trx: Transaction<Database>,
  { userId, purpose, email, tokenSha256, validSeconds }: NewEmailToken,
): Promise<Date> {
  if (purpose === 'change-email') {
    await trx.deleteFrom('emailTokens').where('userId', '=', userId).where('purpose', '=', purpose).execute()
  }
  const { expiresAt } = await trx
    .insertInto('emailTokens')
    .values({
      id: tokenSha256,
      userId,
      purpose,
      email,
      expiresAt: sql<Date>`now() + make_interval(secs => ${validSeconds})`,
    })
    .returning('expiresAt')
    .executeTakeFirstOrThrow()
  return expiresAt
}

/** Sweeps out what opens nothing any more: sign-ups that nobody confirmed, and links of mails that ran out. */
export async function deleteExpiredMailTokens(db: Kysely<Database>): Promise<void> {
  for (const table of ['signUps', 'emailTokens'] as const) {
    await db
      .deleteFrom(table)
      .where('expiresAt', '<=', sql<Date>`now()`)
      .execute()
  }
  // Links of invitations say for some months what became of them.
  await db
    .deleteFrom('pastInvitationLinks')
    .where('endedAt', '<=', sql<Date>`now() - interval '90 days'`)
    .execute()
}

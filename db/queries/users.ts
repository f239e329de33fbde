import { sql, type Kysely, type Transaction } from 'kysely'
import { DEFAULT_PREFERENCES, type Preferences, type PreferencesChange } from '@/lib/schemas/preferences'
import type { Database } from '../schema'

export interface NewUser {
  displayName: string
  email: string
  passwordHash: string
}

/** The new account, whose address has been proven, or undefined when the address belongs to one already (in whatever case). */
export function insertUser(db: Kysely<Database>, user: NewUser) {
  return db
    .insertInto('users')
    .values({ ...user, emailVerifiedAt: sql<Date>`now()` })
    .onConflict((conflict) => conflict.expression(sql`lower(email)`).doNothing())
    .returning(['id', 'displayName', sql<string>`email`.as('email')])
    .executeTakeFirst()
}

/** With the password's hash: for signing in only, never on the way to a browser. A deleted account has no address. */
export async function findUserForSignIn(db: Kysely<Database>, email: string) {
  const row = await db
    .selectFrom('users')
    .select(['id', 'displayName', 'email', 'passwordHash'])
    .where(sql<string>`lower(email)`, '=', email.toLowerCase())
    .executeTakeFirst()
  if (!row?.email || !row.passwordHash) return undefined
  return { ...row, email: row.email, passwordHash: row.passwordHash }
}

export async function findPreferences(db: Kysely<Database>, userId: string): Promise<Preferences> {
  const row = await db
    .selectFrom('users')
    .select(['theme', 'swingMeasure', 'displacementUnit', 'timeZone'])
    .where('id', '=', userId)
    .executeTakeFirst()
  return row ?? DEFAULT_PREFERENCES
}

/** How everything is to be shown to this person from now on; gives the whole of it, or undefined where the account is gone. */
export function updatePreferences(
  db: Kysely<Database>,
  userId: string,
  change: PreferencesChange,
): Promise<Preferences | undefined> {
  return db
    .updateTable('users')
    .set(change)
    .where('id', '=', userId)
    .returning(['theme', 'swingMeasure', 'displacementUnit', 'timeZone'])
    .executeTakeFirst()
}

/**
 * An account that neither gets another password nor is deleted until the transaction ends, for what rests on one of both.
 * Comes before every other lock. @returns undefined for a deleted account
 */
export async function lockUser(
  trx: Transaction<Database>,
  userId: string,
): Promise<{ passwordHash: string } | undefined> {
  const row = await trx
    .selectFrom('users')
    .select('passwordHash')
    .where('id', '=', userId)
    .where('deletedAt', 'is', null)
    .forNoKeyUpdate()
    .executeTakeFirst()
  return row?.passwordHash ? { passwordHash: row.passwordHash } : undefined
}

/** For asking for the password again; undefined for a deleted account. */
export async function findPasswordHash(db: Kysely<Database>, userId: string): Promise<string | undefined> {
  const row = await db.selectFrom('users').select('passwordHash').where('id', '=', userId).executeTakeFirst()
  return row?.passwordHash ?? undefined
}

export async function updateDisplayName(db: Kysely<Database>, userId: string, displayName: string): Promise<void> {
  await db.updateTable('users').set({ displayName }).where('id', '=', userId).where('deletedAt', 'is', null).execute()
}

/** False for an account that was deleted meanwhile. */
export async function updatePasswordHash(db: Kysely<Database>, userId: string, passwordHash: string): Promise<boolean> {
  const row = await db
    .updateTable('users')
    .set({ passwordHash })
    .where('id', '=', userId)
    .where('deletedAt', 'is', null)
    .returning('id')
    .executeTakeFirst()
  return row !== undefined
}

/**
 * Gives an account a proven address. Its answer is the one it had, or undefined when the new one belongs to another account
 * (in whatever case) or this account is gone.
 */
export async function updateEmail(
  trx: Transaction<Database>,
  userId: string,
  email: string,
): Promise<string | undefined> {
  const before = await trx
    .selectFrom('users')
    .select(sql<string>`email`.as('email'))
    .where('id', '=', userId)
    .where('deletedAt', 'is', null)
    .forUpdate()
    .executeTakeFirst()
  if (!before) return undefined
  const other = await trx
    .selectFrom('users')
    .select('id')
    .where(sql<string>`lower(email)`, '=', email.toLowerCase())
    .where('id', '<>', userId)
    .executeTakeFirst()
  if (other) return undefined
  await trx
    .updateTable('users')
    .set({ email, emailVerifiedAt: sql<Date>`now()` })
    .where('id', '=', userId)
    .execute()
  return before.email
}

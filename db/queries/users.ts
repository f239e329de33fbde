import { sql, type Kysely } from 'kysely'
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

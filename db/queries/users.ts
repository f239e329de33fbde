import { sql, type Kysely } from 'kysely'
import type { Database } from '../schema'

const PUBLIC_COLUMNS = ['id', 'displayName', 'email'] as const

export interface NewUser {
  displayName: string
  email: string
  passwordHash: string
}

/** The new account, or undefined when the address belongs to one already (in whatever case). */
export function insertUser(db: Kysely<Database>, user: NewUser) {
  return db
    .insertInto('users')
    .values(user)
    .onConflict((conflict) => conflict.expression(sql`lower(email)`).doNothing())
    .returning(PUBLIC_COLUMNS)
    .executeTakeFirst()
}

/** With the password's hash: for signing in only, never on the way to a browser. */
export function findUserForSignIn(db: Kysely<Database>, email: string) {
  return db
    .selectFrom('users')
    .select([...PUBLIC_COLUMNS, 'passwordHash'])
    .where(sql<string>`lower(email)`, '=', email.toLowerCase())
    .executeTakeFirst()
}

import { sql, type Kysely, type Transaction } from 'kysely'
import type { Database } from '../schema'
import type { SignUpsTable } from '../tables/accounts'

const VALID_HOURS = 24

export type NewSignUp = Pick<SignUpsTable, 'email' | 'displayName' | 'passwordHash' | 'browserSha256' | 'nextPath'>

/** Somebody's wish to join with an address that is still to be proven. @returns its id */
export async function insertSignUp(db: Kysely<Database>, signUp: NewSignUp): Promise<string> {
  const { id } = await db
    .insertInto('signUps')
    .values({ ...signUp, expiresAt: sql<Date>`now() + make_interval(hours => ${VALID_HOURS})` })
    .returning('id')
    .executeTakeFirstOrThrow()
  return id
}

/** The sign-up whose mail carried this token, while it holds. With the password's hash: never on the way to a browser. */
export function findSignUp(db: Kysely<Database>, tokenSha256: string) {
  return db
    .selectFrom('signUps')
    .select(['id', 'email', 'displayName', 'passwordHash', 'browserSha256', 'nextPath'])
    .where('tokenSha256', '=', tokenSha256)
    .where('expiresAt', '>', sql<Date>`now()`)
    .executeTakeFirst()
}

/** Whoever gives this address to an account waits here for the other, or each would wait for rows that the other deletes. */
export async function lockSignUpsOf(trx: Transaction<Database>, email: string): Promise<void> {
  await trx
    .selectFrom('signUps')
    .select('id')
    .where(sql<string>`lower(email)`, '=', email.toLowerCase())
    .orderBy('id')
    .forUpdate()
    .execute()
}

/** Takes one out, so that two who follow the link at once can't both use it; false for the second. */
export async function takeSignUp(db: Kysely<Database>, id: string): Promise<boolean> {
  const row = await db.deleteFrom('signUps').where('id', '=', id).returning('id').executeTakeFirst()
  return row !== undefined
}

/** Whoever else typed this address: once it has an account, their links lead nowhere. */
export async function deleteSignUpsOf(db: Kysely<Database>, email: string): Promise<void> {
  await db
    .deleteFrom('signUps')
    .where(sql<string>`lower(email)`, '=', email.toLowerCase())
    .execute()
}

import 'server-only'
import type { Transaction } from 'kysely'
import type { z } from 'zod'
import { database } from '@/db'
import { insertAccountEvent } from '@/db/queries/audit'
import { deleteEmailTokens } from '@/db/queries/email-tokens'
import { enqueueMail } from '@/db/queries/mail-jobs'
import { deleteSessions, listSessions } from '@/db/queries/sessions'
import { findPasswordHash, lockUser, updateDisplayName, updatePasswordHash } from '@/db/queries/users'
import type { Database } from '@/db/schema'
import type { emailChangeSchema, nameChangeSchema, passwordChangeSchema } from '@/lib/schemas/accounts'
import { sessionIdOf, type SignedInUser } from './auth'
import { deviceName } from './device-name'
import { AppError } from './errors'
import { hashPassword, isPasswordRight } from './passwords'
import { accountLimit, addressLimit, takeAttempt, unlessGuessing } from './rate-limit'

function notYourPassword(): AppError {
  const message = 'This is not your password'
  return new AppError('not-valid', message, { fields: { password: message } })
}

/**
 * A session that was left open must not be enough to take an account over.
 *
 * @returns what the password was compared with, for `assertStillPassword`
 * @throws {AppError} not-valid, fields.password
 */
export function confirmPassword(userId: string, password: string): Promise<string> {
  const limit = accountLimit('password account', userId)
  return unlessGuessing(
    limit,
    async () => {
      const passwordHash = await findPasswordHash(database(), userId)
      if (passwordHash === undefined || !(await isPasswordRight(passwordHash, password))) throw notYourPassword()
      return passwordHash
    },
    ', or set a new password with a link that we send you',
  )
}

/** Comparing took a while, in which the password may have been changed; until the transaction ends it is not. */
export async function assertStillPassword(trx: Transaction<Database>, userId: string, provenHash: string) {
  const user = await lockUser(trx, userId)
  if (user?.passwordHash !== provenHash) throw notYourPassword()
}

export async function changeName(
  user: SignedInUser,
  { displayName }: z.output<typeof nameChangeSchema>,
): Promise<SignedInUser> {
  await database()
    .transaction()
    .execute(async (trx) => {
      await updateDisplayName(trx, user.id, displayName)
      await insertAccountEvent(trx, user.id, { action: 'account.rename', subject: displayName })
    })
  return { ...user, displayName }
}

/** Sends the link to the new address; whether it is free is looked up only when the mail is written. */
export async function askEmailChange(
  request: Request,
  user: SignedInUser,
  { email, password }: z.output<typeof emailChangeSchema>,
): Promise<void> {
  await takeAttempt(accountLimit('change-email account', user.id))
  await takeAttempt(addressLimit('change-email address', request))
  const provenHash = await confirmPassword(user.id, password)
  await database()
    .transaction()
    .execute(async (trx) => {
      await assertStillPassword(trx, user.id, provenHash)
      await enqueueMail(trx, { kind: 'change-email', userId: user.id, email })
    })
}

/** The session that asks stays; the others end, and so do links that are still under way. */
export async function changePassword(
  request: Request,
  user: SignedInUser,
  { password, newPassword }: z.output<typeof passwordChangeSchema>,
): Promise<void> {
  const provenHash = await confirmPassword(user.id, password)
  const passwordHash = await hashPassword(newPassword)
  await database()
    .transaction()
    .execute(async (trx) => {
      await assertStillPassword(trx, user.id, provenHash)
      await updatePasswordHash(trx, user.id, passwordHash)
      await deleteEmailTokens(trx, user.id)
      await deleteSessions(trx, { userId: user.id, keep: sessionIdOf(request) })
      await insertAccountEvent(trx, user.id, { action: 'account.change-password', subject: user.email })
      await enqueueMail(trx, { kind: 'password-changed', userId: user.id })
    })
}

export async function sessionsOf(request: Request, userId: string) {
  const sessions = await listSessions(database(), { userId, present: sessionIdOf(request) })
  return sessions.map(({ userAgent, ...session }) => ({ ...session, device: deviceName(userAgent) }))
}

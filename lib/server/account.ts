import 'server-only'
import type { z } from 'zod'
import { database } from '@/db'
import { insertAccountEvent } from '@/db/queries/audit'
import { deleteEmailTokens } from '@/db/queries/email-tokens'
import { enqueueMail } from '@/db/queries/mail-jobs'
import { deleteSessions, listSessions } from '@/db/queries/sessions'
import { findPasswordHash, updateDisplayName, updatePasswordHash } from '@/db/queries/users'
import type { emailChangeSchema, nameChangeSchema, passwordChangeSchema } from '@/lib/schemas/accounts'
import { sessionIdOf, type SignedInUser } from './auth'
import { deviceName } from './device-name'
import { AppError } from './errors'
import { hashPassword, isPasswordRight } from './passwords'
import { accountLimit, addressLimit, takeAttempt, unlessGuessing } from './rate-limit'

/** A session that was left open must not be enough to take an account over. @throws {AppError} not-valid, fields.password */
export function confirmPassword(userId: string, password: string): Promise<void> {
  const limit = accountLimit('password account', userId)
  return unlessGuessing(
    limit,
    async () => {
      if (await isPasswordRight(await findPasswordHash(database(), userId), password)) return
      const message = 'This is not your password'
      throw new AppError('not-valid', message, { fields: { password: message } })
    },
    ', or set a new password with a link that we send you',
  )
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
  await confirmPassword(user.id, password)
  await enqueueMail(database(), { kind: 'change-email', userId: user.id, email })
}

/** The session that asks stays; the others end, and so do links that are still under way. */
export async function changePassword(
  request: Request,
  user: SignedInUser,
  { password, newPassword }: z.output<typeof passwordChangeSchema>,
): Promise<void> {
  await confirmPassword(user.id, password)
  const passwordHash = await hashPassword(newPassword)
  await database()
    .transaction()
    .execute(async (trx) => {
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

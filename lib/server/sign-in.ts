import 'server-only'
import type { z } from 'zod'
import { database } from '@/db'
import { insertAccountEvent } from '@/db/queries/audit'
import { deleteExpiredLimits, forgetAttempts, returnAttempt } from '@/db/queries/rate-limits'
import { findPreferences, findUserForSignIn } from '@/db/queries/users'
import type { signInSchema } from '@/lib/schemas/api'
import type { SignedInUser } from './auth'
import { wrongCredentials } from './errors'
import { isPasswordRight } from './passwords'
import { accountLimit, addressLimit, takeAttempt } from './rate-limit'

/**
 * Only failures count towards the limits; an attempt is counted before the password is looked at, so that guesses made at
 * once find the limit too. @throws {AppError} wrong-credentials, the same for an unknown address
 *
 * @returns the person, and what the password was compared with
 */
export async function signIn(
  request: Request,
  form: z.output<typeof signInSchema>,
): Promise<{ user: SignedInUser; provenHash: string }> {
  const ofAccount = accountLimit('sign-in account', form.email)
  const ofAddress = addressLimit('sign-in address', request)
  await takeAttempt(ofAccount, ', or set a new password with a link that we send you')
  await takeAttempt(ofAddress)
  const found = await findUserForSignIn(database(), form.email)
  if (!(await isPasswordRight(found?.passwordHash, form.password)) || !found) {
    throw wrongCredentials()
  }
  await forgetAttempts(database(), ofAccount.key)
  await returnAttempt(database(), ofAddress.key)
  await deleteExpiredLimits(database())
  await insertAccountEvent(database(), found.id, { action: 'account.sign-in', subject: found.email })
  const preferences = await findPreferences(database(), found.id)
  const user = { id: found.id, displayName: found.displayName, email: found.email, preferences }
  return { user, provenHash: found.passwordHash }
}

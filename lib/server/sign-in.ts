import 'server-only'
import type { z } from 'zod'
import { database } from '@/db'
import { insertAccountEvent } from '@/db/queries/audit'
import { deleteExpiredLimits, forgetAttempts, returnAttempt } from '@/db/queries/rate-limits'
import { findPreferences, findUserForSignIn, insertUser } from '@/db/queries/users'
import type { signInSchema, signUpSchema } from '@/lib/schemas/api'
import { DEFAULT_PREFERENCES } from '@/lib/schemas/preferences'
import type { SignedInUser } from './auth'
import { AppError } from './errors'
import { hashPassword, isPasswordRight } from './passwords'
import { accountLimit, addressLimit, takeAttempt } from './rate-limit'

/** Makes an account. @throws {AppError} not-valid with fields.email when the address has one */
export async function signUp(request: Request, form: z.output<typeof signUpSchema>): Promise<SignedInUser> {
  await takeAttempt(addressLimit('sign-up address', request))
  const passwordHash = await hashPassword(form.password)
  const { displayName, email } = form
  return database()
    .transaction()
    .execute(async (trx) => {
      const user = await insertUser(trx, { displayName, email, passwordHash })
      if (!user) {
        const taken = 'There is an account with this address already. Sign in instead.'
        throw new AppError('not-valid', taken, { fields: { email: taken } })
      }
      await insertAccountEvent(trx, user.id, { action: 'account.sign-up', subject: email })
      return { ...user, preferences: DEFAULT_PREFERENCES }
    })
}

/**
 * Only failures count towards the limits; an attempt is counted before the password is looked at, so that guesses made at
 * once find the limit too. @throws {AppError} wrong-credentials, the same for an unknown address
 */
export async function signIn(request: Request, form: z.output<typeof signInSchema>): Promise<SignedInUser> {
  const ofAccount = accountLimit('sign-in account', form.email)
  const ofAddress = addressLimit('sign-in address', request)
  await takeAttempt(ofAccount)
  await takeAttempt(ofAddress)
  const found = await findUserForSignIn(database(), form.email)
  if (!(await isPasswordRight(found?.passwordHash, form.password)) || !found) {
    throw new AppError('wrong-credentials', 'The e-mail address or the password is not right')
  }
  await forgetAttempts(database(), ofAccount.key)
  await returnAttempt(database(), ofAddress.key)
  await deleteExpiredLimits(database())
  await insertAccountEvent(database(), found.id, { action: 'account.sign-in', subject: found.email })
  const preferences = await findPreferences(database(), found.id)
  return { id: found.id, displayName: found.displayName, email: found.email, preferences }
}

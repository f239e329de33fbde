import 'server-only'
import { Cookie } from 'lucia'
import type { z } from 'zod'
import { database } from '@/db'
import { enqueueMail } from '@/db/queries/mail-jobs'
import { deleteExpiredLimits } from '@/db/queries/rate-limits'
import { insertSignUp } from '@/db/queries/sign-ups'
import { findUserForSignIn } from '@/db/queries/users'
import { newToken, sha256Of } from '@/db/tokens'
import type { signUpSchema } from '@/lib/schemas/api'
import { cookieAttributes } from './auth'
import { hashPassword } from './passwords'
import { accountLimit, addressLimit, takeAttempt } from './rate-limit'

/** Tells the browser that signed up from the others in which the link of the mail may be followed. */
const SIGN_UP_COOKIE = 'turnwright_sign_up'
const SIGN_UP_SECONDS = 24 * 3600

/** The secret that the browser was given when it signed up, or null. */
export function browserSecretOf(cookieHeader: string | null): string | null {
  const pattern = new RegExp(`(?:^|;\\s*)${SIGN_UP_COOKIE}=([A-Za-z0-9_-]{43})(?:;|$)`)
  return pattern.exec(cookieHeader ?? '')?.[1] ?? null
}

function setCookie(value: string, maxAge: number): string {
  return new Cookie(SIGN_UP_COOKIE, value, { ...cookieAttributes(), httpOnly: true, maxAge }).serialize()
}

export function removeBrowserSecret(): string {
  return setCookie('', 0)
}

/**
 * Sends a mail to the address: with the link that makes the account, or, where it has one, saying so. Nothing that the
 * asker gets or waits for depends on which it was. Each wish is kept apart, so that who types somebody else's address
 * neither blocks nor replaces theirs.
 *
 * @returns the Set-Cookie header with the browser's secret
 */
export async function requestSignUp(
  request: Request,
  { nextPath, ...form }: z.output<typeof signUpSchema> & { nextPath: string },
): Promise<string> {
  await takeAttempt(accountLimit('sign-up account', form.email))
  await takeAttempt(addressLimit('sign-up address', request))
  const { displayName, email, password } = form
  const passwordHash = await hashPassword(password)
  // The same secret for all that this browser asks for, so that the link of an earlier mail still finds it.
  const secret = browserSecretOf(request.headers.get('cookie')) ?? newToken()
  await database()
    .transaction()
    .execute(async (trx) => {
      const owner = await findUserForSignIn(trx, email)
      if (owner) return enqueueMail(trx, { kind: 'sign-up-again', userId: owner.id })
      const browserSha256 = sha256Of(secret)
      const signUpId = await insertSignUp(trx, { displayName, email, passwordHash, browserSha256, nextPath })
      await enqueueMail(trx, { kind: 'sign-up', signUpId })
    })
  await deleteExpiredLimits(database())
  return setCookie(secret, SIGN_UP_SECONDS)
}

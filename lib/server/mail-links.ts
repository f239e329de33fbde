import 'server-only'
import { database } from '@/db'
import { insertAccountEvent } from '@/db/queries/audit'
import { deleteEmailTokens, findEmailToken, takeEmailToken } from '@/db/queries/email-tokens'
import { enqueueMail } from '@/db/queries/mail-jobs'
import { returnAttempt } from '@/db/queries/rate-limits'
import { deleteSessions } from '@/db/queries/sessions'
import { deleteSignUpsOf, findSignUp, lockSignUpsOf, takeSignUp } from '@/db/queries/sign-ups'
import { insertUser, lockUser, updateEmail } from '@/db/queries/users'
import { sha256Of } from '@/db/tokens'
import { sessionIdOf } from './auth'
import { AppError } from './errors'
import { isPasswordRight } from './passwords'
import { accountLimit, addressLimit, takeAttempt, unlessGuessing } from './rate-limit'
import { browserSecretOf } from './sign-up'

export type LinkState = 'sign-up' | 'sign-up-elsewhere' | 'change-email' | 'ended'

function isSameBrowser(signUp: { browserSha256: string }, cookieHeader: string | null): boolean {
  const secret = browserSecretOf(cookieHeader)
  return secret !== null && sha256Of(secret) === signUp.browserSha256
}

/** What following the link would do; looking consumes nothing, since mail scanners look too. */
export async function stateOfVerifyLink(token: string, cookieHeader: string | null): Promise<LinkState> {
  const tokenSha256 = sha256Of(token)
  const signUp = await findSignUp(database(), tokenSha256)
  if (signUp) return isSameBrowser(signUp, cookieHeader) ? 'sign-up' : 'sign-up-elsewhere'
  return (await findEmailToken(database(), { tokenSha256, purpose: 'change-email' })) ? 'change-email' : 'ended'
}

export async function isResetLinkOpen(token: string): Promise<boolean> {
  return (await findEmailToken(database(), { tokenSha256: sha256Of(token), purpose: 'reset-password' })) !== undefined
}

function linkEnded(): AppError {
  return new AppError('link-ended', 'This link was used already or has run out. Ask for a new mail.')
}

function addressInUse(email: string): AppError {
  return new AppError('in-use', `There is an account with ${email} by now. Sign in with it.`)
}

/** Follows the link of a sign-up or of a change of address. @throws {AppError} link-ended, in-use, not-valid */
export function followVerifyLink(request: Request, { token, password }: { token: string; password?: string }) {
  return unlessGuessing(addressLimit('mail link address', request), async () => {
    const tokenSha256 = sha256Of(token)
    const signUp = await findSignUp(database(), tokenSha256)
    if (!signUp) return changeEmail(request, tokenSha256)
    if (!isSameBrowser(signUp, request.headers.get('cookie'))) await assertChosenPassword(signUp, password)
    return makeAccount(signUp)
  })
}

type SignUp = NonNullable<Awaited<ReturnType<typeof findSignUp>>>

/** Whoever typed the address need not be the one who reads its mail: outside the browser that signed up, both must agree. */
async function assertChosenPassword(signUp: SignUp, password: string | undefined): Promise<void> {
  const message = (text: string) => new AppError('not-valid', text, { fields: { password: text } })
  if (!password) throw message('Type the password that was chosen when signing up')
  const limit = accountLimit('mail link account', signUp.id)
  await takeAttempt(limit, ', or sign up again in this browser')
  if (!(await isPasswordRight(signUp.passwordHash, password))) {
    throw message('This is not the password that was chosen when signing up')
  }
  await returnAttempt(database(), limit.key)
}

async function makeAccount({ id, email, displayName, passwordHash, nextPath }: SignUp) {
  const user = await database()
    .transaction()
    .execute(async (trx) => {
      await lockSignUpsOf(trx, email)
      if (!(await takeSignUp(trx, id))) throw linkEnded()
      const made = await insertUser(trx, { displayName, email, passwordHash })
      if (made) await insertAccountEvent(trx, made.id, { action: 'account.sign-up', subject: email })
      await deleteSignUpsOf(trx, email)
      return made
    })
  if (!user) throw addressInUse(email)
  return { outcome: 'account-made', userId: user.id, next: nextPath } as const
}

/** The session in which the link was followed stays when it is the same person's; wherever else they are signed in, they are not any more. */
async function changeEmail(request: Request, tokenSha256: string) {
  const link = { tokenSha256, purpose: 'change-email' } as const
  const found = await findEmailToken(database(), link)
  if (!found) throw linkEnded()
  const { userId, email: wanted } = found
  const email = await database()
    .transaction()
    .execute(async (trx) => {
      await lockUser(trx, userId)
      await lockSignUpsOf(trx, wanted)
      if (!(await takeEmailToken(trx, link))) throw linkEnded()
      const oldEmail = await updateEmail(trx, userId, wanted)
      if (oldEmail === undefined) throw addressInUse(wanted)
      await deleteEmailTokens(trx, userId)
      await deleteSignUpsOf(trx, wanted)
      await deleteSessions(trx, { userId, keep: sessionIdOf(request) })
      await insertAccountEvent(trx, userId, { action: 'account.change-email', subject: wanted })
      await enqueueMail(trx, { kind: 'email-changed', userId, oldEmail })
      return wanted
    })
    .catch((error: unknown) => {
      // Another account took the address between our look and our change.
      if (isUniqueViolation(error)) throw linkEnded()
      throw error
    })
  return { outcome: 'address-changed', email } as const
}

function isUniqueViolation(error: unknown): boolean {
  return error instanceof Error && 'code' in error && error.code === '23505'
}

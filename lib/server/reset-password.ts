import 'server-only'
import type { z } from 'zod'
import { database } from '@/db'
import { insertAccountEvent } from '@/db/queries/audit'
import { deleteEmailTokens, findEmailToken, takeEmailToken } from '@/db/queries/email-tokens'
import { enqueueMail } from '@/db/queries/mail-jobs'
import { deleteExpiredLimits, forgetAttempts } from '@/db/queries/rate-limits'
import { deleteSessions } from '@/db/queries/sessions'
import { lockUser, updatePasswordHash } from '@/db/queries/users'
import { sha256Of } from '@/db/tokens'
import type { askResetSchema, resetPasswordSchema } from '@/lib/schemas/accounts'
import { AppError } from './errors'
import { hashPassword } from './passwords'
import { accountLimit, addressLimit, takeAttempt, unlessGuessing } from './rate-limit'

/** Whether the address has an account is looked up only when the mail is written: the asker waits the same for any address. */
export async function askReset(request: Request, { email }: z.output<typeof askResetSchema>): Promise<void> {
  await takeAttempt(accountLimit('reset account', email))
  await takeAttempt(addressLimit('reset address', request))
  await enqueueMail(database(), { kind: 'reset-password', email })
  await deleteExpiredLimits(database())
}

/** Sets the password and ends all sessions and links of the person; answers whose it is. @throws {AppError} link-ended */
export function resetPassword(request: Request, { token, password }: z.output<typeof resetPasswordSchema>) {
  return unlessGuessing(addressLimit('mail link address', request), async () => {
    const link = { tokenSha256: sha256Of(token), purpose: 'reset-password' } as const
    const found = await findEmailToken(database(), link)
    if (!found) throw linkEnded()
    const passwordHash = await hashPassword(password)
    const { userId, email } = await database()
      .transaction()
      .execute(async (trx) => {
        // Two links of one person would each wait for what the other has deleted.
        await lockUser(trx, found.userId)
        const taken = await takeEmailToken(trx, link)
        if (!taken || !(await updatePasswordHash(trx, taken.userId, passwordHash))) throw linkEnded()
        await deleteEmailTokens(trx, taken.userId)
        await deleteSessions(trx, { userId: taken.userId, keep: null })
        await insertAccountEvent(trx, taken.userId, { action: 'account.reset-password', subject: taken.email })
        await enqueueMail(trx, { kind: 'password-changed', userId: taken.userId })
        return taken
      })
    // Who was shut out by wrong guesses has proven to be the person.
    await forgetAttempts(database(), accountLimit('sign-in account', email).key)
    await forgetAttempts(database(), accountLimit('password account', userId).key)
    return userId
  })
}

function linkEnded(): AppError {
  return new AppError('link-ended', 'This link was used already or has run out. Ask for a new one.')
}

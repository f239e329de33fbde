import 'server-only'
import type { z } from 'zod'
import { database } from '@/db'
import { deleteAccount } from '@/db/queries/account-deletion'
import { enqueueMail } from '@/db/queries/mail-jobs'
import type { deleteAccountSchema } from '@/lib/schemas/accounts'
import { assertStillPassword, confirmPassword } from './account'
import type { SignedInUser } from './auth'
import { AppError } from './errors'

/** @throws {AppError} not-valid beside the field that is wrong; last-owner where others would be left without an owner */
export async function removeAccount(
  { id, displayName, email }: SignedInUser,
  form: z.output<typeof deleteAccountSchema>,
): Promise<void> {
  if (form.email.trim().toLowerCase() !== email.toLowerCase()) {
    const message = 'This is not the address of your account'
    throw new AppError('not-valid', message, { fields: { email: message } })
  }
  const provenHash = await confirmPassword(id, form.password)
  await database()
    .transaction()
    .execute(async (trx) => {
      await assertStillPassword(trx, id, provenHash)
      const blocking = await deleteAccount(trx, { id, email })
      if (blocking.length > 0) {
        const names = blocking.map(({ name }) => `“${name}”`).join(', ')
        throw new AppError(
          'last-owner',
          `You are the only owner of ${names}, where others are members. Make somebody else an owner first. Nothing was deleted.`,
        )
      }
      await enqueueMail(trx, { kind: 'account-deleted', displayName, email })
    })
}

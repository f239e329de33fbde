import 'server-only'
import type { z } from 'zod'
import { database } from '@/db'
import { insertAccountEvent } from '@/db/queries/audit'
import { acceptInvitation, findInvitationLink, lockInvitation, openInvitation } from '@/db/queries/invitation-links'
import { insertUser, lockUser } from '@/db/queries/users'
import { sha256Of } from '@/db/tokens'
import type { invitationSignUpSchema } from '@/lib/schemas/people'
import { AppError, notSignedIn } from './errors'
import { hashPassword } from './passwords'
import { addressLimit, unlessGuessing } from './rate-limit'

/** Takes the invitation for a person who is signed in, with whichever address: it is the holder's link. */
export function joinWithLink(request: Request, userId: string, token: string) {
  return unlessGuessing(addressLimit('invitation link address', request), () =>
    database()
      .transaction()
      .execute(async (trx) => {
        // An account that is being deleted would stay in the project, perhaps as its only owner.
        if (!(await lockUser(trx, userId))) throw notSignedIn()
        return acceptInvitation(trx, await lockInvitation(trx, sha256Of(token)), userId)
      }),
  )
}

/** Makes the account for the invited address, which the mail has proven, and joins. @throws {AppError} in-use */
export function signUpWithLink(request: Request, form: z.output<typeof invitationSignUpSchema>) {
  const { token, displayName, password } = form
  const tokenSha256 = sha256Of(token)
  return unlessGuessing(addressLimit('invitation link address', request), async () => {
    openInvitation(await findInvitationLink(database(), tokenSha256))
    const passwordHash = await hashPassword(password)
    return database()
      .transaction()
      .execute(async (trx) => {
        const invitation = await lockInvitation(trx, tokenSha256)
        const user = await insertUser(trx, { displayName, email: invitation.email, passwordHash })
        if (!user) {
          throw new AppError('in-use', `${invitation.email} has an account by now. Sign in with it, then join.`)
        }
        await insertAccountEvent(trx, user.id, { action: 'account.sign-up', subject: user.email })
        return { userId: user.id, ...(await acceptInvitation(trx, invitation, user.id)) }
      })
  })
}

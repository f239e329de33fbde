import { z } from 'zod'

/*
 * What stands in the queue for a mail to be sent: ids, never text, address lists or tokens. Whoever takes the job reads what
 * the mail needs, makes the token that it carries, and keeps its SHA-256. A job whose subject is gone by then sends nothing.
 */
const id = z.uuid()

export const mailJobSchema = z.discriminatedUnion('kind', [
  /** The link that turns a sign-up into an account. */
  z.object({ kind: z.literal('sign-up'), signUpId: id }),
  /** Somebody signed up with an address that has an account. */
  z.object({ kind: z.literal('sign-up-again'), userId: id }),
  /** The link to set a new password; sends nothing when the address has no account. */
  z.object({ kind: z.literal('reset-password'), email: z.string() }),
  z.object({ kind: z.literal('password-changed'), userId: id }),
  /** The link, to the new address; sends nothing when it has an account by then. */
  z.object({ kind: z.literal('change-email'), userId: id, email: z.string() }),
  /** To the address that was left. */
  z.object({ kind: z.literal('email-changed'), userId: id, oldEmail: z.string() }),
  z.object({ kind: z.literal('account-deleted'), displayName: z.string(), email: z.string() }),
  z.object({ kind: z.literal('invitation'), invitationId: id }),
  /** Somebody named this member in a note. */
  z.object({ kind: z.literal('mention'), noteId: id, userId: id, actorId: id }),
])
export type MailJob = z.infer<typeof mailJobSchema>

import type { Kysely } from 'kysely'
import type { MailFacts } from '@/lib/mail/mail-facts'
import type { MailJob } from '@/lib/schemas/mail-job'
import {
  findInvitationForMail,
  findMentionForMail,
  findNameForMail,
  findPersonByAddress,
  findPersonForMail,
  findSignUpForMail,
} from '../queries/mail-subjects'
import { insertEmailToken, updateInvitationToken, updateSignUpToken, type NewEmailToken } from '../queries/mail-tokens'
import type { Database } from '../schema'
import { newToken, sha256Of } from '../tokens'

const HOUR_SECONDS = 3600
const RESET_VALID_SECONDS = HOUR_SECONDS
const CHANGE_VALID_SECONDS = 24 * HOUR_SECONDS

export interface PreparedMail {
  to: string
  facts: MailFacts
}

/**
 * What a job's mail says and to whom, or null when there is nothing to send any more. A token is made here, and its hash
 * kept before the mail leaves, so that no link arrives that opens nothing.
 */
export async function prepareMail(db: Kysely<Database>, job: MailJob): Promise<PreparedMail | null> {
  switch (job.kind) {
    case 'sign-up':
      return prepareSignUp(db, job.signUpId)
    case 'sign-up-again':
    case 'password-changed': {
      const person = await findPersonForMail(db, job.userId)
      return person ? { to: person.email, facts: { kind: job.kind, displayName: person.displayName } } : null
    }
    case 'reset-password': {
      const person = await findPersonByAddress(db, job.email)
      if (!person) return null
      const { id: userId, email, displayName } = person
      const link = await keepToken(db, { userId, email, purpose: 'reset-password', validSeconds: RESET_VALID_SECONDS })
      return { to: email, facts: { kind: job.kind, displayName, ...link } }
    }
    case 'change-email': {
      const { userId, email } = job
      const person = await findPersonForMail(db, userId)
      if (!person || (await findPersonByAddress(db, email))) return null
      const link = await keepToken(db, { userId, email, purpose: 'change-email', validSeconds: CHANGE_VALID_SECONDS })
      return { to: email, facts: { kind: job.kind, displayName: person.displayName, ...link } }
    }
    case 'email-changed': {
      const person = await findNameForMail(db, job.userId)
      return person ? { to: job.oldEmail, facts: { kind: job.kind, displayName: person.displayName } } : null
    }
    case 'account-deleted':
      return { to: job.email, facts: { kind: job.kind, displayName: job.displayName } }
    case 'invitation':
      return prepareInvitation(db, job.invitationId)
    case 'mention': {
      const mention = await findMentionForMail(db, job)
      if (!mention) return null
      const { email, ...facts } = mention
      return { to: email, facts: { kind: job.kind, ...facts } }
    }
  }
}

async function prepareSignUp(db: Kysely<Database>, signUpId: string): Promise<PreparedMail | null> {
  const signUp = await findSignUpForMail(db, signUpId)
  if (!signUp) return null
  const token = newToken()
  if (!(await updateSignUpToken(db, { signUpId, tokenSha256: sha256Of(token) }))) return null
  return { to: signUp.email, facts: { kind: 'sign-up', token, expiresAt: signUp.expiresAt } }
}

async function prepareInvitation(db: Kysely<Database>, invitationId: string): Promise<PreparedMail | null> {
  const invitation = await findInvitationForMail(db, invitationId)
  if (!invitation) return null
  const token = newToken()
  if (!(await updateInvitationToken(db, { invitationId, tokenSha256: sha256Of(token) }))) return null
  const { email, ...facts } = invitation
  return { to: email, facts: { kind: 'invitation', token, ...facts } }
}

async function keepToken(db: Kysely<Database>, wish: Omit<NewEmailToken, 'tokenSha256'>) {
  const token = newToken()
  const expiresAt = await db
    .transaction()
    .execute((trx) => insertEmailToken(trx, { ...wish, tokenSha256: sha256Of(token) }))
  return { token, expiresAt }
}

import { sql, type Kysely } from 'kysely'
import type { MailJob } from '@/lib/schemas/mail-job'
import type { Database } from '../schema'

export const MAIL_TASK = 'send-mail'

/** Waits grow from seconds to hours (e to the number of attempts, at most e^10 s): the last try is some three days on. */
const MOST_ATTEMPTS = 20

/**
 * Puts a mail into the queue; in a transaction it is sent only if that is committed. Nobody waits for the mail server, and
 * one that is down loses nothing. An invitation or a change of address that waits is replaced, and so tried at once: whoever
 * asks again and again while the server is down causes one mail, not many whose links end each other.
 */
export async function enqueueMail(db: Kysely<Database>, job: MailJob): Promise<void> {
  await sql`select graphile_worker.add_job(${MAIL_TASK}, ${JSON.stringify(job)}::json,
    max_attempts => ${MOST_ATTEMPTS}, job_key => ${keyOf(job)}::text)`.execute(db)
}

function keyOf(job: MailJob): string | null {
  if (job.kind === 'invitation') return `invitation ${job.invitationId}`
  return job.kind === 'change-email' ? changeEmailKey(job.userId) : null
}

const changeEmailKey = (userId: string) => `change-email ${userId}`

/** Takes the wish for a new address back whose link has not been written yet. */
export async function withdrawChangeEmail(db: Kysely<Database>, userId: string): Promise<void> {
  await sql`select graphile_worker.remove_job(${changeEmailKey(userId)}::text)`.execute(db)
}

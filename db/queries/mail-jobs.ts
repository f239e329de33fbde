import { sql, type Kysely } from 'kysely'
import type { MailJob } from '@/lib/schemas/mail-job'
import type { Database } from '../schema'

export const MAIL_TASK = 'send-mail'

/** Waits grow from seconds to hours (e to the number of attempts, at most e^10 s): the last try is some three days on. */
const MOST_ATTEMPTS = 20

/**
 * Puts a mail into the queue; in a transaction it is sent only if that is committed. Nobody waits for the mail server, and
 * one that is down loses nothing. An invitation that waits is replaced, and so tried at once: whoever sends it again and
 * again while the server is down causes one mail, not many whose links end each other.
 */
export async function enqueueMail(db: Kysely<Database>, job: MailJob): Promise<void> {
  const key = job.kind === 'invitation' ? `invitation ${job.invitationId}` : null
  await sql`select graphile_worker.add_job(${MAIL_TASK}, ${JSON.stringify(job)}::json,
    max_attempts => ${MOST_ATTEMPTS}, job_key => ${key}::text)`.execute(db)
}

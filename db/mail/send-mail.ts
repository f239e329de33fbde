import { randomUUID } from 'node:crypto'
import type { Kysely } from 'kysely'
import type { Transporter } from 'nodemailer'
import { writeMail } from '@/lib/mail/write-mail'
import { mailJobSchema, type MailJob } from '@/lib/schemas/mail-job'
import { updateInvitationSending } from '../queries/mail-tokens'
import type { Database } from '../schema'
import { prepareMail } from './prepare-mail'
import { sendFault } from './send-fault'

export interface Attempt {
  number: number
  most: number
}

export interface MailSender {
  db: Kysely<Database>
  transport: Pick<Transporter, 'sendMail'>
  /** `Turnwright <mail@example.org>` */
  from: string
  /** Where the links of all mails lead; never taken from a request. */
  linkOrigin: string
  /** One line per mail: its kind and what became of it. */
  log: (line: string) => void
}

const GIVEN_UP = 'The mail could not be sent for three days and was given up. Send it again.'

/**
 * Takes one job to its end. Done is also what has nothing to send any more, and what the mail server refuses for good;
 * everything else that fails is thrown, in words that hold no address, and comes again later.
 */
export async function sendMail(sender: MailSender, payload: unknown, attempt: Attempt): Promise<void> {
  const parsed = mailJobSchema.safeParse(payload)
  if (!parsed.success) {
    sender.log('unknown kind: not sent')
    // A newer release may know it, so that the job stays.
    throw new Error('This kind of mail is not known to this release')
  }
  const job = parsed.data
  const prepared = await prepareMail(sender.db, job)
  if (!prepared) return sender.log(`${job.kind}: nothing to send any more`)
  const { subject, text, html } = writeMail(prepared.facts, sender.linkOrigin)
  try {
    await sender.transport.sendMail({
      from: sender.from,
      // Name and address apart: an address is never read as a list.
      to: { name: '', address: prepared.to },
      subject,
      text,
      html,
      messageId: `<${randomUUID()}@${new URL(sender.linkOrigin).hostname.replace(/[[\]]/g, '')}>`,
      date: new Date(),
      headers: { 'Auto-Submitted': 'auto-generated', 'X-Auto-Response-Suppress': 'All' },
      disableFileAccess: true,
      disableUrlAccess: true,
    })
  } catch (error) {
    const { words, isForGood, code } = sendFault(error)
    const isLast = attempt.number >= attempt.most
    await noteOutcome(sender.db, job, isLast && !isForGood ? GIVEN_UP : words)
    const next = isForGood ? 'refused for good' : isLast ? 'given up' : 'tried again later'
    sender.log(`${job.kind}: not sent (${code}), attempt ${attempt.number} of ${attempt.most}, ${next}`)
    if (isForGood) return
    throw new Error(`Not sent: ${code}`)
  }
  await noteOutcome(sender.db, job, null)
  sender.log(`${job.kind}: sent`)
}

async function noteOutcome(db: Kysely<Database>, job: MailJob, fault: string | null): Promise<void> {
  if (job.kind === 'invitation') await updateInvitationSending(db, { invitationId: job.invitationId, fault })
}

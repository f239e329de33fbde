import { Logger, run, type Runner } from 'graphile-worker'
import nodemailer from 'nodemailer'
import { createDatabase } from '../create-db'
import { MAIL_TASK } from '../queries/mail-jobs'
import { deleteExpiredMailTokens } from '../queries/mail-tokens'
import type { MailSettings } from './mail-settings'
import { sendMail, type MailSender } from './send-mail'

const SWEEP_TASK = 'sweep-mail-tokens'
const AT_MOST_TOGETHER = 3

export interface MailWorker {
  /** Ends when the worker does; rejects when it broke. */
  ended: Promise<void>
  /** Lets what is being sent go out, then ends. */
  stop: () => Promise<void>
}

/** The queue's own lines would repeat ours, and some of them the job; only what we cannot tell ourselves comes through. */
function queueLogger(log: (line: string) => void): Logger {
  return new Logger(() => (level, message, meta) => {
    if (level === 'error' && !meta?.job) log(`queue: ${message}`)
  })
}

/** Takes mail jobs out of the queue as they come in. Any number of these may run: each job is taken once. */
export async function runMailWorker(settings: MailSettings, log: (line: string) => void): Promise<MailWorker> {
  const { db, pool } = createDatabase({ connectionString: settings.databaseUrl, poolSize: AT_MOST_TOGETHER + 3 })
  const transport = nodemailer.createTransport({
    url: settings.smtpUrl,
    connectionTimeout: 10_000,
    greetingTimeout: 10_000,
    socketTimeout: 30_000,
    dnsTimeout: 10_000,
  })
  const sender: MailSender = { db, transport, from: settings.from, linkOrigin: settings.linkOrigin, log }
  const runner: Runner = await run({
    pgPool: pool,
    concurrency: AT_MOST_TOGETHER,
    noHandleSignals: true,
    logger: queueLogger(log),
    // Jobs are announced at once; this is for those whose next attempt is due.
    pollInterval: 2000,
    taskList: {
      [MAIL_TASK]: (payload, { job }) => sendMail(sender, payload, { number: job.attempts, most: job.max_attempts }),
      [SWEEP_TASK]: () => deleteExpiredMailTokens(db),
    },
    // Every hour; once for all instances.
    crontab: `17 * * * * ${SWEEP_TASK} ?max=3`,
  })
  const close = async () => {
    transport.close()
    await db.destroy()
  }
  let isStopping = false
  const ended = runner.promise.finally(close)
  return {
    ended,
    stop: async () => {
      if (!isStopping) {
        isStopping = true
        await runner.stop()
      }
      await ended
    },
  }
}

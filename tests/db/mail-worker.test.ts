import { sql } from 'kysely'
import { afterEach, beforeEach, expect, test, vi } from 'vitest'
import { freePort } from '@/db/local/ports.mjs'
import { startLocalMailServer, type LocalMailServer } from '@/db/mail/local-mail-server'
import { runMailWorker, type MailWorker } from '@/db/mail/run-mail-worker'
import { enqueueMail } from '@/db/queries/mail-jobs'
import { sha256Of } from '@/db/tokens'
import { addressesIn } from '@/lib/mail/addresses-in'
import { openMailFolder, until } from '../support/local-mail'
import { openTestDatabase } from '../support/test-database'
import { makeProject } from '../support/test-project'

const database = openTestDatabase()
const folder = openMailFolder()
const DAY = 86_400_000

let port: number
let lines: string[]
let workers: MailWorker[]
let server: LocalMailServer | undefined

// Failed attempts are put off by seconds, which a loaded machine stretches.
vi.setConfig({ testTimeout: 60_000 })

beforeEach(async () => {
  await sql`delete from graphile_worker._private_jobs`.execute(database.db)
  port = await freePort()
  lines = []
  workers = []
  server = undefined
})
afterEach(async () => {
  for (const worker of workers) await worker.stop()
  await server?.stop()
})

async function startWorker() {
  const settings = {
    databaseUrl: database.url,
    smtpUrl: `smtp://127.0.0.1:${port}`,
    linkOrigin: 'https://turnwright.example.org',
    from: 'mail@turnwright.example.org',
  }
  workers.push(await runMailWorker(settings, (line) => lines.push(line)))
}

async function startServer() {
  server = await startLocalMailServer({ folder: folder.path, port })
}

interface JobRow {
  attempts: number
  lastError: string | null
}

async function jobs(): Promise<JobRow[]> {
  const query = sql<JobRow>`select attempts, last_error from graphile_worker.jobs where task_identifier = 'send-mail'`
  return (await query.execute(database.db)).rows
}

/** As if the time until the next attempt had passed. */
const hurry = () =>
  sql`update graphile_worker._private_jobs set run_at = now() where locked_at is null`.execute(database.db)

const farewell = (email: string) => ({ kind: 'account-deleted', displayName: 'Ada', email }) as const

test('the mail server is down, then up: the mail arrives once, and the job is gone', async () => {
  const { id: projectId, people } = await makeProject(database.db)
  const { id: invitationId } = await database.db
    .insertInto('invitations')
    .values({
      projectId,
      email: 'guest@hillside.example',
      role: 'viewer',
      invitedBy: people.owner.id,
      expiresAt: new Date(Date.now() + DAY),
    })
    .returning('id')
    .executeTakeFirstOrThrow()
  const invitation = () =>
    database.db.selectFrom('invitations').selectAll().where('id', '=', invitationId).executeTakeFirstOrThrow()
  await startWorker()
  await enqueueMail(database.db, { kind: 'invitation', invitationId })
  const [waiting] = await until(jobs, ([job]) => job?.lastError !== null && job?.lastError !== undefined)
  expect(waiting.lastError).toBe('Not sent: ESOCKET')
  expect((await invitation()).sendFault).toMatch(/can’t be reached/)

  await startServer()
  await hurry()
  await until(jobs, (left) => left.length === 0)
  const mails = await folder.mails()
  expect(mails).toHaveLength(1)
  const row = await invitation()
  expect(row).toMatchObject({ sendFault: null, sentAt: expect.any(Date) })
  const token =
    addressesIn(mails[0].text ?? '')[0]
      .split('/')
      .at(-1) ?? ''
  expect(row.tokenSha256).toBe(sha256Of(token))
  expect(lines.at(-1)).toBe('invitation: sent')
  expect(lines.join()).not.toMatch(new RegExp(`guest|${token}`))
})

test('a kind that this release does not know fails without harm to the others, and stays for one that does', async () => {
  await startServer()
  await startWorker()
  await sql`select graphile_worker.add_job('send-mail', '{"kind":"postcard"}'::json)`.execute(database.db)
  await until(jobs, ([job]) => Boolean(job?.lastError))
  await enqueueMail(database.db, farewell('ada@hillside.example'))
  await until(folder.mails, (mails) => mails.length === 1)
  expect(await until(jobs, (left) => left.length === 1)).toMatchObject([
    { lastError: 'This kind of mail is not known to this release' },
  ])
})

test('of several workers one takes each job', async () => {
  await startServer()
  await startWorker()
  await startWorker()
  const addresses = Array.from({ length: 12 }, (_, index) => `person.${index}@hillside.example`)
  for (const email of addresses) await enqueueMail(database.db, farewell(email))
  await until(jobs, (left) => left.length === 0)
  const recipients = (await folder.mails()).flatMap(({ to }) => (to && 'text' in to ? to.text : []))
  expect(recipients.sort()).toEqual(addresses.sort())
})

test('a mail of a transaction that is taken back is never sent', async () => {
  await startServer()
  await startWorker()
  const takenBack = database.db.transaction().execute(async (trx) => {
    await enqueueMail(trx, farewell('never@hillside.example'))
    throw new Error('taken back')
  })
  await expect(takenBack).rejects.toThrow('taken back')
  await enqueueMail(database.db, farewell('ada@hillside.example'))
  await until(jobs, (left) => left.length === 0)
  expect((await folder.mails()).map(({ to }) => to)).toMatchObject([{ text: 'ada@hillside.example' }])
})

test('told to stop, a worker ends, and what comes later waits', async () => {
  await startServer()
  await startWorker()
  await workers[0].stop()
  await workers[0].ended
  await enqueueMail(database.db, farewell('later@hillside.example'))
  expect(await jobs()).toMatchObject([{ attempts: 0 }])
  await startWorker()
  await until(folder.mails, (mails) => mails.length === 1)
})

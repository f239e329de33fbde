import nodemailer from 'nodemailer'
import { SMTPServer } from 'smtp-server'
import type { AddressInfo } from 'node:net'
import { afterEach, beforeAll, beforeEach, expect, test } from 'vitest'
import { startLocalMailServer, type LocalMailServer } from '@/db/mail/local-mail-server'
import { sendMail, type MailSender } from '@/db/mail/send-mail'
import { deleteExpiredMailTokens } from '@/db/queries/mail-tokens'
import { sha256Of } from '@/db/tokens'
import { addressesIn } from '@/lib/mail/addresses-in'
import type { MailJob } from '@/lib/schemas/mail-job'
import { openMailFolder } from '../support/local-mail'
import { openTestDatabase } from '../support/test-database'
import { makeAnalysis, makeNote, makeProject, makeRun, type TestProject } from '../support/test-project'

const database = openTestDatabase()
const folder = openMailFolder()
const ORIGIN = 'https://turnwright.example.org'
const NOBODY = '00000000-0000-4000-8000-000000000000'
const DAY = 86_400_000

let project: TestProject
let noteId: string
let server: LocalMailServer
let lines: string[]

beforeAll(async () => {
  project = await makeProject(database.db)
  const where = { projectId: project.id, cookie: project.people.owner.cookie }
  noteId = (await makeNote(where, (await makeAnalysis(where, (await makeRun(where)).id)).id)).id
})
beforeEach(async () => {
  server = await startLocalMailServer({ folder: folder.path })
  lines = []
})
afterEach(() => server.stop())

function sender(port = server.port): MailSender {
  return {
    db: database.db,
    transport: nodemailer.createTransport({ url: `smtp://127.0.0.1:${port}` }),
    from: 'Turnwright <mail@turnwright.example.org>',
    linkOrigin: ORIGIN,
    log: (line) => lines.push(line),
  }
}

const send = (job: MailJob, attempt = { number: 1, most: 20 }, port?: number) => sendMail(sender(port), job, attempt)

async function signUp(expiresAt = new Date(Date.now() + DAY)) {
  const values = {
    email: 'new.person@hillside.example',
    displayName: 'New',
    passwordHash: '$argon2id$x',
    browserSha256: 'a'.repeat(64),
    expiresAt,
  }
  return (await database.db.insertInto('signUps').values(values).returning('id').executeTakeFirstOrThrow()).id
}

let invitationCount = 0

async function invite(given: { expiresAt?: Date; revokedAt?: Date } = {}) {
  invitationCount += 1
  const values = {
    projectId: project.id,
    email: `guest.${invitationCount}@hillside.example`,
    role: 'editor' as const,
    invitedBy: project.people.owner.id,
    expiresAt: new Date(Date.now() + 14 * DAY),
    ...given,
  }
  return (await database.db.insertInto('invitations').values(values).returning('id').executeTakeFirstOrThrow()).id
}

const invitation = (id: string) =>
  database.db.selectFrom('invitations').selectAll().where('id', '=', id).executeTakeFirstOrThrow()

/** The token in the first link of the only mail that has come. */
async function tokenOfMail(): Promise<string> {
  const mails = await folder.mails()
  expect(mails).toHaveLength(1)
  const [address] = addressesIn(mails[0].text ?? '')
  return new URL(address).searchParams.get('token') ?? address.split('/').at(-1) ?? ''
}

test('a mail names its sender, its date and that a machine wrote it', async () => {
  await send({ kind: 'password-changed', userId: project.people.owner.id })
  const [mail] = await folder.mails()
  expect(mail.from?.text).toBe('"Turnwright" <mail@turnwright.example.org>')
  expect(mail.to).toMatchObject({ text: project.people.owner.email })
  expect(mail.messageId).toMatch(/^<[0-9a-f-]{36}@turnwright\.example\.org>$/)
  expect(mail.date).toBeInstanceOf(Date)
  expect(mail.headers.get('auto-submitted')).toBe('auto-generated')
  expect(mail.html).toContain('<html lang="en"')
  expect(lines).toEqual(['password-changed: sent'])
})

test('of the token in a sign-up’s mail the table keeps the SHA-256', async () => {
  const signUpId = await signUp()
  await send({ kind: 'sign-up', signUpId })
  const row = await database.db.selectFrom('signUps').selectAll().where('id', '=', signUpId).executeTakeFirstOrThrow()
  expect(row.tokenSha256).toBe(sha256Of(await tokenOfMail()))
})

test('of the token in an invitation’s mail the table keeps the SHA-256, and when it was sent', async () => {
  const invitationId = await invite()
  await send({ kind: 'invitation', invitationId })
  const row = await invitation(invitationId)
  expect(row.tokenSha256).toBe(sha256Of(await tokenOfMail()))
  expect(row.sentAt).toBeInstanceOf(Date)
  expect(row.sendFault).toBeNull()
})

test('sent again, an invitation has a new token, and the one before opens nothing', async () => {
  const invitationId = await invite()
  await send({ kind: 'invitation', invitationId })
  const first = (await invitation(invitationId)).tokenSha256
  await send({ kind: 'invitation', invitationId })
  const second = (await invitation(invitationId)).tokenSha256
  expect(second).not.toBe(first)
  expect(await folder.mails()).toHaveLength(2)
})

test.each([
  ['reset-password', 3600],
  ['change-email', 24 * 3600],
] as const)('%s: the table keeps the SHA-256, valid for %i s from then on', async (kind, validSeconds) => {
  const { id: userId, email } = project.people.editor
  await database.db.deleteFrom('emailTokens').execute()
  const to = kind === 'change-email' ? 'Other.Address@hillside.example' : email
  await send(
    kind === 'change-email' ? { kind, userId, email: to } : { kind: 'reset-password', email: email.toUpperCase() },
  )
  const rows = await database.db.selectFrom('emailTokens').selectAll().execute()
  expect(rows).toMatchObject([{ id: sha256Of(await tokenOfMail()), userId, purpose: kind, email: to }])
  expect(rows[0].expiresAt.getTime() - rows[0].createdAt.getTime()).toBe(validSeconds * 1000)
  expect((await folder.mails())[0].to).toMatchObject({ text: to })
})

test('a second wish for another address takes the place of the first; a second reset does not', async () => {
  const { id: userId, email } = project.people.editor
  await database.db.deleteFrom('emailTokens').execute()
  for (const other of ['one@hillside.example', 'two@hillside.example']) {
    await send({ kind: 'change-email', userId, email: other })
    await send({ kind: 'reset-password', email })
  }
  const rows = await database.db.selectFrom('emailTokens').select(['purpose', 'email']).execute()
  expect(rows.filter(({ purpose }) => purpose === 'change-email')).toMatchObject([{ email: 'two@hillside.example' }])
  expect(rows.filter(({ purpose }) => purpose === 'reset-password')).toHaveLength(2)
})

test('the old address hears of a change even after the account is gone', async () => {
  const { id: userId } = project.people.stranger
  await database.db
    .updateTable('users')
    .set({ deletedAt: new Date(), email: null, passwordHash: null })
    .where('id', '=', userId)
    .execute()
  await send({ kind: 'email-changed', userId, oldEmail: 'left@hillside.example' })
  await send({ kind: 'password-changed', userId })
  expect((await folder.mails()).map(({ to }) => to)).toMatchObject([{ text: 'left@hillside.example' }])
})

test('a mention goes to the member who was named, with a link to the analysis', async () => {
  const { viewer, owner } = project.people
  await database.db.insertInto('noteMentions').values({ noteId, userId: viewer.id }).execute()
  await send({ kind: 'mention', noteId, userId: viewer.id, actorId: owner.id })
  const [mail] = await folder.mails()
  expect(mail.subject).toBe('Olga Owner named you in a note on “First look”')
  expect(mail.text).toContain('> A calm night')
  expect(addressesIn(mail.text ?? '')[0]).toContain(`${ORIGIN}/projects/${project.id}/analyses/`)
})

test('an address is never read as a list of addresses', async () => {
  await send({ kind: 'account-deleted', displayName: 'Gone', email: 'a,b@hillside.example' }).catch(() => {})
  const recipients = (await folder.mails()).flatMap(({ to }) => to)
  expect(recipients.every((to) => to && 'value' in to && to.value.length === 1)).toBe(true)
  expect(lines).toHaveLength(1)
})

/** Jobs whose subject is gone, used, revoked or was never there. */
const nothingToSend: [string, () => Promise<MailJob>][] = [
  ['a sign-up that was used', async () => ({ kind: 'sign-up', signUpId: NOBODY })],
  ['a sign-up that ran out', async () => ({ kind: 'sign-up', signUpId: await signUp(new Date(Date.now() - 1000)) })],
  ['a reset for an address without an account', async () => ({ kind: 'reset-password', email: 'no@hillside.example' })],
  [
    'a change to an address that has an account',
    async () => ({ kind: 'change-email', userId: project.people.editor.id, email: project.people.owner.email }),
  ],
  ['an account that is gone', async () => ({ kind: 'password-changed', userId: NOBODY })],
  ['an invitation that is gone', async () => ({ kind: 'invitation', invitationId: NOBODY })],
  [
    'an invitation that ran out',
    async () => ({ kind: 'invitation', invitationId: await invite({ expiresAt: new Date(Date.now() - 1000) }) }),
  ],
  [
    'an invitation that was revoked',
    async () => ({ kind: 'invitation', invitationId: await invite({ revokedAt: new Date() }) }),
  ],
  [
    'a mention that was taken back',
    async () => ({ kind: 'mention', noteId, userId: project.people.editor.id, actorId: project.people.owner.id }),
  ],
  [
    'a mention of somebody who is no member',
    async () => {
      const { stranger, owner } = project.people
      await database.db.insertInto('noteMentions').values({ noteId, userId: stranger.id }).execute()
      return { kind: 'mention', noteId, userId: stranger.id, actorId: owner.id }
    },
  ],
  [
    'a mention by somebody who has been removed since',
    async () => {
      const { viewer, stranger } = project.people
      await database.db
        .insertInto('noteMentions')
        .values({ noteId, userId: viewer.id })
        .onConflict((conflict) => conflict.doNothing())
        .execute()
      return { kind: 'mention', noteId, userId: viewer.id, actorId: stranger.id }
    },
  ],
]

test.each(nothingToSend)('nothing is sent for %s, and the job is done', async (_, makeJob) => {
  const job = await makeJob()
  await send(job)
  expect(await folder.mails()).toEqual([])
  expect(lines).toEqual([`${job.kind}: nothing to send any more`])
})

test('a server that is down: the job fails, the invitation says why, and neither names the address', async () => {
  const invitationId = await invite()
  await server.stop()
  const job: MailJob = { kind: 'invitation', invitationId }
  await expect(send(job)).rejects.toThrow(/^Not sent: ESOCKET$/)
  expect(await invitation(invitationId)).toMatchObject({
    sentAt: null,
    sendFault: 'The mail server can’t be reached. The mail is sent by itself once it can.',
  })
  await expect(send(job, { number: 20, most: 20 })).rejects.toThrow()
  expect((await invitation(invitationId)).sendFault).toMatch(/given up\. Send it again/)
  expect(lines.join()).not.toContain('guest')
})

test('an address that the mail server knows to be wrong is not tried again', async () => {
  const strict = new SMTPServer({
    disabledCommands: ['AUTH', 'STARTTLS'],
    onRcptTo: (_address, _session, done) => done(Object.assign(new Error('no such user'), { responseCode: 550 })),
  })
  const { port } = await new Promise<AddressInfo>((resolve) => {
    strict.listen(0, '127.0.0.1', () => resolve(strict.server.address() as AddressInfo))
  })
  const invitationId = await invite()
  await send({ kind: 'invitation', invitationId }, undefined, port)
  expect((await invitation(invitationId)).sendFault).toMatch(/nobody receives mail at this address/)
  expect(lines).toEqual(['invitation: not sent (EENVELOPE 550), attempt 1 of 20, refused for good'])
  await new Promise<void>((resolve) => strict.close(() => resolve()))
})

test('what ran out is swept out, and nothing else', async () => {
  await database.db.deleteFrom('signUps').execute()
  await database.db.deleteFrom('emailTokens').execute()
  const { id: userId, email } = project.people.owner
  const kept = await signUp()
  await signUp(new Date(Date.now() - 1000))
  const token = { userId, email, purpose: 'reset-password' as const }
  await database.db
    .insertInto('emailTokens')
    .values([
      { ...token, id: 'a'.repeat(64), expiresAt: new Date(Date.now() - 1000) },
      { ...token, id: 'b'.repeat(64), expiresAt: new Date(Date.now() + DAY) },
    ])
    .execute()
  await deleteExpiredMailTokens(database.db)
  expect(await database.db.selectFrom('signUps').select('id').execute()).toEqual([{ id: kept }])
  expect(await database.db.selectFrom('emailTokens').select('id').execute()).toEqual([{ id: 'b'.repeat(64) }])
})

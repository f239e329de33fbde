import { expect, test } from 'vitest'
import { POST as ask } from '@/app/api/auth/reset-password/ask/route'
import { POST as reset } from '@/app/api/auth/reset-password/route'
import { POST as signIn } from '@/app/api/auth/sign-in/route'
import { GET as me } from '@/app/api/me/route'
import { isResetLinkOpen } from '@/lib/server/mail-links'
import { takeMailJobs, writeTokenMail } from '../support/mail-queue'
import { openTestDatabase } from '../support/test-database'
import { call, cookieOf, PASSWORD, signUpPerson, type Person } from '../support/test-server'

const database = openTestDatabase()
const NEW_PASSWORD = 'another quiet evening'

const post = (handler: unknown, body?: unknown, cookie?: string) =>
  call(handler, '/', {}, { method: 'POST', body, cookie })

const write = ({ id, email }: Person) => writeTokenMail(database.db, 'reset-password', { userId: id, email })

async function whoIs(cookie?: string) {
  const { user } = await (await call(me, '/api/me', {}, { cookie })).json()
  return user?.id ?? null
}

test('asking gets the same answer and does the same, whether or not the address has an account', async () => {
  const person = await signUpPerson('Known')
  await takeMailJobs(database.db)
  const answers = []
  for (const email of [person.email, 'nobody@example.org']) {
    const response = await post(ask, { email })
    answers.push({ status: response.status, body: await response.text(), headers: [...response.headers] })
  }
  expect(answers[0]).toEqual(answers[1])
  expect(answers[0].status).toBe(202)
  expect(await takeMailJobs(database.db)).toEqual([
    { kind: 'reset-password', email: person.email },
    { kind: 'reset-password', email: 'nobody@example.org' },
  ])
})

test('five mails an hour to one address, with an account or without, and no more', async () => {
  const person = await signUpPerson('Asked For')
  const refusals = []
  for (const email of [person.email, 'never.here@example.org']) {
    for (let count = 0; count < 5; count += 1) expect((await post(ask, { email })).status).toBe(202)
    const refused = await post(ask, { email: email.toUpperCase() })
    refusals.push({ status: refused.status, body: await refused.text() })
  }
  expect(refusals[0]).toEqual(refusals[1])
  expect(refusals[0].status).toBe(429)
})

test('a new password ends all sessions and links, opens a session and is told by mail', async () => {
  const person = await signUpPerson('Forgetful')
  const [token, older] = [await write(person), await write(person)]
  const change = await writeTokenMail(database.db, 'change-email', { userId: person.id, email: 'new@example.org' })
  await takeMailJobs(database.db)
  expect(await isResetLinkOpen(token)).toBe(true)

  const response = await post(reset, { token, password: NEW_PASSWORD })
  expect(response.status).toBe(204)
  expect(await whoIs(cookieOf(response))).toBe(person.id)
  expect(await whoIs(person.cookie)).toBeNull()
  expect(await takeMailJobs(database.db)).toEqual([{ kind: 'password-changed', userId: person.id }])
  expect(await isResetLinkOpen(older)).toBe(false)
  expect(await isResetLinkOpen(change)).toBe(false)
  expect(await database.db.selectFrom('emailTokens').select('id').where('userId', '=', person.id).execute()).toEqual([])
  expect((await post(signIn, { email: person.email, password: PASSWORD })).status).toBe(401)
  expect((await post(signIn, { email: person.email, password: NEW_PASSWORD })).status).toBe(200)
})

test('the sessions of others stay, but not in the browser where the link is followed', async () => {
  const [person, housemate] = [await signUpPerson('Person'), await signUpPerson('Housemate')]
  const elsewhere = await post(signIn, { email: housemate.email, password: PASSWORD })
  const response = await post(reset, { token: await write(person), password: NEW_PASSWORD }, housemate.cookie)
  expect(await whoIs(cookieOf(response))).toBe(person.id)
  expect(await whoIs(housemate.cookie)).toBeNull()
  expect(await whoIs(cookieOf(elsewhere))).toBe(housemate.id)
})

test('a link works once, also for two at once', async () => {
  const token = await write(await signUpPerson('Hasty'))
  const responses = await Promise.all([1, 2].map(() => post(reset, { token, password: NEW_PASSWORD })))
  expect(responses.map(({ status }) => status).sort()).toEqual([204, 410])
  const third = await post(reset, { token, password: NEW_PASSWORD })
  expect([third.status, (await third.json()).error.code]).toEqual([410, 'link-ended'])
  expect(third.headers.get('set-cookie')).toBeNull()
})

test('expired, unknown and other tokens change nothing', async () => {
  const person = await signUpPerson('Late')
  const expired = await write(person)
  await database.db
    .updateTable('emailTokens')
    .set({ expiresAt: new Date(Date.now() - 1000) })
    .where('userId', '=', person.id)
    .execute()
  const other = await writeTokenMail(database.db, 'change-email', { userId: person.id, email: 'late@example.org' })
  for (const token of [expired, other, 'never-sent']) {
    expect((await post(reset, { token, password: NEW_PASSWORD })).status).toBe(410)
    expect(await isResetLinkOpen(token)).toBe(false)
  }
  expect(await whoIs(person.cookie)).toBe(person.id)
  expect((await post(signIn, { email: person.email, password: PASSWORD })).status).toBe(200)
})

test('a password that is too short leaves the link as it was', async () => {
  const token = await write(await signUpPerson('Brief'))
  const response = await post(reset, { token, password: 'short' })
  expect(response.status).toBe(422)
  expect(Object.keys((await response.json()).error.fields)).toEqual(['password'])
  expect(await isResetLinkOpen(token)).toBe(true)
})

test('whoever was shut out by wrong passwords is let in again by the link', async () => {
  const person = await signUpPerson('Shut Out')
  for (let attempt = 0; attempt < 5; attempt += 1) await post(signIn, { email: person.email, password: 'wrong' })
  expect((await post(signIn, { email: person.email, password: PASSWORD })).status).toBe(429)
  expect((await post(reset, { token: await write(person), password: NEW_PASSWORD })).status).toBe(204)
  expect((await post(signIn, { email: person.email, password: NEW_PASSWORD })).status).toBe(200)
})

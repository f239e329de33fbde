import { expect, test } from 'vitest'
import { POST as signIn } from '@/app/api/auth/sign-in/route'
import { POST as signUp } from '@/app/api/auth/sign-up/route'
import { POST as verify } from '@/app/api/auth/verify-email/route'
import { GET as me } from '@/app/api/me/route'
import { sha256Of } from '@/db/tokens'
import { stateOfVerifyLink } from '@/lib/server/mail-links'
import { takeMailJobs, writeSignUpMail } from '../support/mail-queue'
import { openTestDatabase } from '../support/test-database'
import { call, cookieOf, makeAccount, PASSWORD, signUpPerson } from '../support/test-server'

const database = openTestDatabase()

const post = (handler: unknown, body?: unknown, cookie?: string) =>
  call(handler, '/', {}, { method: 'POST', body, cookie })

const form = (email: string, more: object = {}) => ({ displayName: 'Runa Velde', email, password: PASSWORD, ...more })

/** The secret that the browser is given, as it sends it back. */
function secretOf(response: Response): string {
  const [pair] = (response.headers.get('set-cookie') ?? '').split(';')
  expect(pair).toMatch(/^turnwright_sign_up=[\w-]{43}$/)
  return pair
}

async function whoIs(cookie?: string) {
  const { user } = await (await call(me, '/api/me', {}, { cookie })).json()
  return user?.email ?? null
}

function usersWith(email: string) {
  return database.db.selectFrom('users').select(['displayName']).where('email', '=', email).execute()
}

test('no account is made by signing up, only a mail with a link', async () => {
  await takeMailJobs(database.db)
  const response = await post(signUp, form('first@example.org'))
  expect(response.status).toBe(202)
  expect(await usersWith('first@example.org')).toEqual([])
  const { id } = await database.db.selectFrom('signUps').select('id').executeTakeFirstOrThrow()
  expect(await takeMailJobs(database.db)).toEqual([{ kind: 'sign-up', signUpId: id }])
  expect((await post(signIn, { email: 'first@example.org', password: PASSWORD })).status).toBe(401)
})

test('an address with an account and one without get the same answer: status, body, headers', async () => {
  const known = await makeAccount({ displayName: 'Known', email: 'Known@example.org', password: PASSWORD })
  await takeMailJobs(database.db)
  const answers = []
  for (const email of ['known@example.ORG', 'not.known@example.org']) {
    const response = await post(signUp, form(email))
    secretOf(response)
    const headers = [...response.headers].map(([name, value]) => [name, value.replace(/=[\w-]{43};/, '=…;')])
    answers.push({ status: response.status, body: await response.text(), headers })
  }
  expect(answers[0]).toEqual(answers[1])
  expect(answers[0]).toMatchObject({ status: 202, body: '{"status":"mail-on-its-way"}' })
  const jobs = await takeMailJobs(database.db)
  expect(jobs.map(({ kind }) => kind)).toEqual(['sign-up-again', 'sign-up'])
  expect(jobs[0]).toEqual({ kind: 'sign-up-again', userId: known.id })
  expect(await usersWith('Known@example.org')).toEqual([{ displayName: 'Known' }])
})

test('the browser’s secret comes in a cookie that scripts do not get, and only its hash is kept', async () => {
  const response = await post(signUp, form('secret@example.org'))
  const setCookie = response.headers.get('set-cookie') ?? ''
  expect(setCookie).toMatch(/HttpOnly/i)
  expect(setCookie).toMatch(/SameSite=Lax/i)
  expect(setCookie).toMatch(/Max-Age=86400/i)
  const row = await database.db
    .selectFrom('signUps')
    .selectAll()
    .where('email', '=', 'secret@example.org')
    .executeTakeFirstOrThrow()
  expect(row.browserSha256).toBe(sha256Of(secretOf(response).split('=')[1]))
  expect(row.passwordHash).toMatch(/^\$argon2id\$/)
  expect(row.tokenSha256).toBeNull()
})

test.each([
  ['no name', { displayName: ' ' }, 'displayName'],
  ['no address', { email: 'runa' }, 'email'],
  ['a short password', { password: '123456789' }, 'password'],
])('signing up with %s is refused beside that field', async (_, fault, field) => {
  const response = await post(signUp, { ...form('new@example.org'), ...fault })
  expect(response.status).toBe(422)
  expect(Object.keys((await response.json()).error.fields)).toEqual([field])
})

test.each([
  ['/bench?save=1&drift=2', '/bench?save=1&drift=2'],
  ['https://elsewhere.example/', '/projects'],
  [undefined, '/projects'],
  [`/bench?x=${'9'.repeat(3000)}`, '/bench'],
])('the link leads on to a path of this site: %s', async (next, expected) => {
  const email = `next.${Math.random()}@example.org`
  const cookie = secretOf(await post(signUp, form(email, { next })))
  const response = await post(verify, { token: await writeSignUpMail(database.db, email) }, cookie)
  expect(await response.json()).toEqual({ outcome: 'account-made', next: expected })
})

test('followed in the browser that signed up, the link makes the account and opens a session, once', async () => {
  const email = 'Same.Browser@example.org'
  const cookie = secretOf(await post(signUp, form(email)))
  const token = await writeSignUpMail(database.db, email)
  expect(await stateOfVerifyLink(token, cookie)).toBe('sign-up')
  // Looking uses nothing up.
  expect(await stateOfVerifyLink(token, cookie)).toBe('sign-up')

  const response = await post(verify, { token }, cookie)
  expect(response.status).toBe(200)
  expect(await whoIs(cookieOf(response))).toBe(email)
  expect(response.headers.getSetCookie()[1]).toMatch(/^turnwright_sign_up=;.*Max-Age=0/i)
  const { emailVerifiedAt } = await database.db
    .selectFrom('users')
    .select('emailVerifiedAt')
    .where('email', '=', email)
    .executeTakeFirstOrThrow()
  expect(emailVerifiedAt).not.toBeNull()

  const second = await post(verify, { token }, cookie)
  expect(second.status).toBe(410)
  expect((await second.json()).error.code).toBe('link-ended')
  expect(await stateOfVerifyLink(token, cookie)).toBe('ended')
})

test('two who follow the link at once make one account', async () => {
  const email = 'at.once@example.org'
  const cookie = secretOf(await post(signUp, form(email)))
  const token = await writeSignUpMail(database.db, email)
  const responses = await Promise.all([1, 2, 3].map(() => post(verify, { token }, cookie)))
  expect(responses.map(({ status }) => status).sort()).toEqual([200, 410, 410])
  expect(await usersWith(email)).toHaveLength(1)
})

test('another browser must know the password that was chosen', async () => {
  const email = 'other.browser@example.org'
  await post(signUp, form(email))
  const token = await writeSignUpMail(database.db, email)
  expect(await stateOfVerifyLink(token, null)).toBe('sign-up-elsewhere')
  const someoneElses = secretOf(await post(signUp, form('another@example.org')))
  for (const cookie of [undefined, someoneElses]) {
    const without = await post(verify, { token }, cookie)
    expect(without.status).toBe(422)
    expect((await without.json()).error.fields).toHaveProperty('password')
    const wrong = await post(verify, { token, password: 'not this one' }, cookie)
    expect(wrong.status).toBe(422)
    expect(wrong.headers.get('set-cookie')).toBeNull()
  }
  expect(await usersWith(email)).toEqual([])
  const right = await post(verify, { token, password: PASSWORD })
  expect(right.status).toBe(200)
  expect(await whoIs(cookieOf(right))).toBe(email)
})

test('the password behind a link can’t be guessed at length', async () => {
  const email = 'guessed@example.org'
  const cookie = secretOf(await post(signUp, form(email)))
  const token = await writeSignUpMail(database.db, email)
  const statuses: number[] = []
  for (let guess = 0; guess < 6; guess += 1) {
    statuses.push((await post(verify, { token, password: `guess ${guess}` })).status)
  }
  expect(statuses).toEqual([422, 422, 422, 422, 422, 429])
  expect((await post(verify, { token, password: PASSWORD })).status).toBe(429)
  // The browser that signed up is not kept out by another one's guesses.
  expect((await post(verify, { token }, cookie)).status).toBe(200)
})

test('two people who type one address do not get in each other’s way; whoever reads its mail decides', async () => {
  const email = 'contested@example.org'
  const theirs = secretOf(await post(signUp, form(email, { displayName: 'Intruder', password: 'of the intruder' })))
  const theirToken = await writeSignUpMail(database.db, email)
  const mine = secretOf(await post(signUp, form(email.toUpperCase(), { displayName: 'Reader' })))
  const myToken = await writeSignUpMail(database.db, email)

  // The reader follows the intruder's link with the own browser and the own password: no account of the intruder's.
  expect((await post(verify, { token: theirToken, password: PASSWORD }, mine)).status).toBe(422)
  const response = await post(verify, { token: myToken }, mine)
  expect(response.status).toBe(200)
  expect(await usersWith(email.toUpperCase())).toEqual([{ displayName: 'Reader' }])
  expect((await post(verify, { token: theirToken }, theirs)).status).toBe(410)
  expect((await post(signIn, { email, password: 'of the intruder' })).status).toBe(401)
  expect((await post(signIn, { email, password: PASSWORD })).status).toBe(200)
})

test('an address that got an account meanwhile: sign in', async () => {
  const email = 'meanwhile@example.org'
  const cookie = secretOf(await post(signUp, form(email)))
  const token = await writeSignUpMail(database.db, email)
  await makeAccount({ displayName: 'Invited', email: 'Meanwhile@example.org', password: 'another password' })
  const response = await post(verify, { token }, cookie)
  expect(response.status).toBe(409)
  expect(await response.json()).toMatchObject({ error: { code: 'in-use', message: expect.stringMatching(/Sign in/) } })
  expect(response.headers.get('set-cookie')).toBeNull()
  expect(await usersWith('Meanwhile@example.org')).toEqual([{ displayName: 'Invited' }])
  // Nothing is left of the sign-up.
  expect((await post(verify, { token }, cookie)).status).toBe(410)
})

test.each([
  ['never sent', 'no-such-token'],
  ['empty', ''],
  ['long', 'x'.repeat(201)],
])('a token that is %s opens nothing', async (what, token) => {
  const response = await post(verify, { token })
  expect(response.status).toBe(what === 'never sent' ? 410 : 422)
  expect(await stateOfVerifyLink(token, null)).toBe('ended')
})

test('a link that has run out opens nothing', async () => {
  const email = 'too.late@example.org'
  const cookie = secretOf(await post(signUp, form(email)))
  const token = await writeSignUpMail(database.db, email)
  await database.db
    .updateTable('signUps')
    .set({ expiresAt: new Date(Date.now() - 1000) })
    .where('email', '=', email)
    .execute()
  expect((await post(verify, { token }, cookie)).status).toBe(410)
  expect(await usersWith(email)).toEqual([])
})

test('following the link ends the session that the browser had', async () => {
  const before = await signUpPerson('Before')
  const email = 'after@example.org'
  const secret = secretOf(await post(signUp, form(email), before.cookie))
  const token = await writeSignUpMail(database.db, email)
  const response = await post(verify, { token }, `${before.cookie}; ${secret}`)
  expect(await whoIs(before.cookie)).toBeNull()
  expect(await whoIs(cookieOf(response))).toBe(email)
})

test('an earlier mail still works in a browser that asked twice', async () => {
  const email = 'twice@example.org'
  const first = secretOf(await post(signUp, form(email)))
  const token = await writeSignUpMail(database.db, email)
  const second = secretOf(await post(signUp, form(email), first))
  expect(second).toBe(first)
  expect((await post(verify, { token }, second)).status).toBe(200)
})

test('five mails an hour to one address, with an account or without, and no more', async () => {
  await makeAccount({ displayName: 'Pestered', email: 'pestered@example.org', password: PASSWORD })
  const refusals = []
  for (const email of ['pestered@example.org', 'free@example.org']) {
    const statuses: number[] = []
    for (let count = 0; count < 5; count += 1) statuses.push((await post(signUp, form(email))).status)
    expect(statuses).toEqual([202, 202, 202, 202, 202])
    const refused = await post(signUp, form(email.toUpperCase()))
    expect(Number(refused.headers.get('retry-after'))).toBeGreaterThan(3000)
    refusals.push({ status: refused.status, body: await refused.text() })
  }
  expect(refusals[0]).toEqual(refusals[1])
  expect(refusals[0].status).toBe(429)
})

import { beforeAll, expect, test } from 'vitest'
import { POST as signIn } from '@/app/api/auth/sign-in/route'
import { POST as signOut } from '@/app/api/auth/sign-out/route'
import { POST as signUp } from '@/app/api/auth/sign-up/route'
import { GET as health } from '@/app/api/health/route'
import { GET as me } from '@/app/api/me/route'
import { POST as createProject } from '@/app/api/projects/route'
import { DEFAULT_PREFERENCES } from '@/lib/schemas/preferences'
import { openTestDatabase } from '../support/test-database'
import { DRIVE_TRAIN } from '../support/test-project'
import { call, cookieOf, makeAccount, PASSWORD, signUpPerson } from '../support/test-server'

const database = openTestDatabase()

const person = { displayName: 'Ingrid Falk', email: 'Ingrid.Falk@Example.org', password: PASSWORD }

beforeAll(async () => {
  await makeAccount(person)
})

const post = (handler: unknown, body?: unknown, cookie?: string) =>
  call(handler, '/', {}, { method: 'POST', body, cookie })

async function whoIs(cookie?: string) {
  const { user } = await (await call(me, '/api/me', {}, { cookie })).json()
  return user?.displayName ?? null
}

test('a session comes in a cookie that scripts and other sites do not get', async () => {
  const response = await post(signIn, person)
  expect(response.status).toBe(200)
  expect(await response.json()).toEqual({
    user: {
      id: expect.any(String),
      displayName: person.displayName,
      email: person.email,
      preferences: DEFAULT_PREFERENCES,
    },
  })
  const setCookie = response.headers.get('set-cookie') ?? ''
  expect(setCookie).toMatch(/HttpOnly/i)
  expect(setCookie).toMatch(/SameSite=Lax/i)
  expect(setCookie).not.toMatch(/Secure/i)
  expect(await whoIs(cookieOf(response))).toBe(person.displayName)
  expect(await whoIs()).toBeNull()
})

test('the database holds neither the password nor the token', async () => {
  const signedUp = await signUpPerson('Otto')
  const token = signedUp.cookie.split('=')[1]
  const sessions = await database.db.selectFrom('sessions').select('id').execute()
  expect(sessions.map(({ id }) => id)).not.toContain(token)
  const users = await database.db.selectFrom('users').select('passwordHash').execute()
  for (const { passwordHash } of users) expect(passwordHash).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/)
  expect(await whoIs(`turnwright_session=${sessions[0].id}`)).toBeNull()
})

test('signing in, and out again', async () => {
  const response = await post(signIn, { email: person.email.toLowerCase(), password: PASSWORD })
  expect(response.status).toBe(200)
  const cookie = cookieOf(response)
  expect(await whoIs(cookie)).toBe(person.displayName)
  const out = await post(signOut, undefined, cookie)
  expect(out.status).toBe(204)
  expect(out.headers.get('set-cookie')).toMatch(/Max-Age=0/i)
  expect(await whoIs(cookie)).toBeNull()
})

test('signing in ends the session that the browser had', async () => {
  const first = await signUpPerson('Paula')
  const response = await post(signIn, { email: person.email, password: PASSWORD }, first.cookie)
  expect(await whoIs(first.cookie)).toBeNull()
  expect(await whoIs(cookieOf(response))).toBe(person.displayName)
})

test('a wrong password and an unknown address get the same answer', async () => {
  const wrong = await post(signIn, { email: person.email, password: 'something else' })
  const unknown = await post(signIn, { email: 'nobody@example.org', password: PASSWORD })
  expect([wrong.status, unknown.status]).toEqual([401, 401])
  expect(await wrong.json()).toEqual(await unknown.json())
})

test('five failures close an account to further attempts, even with the right password, and no other account', async () => {
  const email = 'patient@example.org'
  const other = { displayName: 'Ola', email: 'ola@example.org', password: PASSWORD }
  for (const account of [{ ...other, email }, other]) await makeAccount(account)
  for (let attempt = 1; attempt <= 5; attempt += 1) {
    expect((await post(signIn, { email, password: 'wrong' })).status).toBe(401)
  }
  const refused = await post(signIn, { email: email.toUpperCase(), password: PASSWORD })
  expect(refused.status).toBe(429)
  expect(Number(refused.headers.get('retry-after'))).toBeGreaterThan(800)
  expect((await refused.json()).error.message).toMatch(/Try again in 15 min, or set a new password/)
  // An address without an account is closed in the same way.
  const unknown: unknown[] = []
  for (let attempt = 1; attempt <= 6; attempt += 1) {
    unknown.push((await post(signIn, { email: 'nobody.at.all@example.org', password: 'wrong' })).status)
  }
  expect(unknown).toEqual([401, 401, 401, 401, 401, 429])
  expect((await post(signIn, { email: other.email, password: PASSWORD })).status).toBe(200)
  await database.db
    .updateTable('rateLimits')
    .set({ expiresAt: new Date(Date.now() - 1000) })
    .execute()
  expect((await post(signIn, { email, password: PASSWORD })).status).toBe(200)
})

test('guesses made at once are counted before they are looked at', async () => {
  const email = 'hurried@example.org'
  await makeAccount({ displayName: 'Hurried', email, password: PASSWORD })
  const guesses = Array.from({ length: 30 }, (_, index) => post(signIn, { email, password: `guess ${index}` }))
  const statuses = (await Promise.all(guesses)).map(({ status }) => status)
  expect(statuses.filter((status) => status === 401)).toHaveLength(5)
  expect(statuses.filter((status) => status === 429)).toHaveLength(25)
})

test('signing in does not use up the attempts of an address', async () => {
  const hits = () =>
    database.db.selectFrom('rateLimits').select('hits').where('key', '=', 'sign-in address shared').executeTakeFirst()
  const before = await hits()
  for (let round = 0; round < 3; round += 1) {
    expect((await post(signIn, { email: person.email, password: PASSWORD })).status).toBe(200)
  }
  expect(await hits()).toEqual(before)
})

test('with a trusted proxy the last forwarded address is counted, without one it is not believed', async () => {
  const signUpFrom = (address: string, index: number) =>
    call(
      signUp,
      '/',
      {},
      {
        method: 'POST',
        body: { displayName: 'Many', email: `many${address}${index}@example.org`, password: PASSWORD },
        headers: { 'x-forwarded-for': `10.0.0.${index}, ${address}` },
      },
    )
  process.env.TRUST_PROXY = '1'
  try {
    const statuses: number[] = []
    for (let index = 0; index < 21; index += 1) statuses.push((await signUpFrom('203.0.113.7', index)).status)
    expect(statuses).toEqual([...Array(20).fill(202), 429])
    expect((await signUpFrom('203.0.113.8', 1)).status).toBe(202)
  } finally {
    delete process.env.TRUST_PROXY
  }
  expect((await signUpFrom('203.0.113.7', 30)).status).toBe(202)
})

test('an expired session opens nothing', async () => {
  const guest = await signUpPerson('Late')
  await database.db
    .updateTable('sessions')
    .set({ expiresAt: new Date(Date.now() - 1000) })
    .where('userId', '=', guest.id)
    .execute()
  expect(await whoIs(guest.cookie)).toBeNull()
})

test('a session is extended while it is used, without a new cookie', async () => {
  const guest = await signUpPerson('Often')
  const soon = new Date(Date.now() + 24 * 3600 * 1000)
  await database.db.updateTable('sessions').set({ expiresAt: soon }).where('userId', '=', guest.id).execute()
  const response = await call(me, '/api/me', {}, { cookie: guest.cookie })
  expect(response.headers.get('set-cookie')).toBeNull()
  const { expiresAt } = await database.db
    .selectFrom('sessions')
    .select('expiresAt')
    .where('userId', '=', guest.id)
    .executeTakeFirstOrThrow()
  expect(expiresAt.getTime()).toBeGreaterThan(soon.getTime())
})

test.each([
  ['sign-up', signUp, { ...person, email: 'elsewhere@example.org' }],
  ['sign-in', signIn, { email: person.email, password: PASSWORD }],
  ['sign-out', signOut, undefined],
  ['projects', createProject, { name: 'Mount', driveTrain: DRIVE_TRAIN }],
])('%s is refused to pages of other sites', async (_, handler, body) => {
  const { cookie } = await signUpPerson('Careful')
  for (const origin of [null, 'https://elsewhere.example']) {
    const response = await call(handler, '/', {}, { method: 'POST', body, cookie, origin })
    expect(response.status).toBe(403)
    expect(response.headers.get('set-cookie')).toBeNull()
  }
  expect(await whoIs(cookie)).toBe('Careful')
})

test('signing in sweeps out expired sessions and counters', async () => {
  const { db } = database
  const past = new Date(Date.now() - 1000)
  const guest = await signUpPerson('Gone')
  await db.updateTable('sessions').set({ expiresAt: past }).where('userId', '=', guest.id).execute()
  await db.insertInto('rateLimits').values({ key: 'old', hits: 1, expiresAt: past }).execute()
  expect((await post(signIn, { email: person.email, password: PASSWORD })).status).toBe(200)
  expect(await db.selectFrom('sessions').select('id').where('userId', '=', guest.id).execute()).toEqual([])
  expect(await db.selectFrom('rateLimits').select('key').where('key', '=', 'old').execute()).toEqual([])
})

test('health answers while the database does', async () => {
  const response = await call(health, '/api/health')
  expect(response.status).toBe(200)
  expect(await response.json()).toEqual({ status: 'ok' })
})

import { describe, expect, test } from 'vitest'
import { POST as changeEmail } from '@/app/api/account/email/route'
import { POST as changePassword } from '@/app/api/account/password/route'
import { PATCH as changeAccount } from '@/app/api/account/route'
import { DELETE as endOthers, GET as listSessions } from '@/app/api/account/sessions/route'
import { DELETE as endSession } from '@/app/api/account/sessions/[sessionId]/route'
import { POST as signIn } from '@/app/api/auth/sign-in/route'
import { POST as verify } from '@/app/api/auth/verify-email/route'
import { GET as me } from '@/app/api/me/route'
import { deviceName } from '@/lib/server/device-name'
import { stateOfVerifyLink } from '@/lib/server/mail-links'
import { takeMailJobs, writeTokenMail } from '../support/mail-queue'
import { openTestDatabase } from '../support/test-database'
import { call, cookieOf, PASSWORD, signUpPerson, type Person } from '../support/test-server'

const database = openTestDatabase()
const NEW_PASSWORD = 'another quiet evening'

const post = (handler: unknown, body?: unknown, cookie?: string) =>
  call(handler, '/', {}, { method: 'POST', body, cookie })

async function whoIs(cookie?: string) {
  const { user } = await (await call(me, '/api/me', {}, { cookie })).json()
  return user
}

/** A further session of the person. */
async function signInAgain({ email }: Person, password = PASSWORD, userAgent = '') {
  const options = { method: 'POST', body: { email, password }, headers: { 'user-agent': userAgent } }
  return cookieOf(await call(signIn, '/', {}, options))
}

test('the name is changed for everybody to see', async () => {
  const person = await signUpPerson('Before')
  const response = await call(changeAccount, '/', {}, { ...person, method: 'PATCH', body: { displayName: ' After ' } })
  expect(response.status).toBe(200)
  expect((await response.json()).user.displayName).toBe('After')
  expect((await whoIs(person.cookie)).displayName).toBe('After')
  const empty = await call(changeAccount, '/', {}, { ...person, method: 'PATCH', body: { displayName: ' ' } })
  expect(Object.keys((await empty.json()).error.fields)).toEqual(['displayName'])
})

describe('the password', () => {
  test('is changed with the present one; other sessions and links end, this one stays, and a mail tells', async () => {
    const person = await signUpPerson('Careful')
    const other = await signInAgain(person)
    await writeTokenMail(database.db, 'reset-password', { userId: person.id, email: person.email })
    await takeMailJobs(database.db)
    const response = await post(changePassword, { password: PASSWORD, newPassword: NEW_PASSWORD }, person.cookie)
    expect(response.status).toBe(204)
    expect(await whoIs(person.cookie)).not.toBeNull()
    expect(await whoIs(other)).toBeNull()
    expect(await takeMailJobs(database.db)).toEqual([{ kind: 'password-changed', userId: person.id }])
    const tokens = database.db.selectFrom('emailTokens').select('id').where('userId', '=', person.id)
    expect(await tokens.execute()).toEqual([])
    expect((await post(signIn, { email: person.email, password: PASSWORD })).status).toBe(401)
    await signInAgain(person, NEW_PASSWORD)
  })

  test('stays as it is with a wrong one, which can’t be guessed at length', async () => {
    const person = await signUpPerson('Left Alone')
    const other = await signInAgain(person)
    const guess = (password: string) => post(changePassword, { password, newPassword: NEW_PASSWORD }, person.cookie)
    for (let attempt = 0; attempt < 5; attempt += 1) {
      const response = await guess(`guess ${attempt}`)
      expect(response.status).toBe(422)
      expect(Object.keys((await response.json()).error.fields)).toEqual(['password'])
    }
    expect((await guess(PASSWORD)).status).toBe(429)
    expect((await post(changeEmail, { email: 'x@example.org', password: PASSWORD }, person.cookie)).status).toBe(429)
    expect(await whoIs(other)).not.toBeNull()
    await signInAgain(person)
  })

  test('is refused when the new one is too short', async () => {
    const person = await signUpPerson('Brief')
    const response = await post(changePassword, { password: PASSWORD, newPassword: 'short' }, person.cookie)
    expect(Object.keys((await response.json()).error.fields)).toEqual(['newPassword'])
  })
})

describe('the address', () => {
  test('asking to change it gets the same answer whether the new one is free or not', async () => {
    const [person, other] = [await signUpPerson('Mover'), await signUpPerson('Settled')]
    await takeMailJobs(database.db)
    const answers = []
    for (const email of [other.email, 'free@example.org']) {
      const response = await post(changeEmail, { email, password: PASSWORD }, person.cookie)
      answers.push({ status: response.status, body: await response.text(), headers: [...response.headers] })
      expect(await takeMailJobs(database.db)).toEqual([{ kind: 'change-email', userId: person.id, email }])
    }
    expect(answers[0]).toEqual(answers[1])
    expect(answers[0].status).toBe(202)
    expect((await whoIs(person.cookie)).email).toBe(person.email)
  })

  test('asks for the password, and for no more than five mails an hour', async () => {
    const person = await signUpPerson('Restless')
    await takeMailJobs(database.db)
    const askFor = (password: string) => post(changeEmail, { email: 'other@example.org', password }, person.cookie)
    const wrong = await askFor('not this one')
    expect(wrong.status).toBe(422)
    expect(Object.keys((await wrong.json()).error.fields)).toEqual(['password'])
    expect(await takeMailJobs(database.db)).toEqual([])
    const statuses: number[] = []
    for (let count = 0; count < 5; count += 1) statuses.push((await askFor(PASSWORD)).status)
    expect(statuses).toEqual([202, 202, 202, 202, 429])
  })

  test('following the link changes it, ends other sessions and links, and tells the old address', async () => {
    const person = await signUpPerson('Moved')
    const other = await signInAgain(person)
    const email = 'moved.to@example.org'
    await writeTokenMail(database.db, 'reset-password', { userId: person.id, email: person.email })
    const token = await writeTokenMail(database.db, 'change-email', { userId: person.id, email })
    await takeMailJobs(database.db)
    expect(await stateOfVerifyLink(token, null)).toBe('change-email')
    const response = await post(verify, { token }, person.cookie)
    expect(await response.json()).toEqual({ outcome: 'address-changed', email })
    expect((await whoIs(person.cookie)).email).toBe(email)
    expect(await whoIs(other)).toBeNull()
    expect(await takeMailJobs(database.db)).toEqual([
      { kind: 'email-changed', userId: person.id, oldEmail: person.email },
    ])
    const tokens = database.db.selectFrom('emailTokens').select('id').where('userId', '=', person.id)
    expect(await tokens.execute()).toEqual([])
    expect((await post(verify, { token }, person.cookie)).status).toBe(410)
    expect((await post(signIn, { email: person.email, password: PASSWORD })).status).toBe(401)
    await signInAgain({ ...person, email })
  })

  test('followed where nobody is signed in, the link changes it and opens nothing', async () => {
    const person = await signUpPerson('Away')
    const token = await writeTokenMail(database.db, 'change-email', { userId: person.id, email: 'away.to@example.org' })
    const response = await post(verify, { token })
    expect(response.status).toBe(200)
    expect(response.headers.get('set-cookie')).toBeNull()
    expect(await whoIs(person.cookie)).toBeNull()
  })

  test('an address that got an account meanwhile is not taken, in whatever case', async () => {
    const [person, other] = [await signUpPerson('Second'), await signUpPerson('First')]
    const email = other.email.toUpperCase()
    const token = await writeTokenMail(database.db, 'change-email', { userId: person.id, email })
    const response = await post(verify, { token }, person.cookie)
    expect([response.status, (await response.json()).error.code]).toEqual([409, 'in-use'])
    expect((await whoIs(person.cookie)).email).toBe(person.email)
  })
})

describe('sessions', () => {
  const list = async (cookie: string) => (await (await call(listSessions, '/', {}, { cookie })).json()).sessions
  const firefox = 'Mozilla/5.0 (X11; Linux x86_64; rv:140.0) Gecko/20100101 Firefox/140.0'

  test('are listed with their devices, the one that asks first, and ended one by one', async () => {
    const person = await signUpPerson('Everywhere')
    const other = await signInAgain(person, PASSWORD, firefox)
    const sessions = await list(person.cookie)
    expect(sessions).toEqual([
      expect.objectContaining({ isThis: true, device: 'An unknown device' }),
      expect.objectContaining({ isThis: false, device: 'Firefox on Linux' }),
    ])
    // What is shown opens nothing, and is not what the cookie hashes to.
    expect(Object.keys(sessions[0]).sort()).toEqual(['createdAt', 'device', 'id', 'isThis', 'lastSeenAt'])
    const end = (sessionId: string, cookie = person.cookie) =>
      call(endSession, '/', { sessionId }, { method: 'DELETE', cookie })
    const stranger = await signUpPerson('Stranger')
    expect((await end(sessions[1].id, stranger.cookie)).status).toBe(404)
    expect(await whoIs(other)).not.toBeNull()
    expect((await end(sessions[1].id)).status).toBe(204)
    expect(await whoIs(other)).toBeNull()
    expect((await end(sessions[1].id)).status).toBe(404)
    expect((await end('no-uuid')).status).toBe(404)
    expect(await list(person.cookie)).toHaveLength(1)
  })

  test('all others end at once, and nobody else’s', async () => {
    const [person, stranger] = [await signUpPerson('Tidy'), await signUpPerson('Apart')]
    const others = [await signInAgain(person), await signInAgain(person)]
    expect((await call(endOthers, '/', {}, { method: 'DELETE', cookie: person.cookie })).status).toBe(204)
    for (const other of others) expect(await whoIs(other)).toBeNull()
    expect(await whoIs(person.cookie)).not.toBeNull()
    expect(await whoIs(stranger.cookie)).not.toBeNull()
  })

  test('expired ones are not shown', async () => {
    const person = await signUpPerson('Lapsed')
    const other = await signInAgain(person)
    expect(other).not.toBe(person.cookie)
    const [, second] = await list(person.cookie)
    await database.db
      .updateTable('sessions')
      .set({ expiresAt: new Date(Date.now() - 1000) })
      .where('publicId', '=', second.id)
      .execute()
    expect(await list(person.cookie)).toHaveLength(1)
  })

  test('use is noted at most every five minutes', async () => {
    const person = await signUpPerson('Seen')
    const seenAt = async (minutesAgo: number) => {
      const before = new Date(Date.now() - minutesAgo * 60_000)
      await database.db.updateTable('sessions').set({ lastSeenAt: before }).where('userId', '=', person.id).execute()
      await whoIs(person.cookie)
      const { lastSeenAt } = await database.db
        .selectFrom('sessions')
        .select('lastSeenAt')
        .where('userId', '=', person.id)
        .executeTakeFirstOrThrow()
      return lastSeenAt.getTime() > before.getTime()
    }
    expect(await seenAt(4)).toBe(false)
    expect(await seenAt(6)).toBe(true)
  })
})

test.each([
  [null, 'An unknown device'],
  ['curl/8.1', 'An unknown device'],
  ['Mozilla/5.0 (Windows NT 10.0; Win64; x64; rv:140.0) Gecko/20100101 Firefox/140.0', 'Firefox on Windows'],
  [
    'Mozilla/5.0 (Windows NT 10.0; Win64; x64) AppleWebKit/537.36 (KHTML, like Gecko) Chrome/156.0.0.0 Safari/537.36 Edg/156.0',
    'Edge on Windows',
  ],
  [
    'Mozilla/5.0 (Linux; Android 15; K) AppleWebKit/537.36 (KHTML, like Gecko) Chrome/156.0.0.0 Mobile Safari/537.36',
    'Chrome or Chromium on Android',
  ],
  [
    'Mozilla/5.0 (iPhone; CPU iPhone OS 18_5 like Mac OS X) AppleWebKit/605.1.15 (KHTML, like Gecko) Version/18.5 Mobile/15E148 Safari/604.1',
    'Safari on an iPhone',
  ],
  [
    'Mozilla/5.0 (Macintosh; Intel Mac OS X 10_15_7) AppleWebKit/605.1.15 (KHTML, like Gecko) Version/18.5 Safari/605.1.15',
    'Safari on a Mac',
  ],
  ['Something (X11; Linux x86_64)', 'A browser on Linux'],
])('%s is %s', (userAgent, device) => {
  expect(deviceName(userAgent)).toBe(device)
})

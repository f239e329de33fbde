import { sql } from 'kysely'
import { beforeEach, expect, test, vi } from 'vitest'
import { POST as changeEmail } from '@/app/api/account/email/route'
import { POST as changePassword } from '@/app/api/account/password/route'
import { DELETE as deleteAccount } from '@/app/api/account/route'
import { POST as reset } from '@/app/api/auth/reset-password/route'
import { POST as signIn } from '@/app/api/auth/sign-in/route'
import { POST as signUp } from '@/app/api/auth/sign-up/route'
import { POST as verify } from '@/app/api/auth/verify-email/route'
import { POST as accept } from '@/app/api/invitations/accept/route'
import { GET as me } from '@/app/api/me/route'
import { hashPassword } from '@/lib/server/passwords'
import { takeMailJobs, writeSignUpMail, writeTokenMail } from '../support/mail-queue'
import { openTestDatabase } from '../support/test-database'
import { insertPendingInvitation } from '../support/test-invitation'
import { makeProject } from '../support/test-project'
import { call, PASSWORD, signUpPerson, type Person } from '../support/test-server'

/*
 * What two requests at once, or one that overtakes a mail, must not leave behind. Where the order matters, a transaction of
 * the test's own holds the lock that the one of them waits for.
 */

const database = openTestDatabase()
const NEW_PASSWORD = 'another quiet evening'
/** Several rounds, since two requests at once do not meet each time. */
const ROUNDS = [1, 2, 3]

beforeEach(() => takeMailJobs(database.db))

const post = (handler: unknown, body: unknown, cookie?: string) =>
  call(handler, '/', {}, { method: 'POST', body, cookie })

const statuses = (responses: Response[]) => responses.map(({ status }) => status).sort()

async function isSignedIn(cookie: string): Promise<boolean> {
  return (await (await call(me, '/api/me', {}, { cookie })).json()).user !== null
}

const sessionsOf = ({ id }: Person) =>
  database.db.selectFrom('sessions').select('id').where('userId', '=', id).execute()

/** Until so many requests wait for a lock, or the last of them has been answered without waiting. */
async function untilWaiting(pending: Promise<Response>, most = 1): Promise<void> {
  let isAnswered = false
  void pending.then(() => (isAnswered = true))
  const isWaiting = async () => {
    const { rows } = await sql<{ count: number }>`select count(*)::int as count from pg_stat_activity
      where datname = current_database() and wait_event_type = 'Lock'`.execute(database.db)
    return rows[0].count >= most
  }
  await vi.waitUntil(async () => isAnswered || (await isWaiting()), { timeout: 20_000 })
}

test.each(ROUNDS)(
  'two links for a new password, followed at once: one is used, the other ended (round %i)',
  async () => {
    const person = await signUpPerson('Twice Sent')
    const write = () => writeTokenMail(database.db, 'reset-password', { userId: person.id, email: person.email })
    const tokens = [await write(), await write()]
    const responses = await Promise.all(tokens.map((token) => post(reset, { token, password: NEW_PASSWORD })))
    expect(statuses(responses)).toEqual([204, 410])
    expect(await sessionsOf(person)).toHaveLength(1)
  },
)

test.each(ROUNDS)('a reset and a change of address at once: one of them counts (round %i)', async (round) => {
  const person = await signUpPerson('Two Ways')
  const token = await writeTokenMail(database.db, 'reset-password', { userId: person.id, email: person.email })
  const email = `two.ways.${round}@example.net`
  const change = await writeTokenMail(database.db, 'change-email', { userId: person.id, email })
  const responses = await Promise.all([
    post(reset, { token, password: NEW_PASSWORD }),
    post(verify, { token: change }, person.cookie),
  ])
  expect(responses.filter(({ status }) => status === 410)).toHaveLength(1)
  expect(responses.filter(({ ok }) => ok)).toHaveLength(1)
})

test.each(ROUNDS)('two sign-ups with one address, confirmed at once: one account (round %i)', async (round) => {
  const email = `both.${round}@example.org`
  const links: { token: string; cookie: string }[] = []
  for (const displayName of ['First', 'Second']) {
    const response = await post(signUp, { displayName, email, password: PASSWORD })
    const [cookie] = (response.headers.get('set-cookie') ?? '').split(';')
    links.push({ token: await writeSignUpMail(database.db, email), cookie })
  }
  const responses = await Promise.all(links.map(({ token, cookie }) => post(verify, { token }, cookie)))
  expect(statuses(responses)).toEqual([200, 410])
  expect(await database.db.selectFrom('users').select('id').where('email', '=', email).execute()).toHaveLength(1)
})

test.each(['change', 'reset'] as const)(
  'a link to a new address that was asked for before the password changed is never sent (%s)',
  async (way) => {
    const person = await signUpPerson('Taken Over')
    const wish = await post(changeEmail, { email: 'intruder@example.net', password: PASSWORD }, person.cookie)
    expect(wish.status).toBe(202)
    if (way === 'change') {
      expect((await post(changePassword, { password: PASSWORD, newPassword: NEW_PASSWORD }, person.cookie)).ok).toBe(
        true,
      )
    } else {
      const token = await writeTokenMail(database.db, 'reset-password', { userId: person.id, email: person.email })
      expect((await post(reset, { token, password: NEW_PASSWORD })).ok).toBe(true)
    }
    expect(await takeMailJobs(database.db)).toEqual([{ kind: 'password-changed', userId: person.id }])
  },
)

test('of two wishes for a new address the later one is sent', async () => {
  const person = await signUpPerson('Undecided')
  for (const email of ['first@example.net', 'second@example.net']) {
    expect((await post(changeEmail, { email, password: PASSWORD }, person.cookie)).status).toBe(202)
  }
  expect(await takeMailJobs(database.db)).toEqual([
    { kind: 'change-email', userId: person.id, email: 'second@example.net' },
  ])
})

test('whoever signs in with the old password while it is being changed gets no session', async () => {
  const person = await signUpPerson('Overtaken')
  const passwordHash = await hashPassword(NEW_PASSWORD)
  const attempt = await database.db.transaction().execute(async (trx) => {
    await trx.updateTable('users').set({ passwordHash }).where('id', '=', person.id).execute()
    await trx.deleteFrom('sessions').where('userId', '=', person.id).execute()
    const pending = post(signIn, { email: person.email, password: PASSWORD })
    await untilWaiting(pending)
    return { pending }
  })
  const response = await attempt.pending
  expect([response.status, (await response.json()).error?.code]).toEqual([401, 'wrong-credentials'])
  expect(response.headers.get('set-cookie')).toBeNull()
  expect(await sessionsOf(person)).toEqual([])
})

test('of two changes from the same password at once one counts, and only its session stays', async () => {
  const person = await signUpPerson('Two Tabs')
  const other = (await post(signIn, { email: person.email, password: PASSWORD })).headers
    .get('set-cookie')!
    .split(';')[0]
  const passwords = ['the first new password', 'the second new password']
  const responses = await Promise.all(
    [person.cookie, other].map((cookie, index) =>
      post(changePassword, { password: PASSWORD, newPassword: passwords[index] }, cookie),
    ),
  )
  expect(responses.filter(({ status }) => status === 204)).toHaveLength(1)
  expect(await sessionsOf(person)).toHaveLength(1)
  const [changed] = responses.flatMap(({ status }, index) => (status === 204 ? [passwords[index]] : []))
  expect((await post(signIn, { email: person.email, password: changed })).status).toBe(200)
})

test('a session of an account that was deleted opens nothing', async () => {
  const person = await signUpPerson('Just Gone')
  await database.db
    .updateTable('users')
    .set({ deletedAt: new Date(), email: null, passwordHash: null, displayName: 'Former member' })
    .where('id', '=', person.id)
    .execute()
  expect(await isSignedIn(person.cookie)).toBe(false)
})

test('whoever joins a project while deleting the account is not left in it', async () => {
  const project = await makeProject(database.db)
  const person = await signUpPerson('Torn')
  const { token } = await insertPendingInvitation(database.db, project, { role: 'owner' })
  const remove = { method: 'DELETE', cookie: person.cookie, body: { email: person.email, password: PASSWORD } }
  const { joining, leaving } = await database.db.transaction().execute(async (trx) => {
    // Joining has begun and waits for the project's people, while the account is deleted.
    await trx.selectFrom('projects').select('id').where('id', '=', project.id).forNoKeyUpdate().execute()
    const joining = post(accept, { token }, person.cookie)
    await untilWaiting(joining)
    const leaving = call(deleteAccount, '/', {}, remove)
    await untilWaiting(leaving, 2)
    return { joining, leaving }
  })
  expect((await leaving).status).toBe(204)
  expect([200, 401]).toContain((await joining).status)
  const members = database.db.selectFrom('memberships').select('userId').where('projectId', '=', project.id)
  expect((await members.execute()).map(({ userId }) => userId)).not.toContain(person.id)
})

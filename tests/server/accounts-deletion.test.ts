import { sql } from 'kysely'
import { expect, test } from 'vitest'
import { GET as planOf } from '@/app/api/account/deletion/route'
import { DELETE as deleteAccount } from '@/app/api/account/route'
import { POST as signIn } from '@/app/api/auth/sign-in/route'
import { POST as signUp } from '@/app/api/auth/sign-up/route'
import { GET as me } from '@/app/api/me/route'
import { GET as listAuditEvents } from '@/app/api/projects/[projectId]/audit-events/route'
import { PATCH as changeRole } from '@/app/api/projects/[projectId]/members/[userId]/route'
import { GET as listMembers } from '@/app/api/projects/[projectId]/members/route'
import { GET as listRuns } from '@/app/api/projects/[projectId]/runs/route'
import { POST as createProject } from '@/app/api/projects/route'
import { lockPeople } from '@/db/queries/memberships'
import { openSession } from '@/lib/server/auth'
import { takeMailJobs, writeTokenMail } from '../support/mail-queue'
import { openTestDatabase } from '../support/test-database'
import { insertPendingInvitation } from '../support/test-invitation'
import { DRIVE_TRAIN, makeAnalysis, makeProject, makeRun, type TestProject } from '../support/test-project'
import { call, makeRequest, PASSWORD, signUpPerson, type Person } from '../support/test-server'

const database = openTestDatabase()

const remove = ({ cookie, email }: Person, form: object = {}) =>
  call(deleteAccount, '/', {}, { method: 'DELETE', cookie, body: { email, password: PASSWORD, ...form } })

const plan = async ({ cookie }: Person) => (await call(planOf, '/', {}, { cookie })).json()

async function isSignedIn({ cookie }: Person): Promise<boolean> {
  return (await (await call(me, '/api/me', {}, { cookie })).json()).user !== null
}

async function ownProject({ cookie }: Person, name: string): Promise<string> {
  const body = { name, driveTrain: DRIVE_TRAIN }
  return (await (await call(createProject, '/', {}, { method: 'POST', cookie, body })).json()).id
}

const row = (id: string) => database.db.selectFrom('users').selectAll().where('id', '=', id).executeTakeFirstOrThrow()

test('the plan names what is lost with its contents, what goes on, and what is in the way', async () => {
  const shared = await makeProject(database.db)
  const editor = shared.people.editor as Person
  const projectId = await ownProject(editor, 'Balcony mount')
  await makeAnalysis({ projectId, cookie: editor.cookie }, (await makeRun({ projectId, cookie: editor.cookie })).id)
  await makeRun({ projectId, cookie: editor.cookie })
  const { name } = await database.db
    .selectFrom('projects')
    .select('name')
    .where('id', '=', shared.id)
    .executeTakeFirstOrThrow()
  expect(await plan(editor)).toEqual({
    blocking: [],
    lost: [{ id: projectId, name: 'Balcony mount', runCount: 2, analysisCount: 1, correctionCount: 0 }],
    left: [{ id: shared.id, name }],
  })
  expect(await plan(shared.people.owner as Person)).toEqual({
    blocking: [{ id: shared.id, name }],
    lost: [],
    left: [],
  })
  expect(await plan(shared.people.stranger as Person)).toEqual({ blocking: [], lost: [], left: [] })
})

test('the last owner of a project with other members deletes nothing', async () => {
  const shared = await makeProject(database.db)
  const owner = shared.people.owner as Person
  const own = await ownProject(owner, 'Of my own')
  const response = await remove(owner)
  expect(response.status).toBe(409)
  const { error } = await response.json()
  expect(error.code).toBe('last-owner')
  expect(error.message).toMatch(/Make somebody else an owner first/)
  expect(await isSignedIn(owner)).toBe(true)
  expect((await row(owner.id)).deletedAt).toBeNull()
  expect(await database.db.selectFrom('projects').select('id').where('id', '=', own).execute()).toHaveLength(1)

  // Once somebody else is owner as well, nothing is in the way.
  await database.db
    .updateTable('memberships')
    .set({ role: 'owner' })
    .where('projectId', '=', shared.id)
    .where('userId', '=', (shared.people.editor as Person).id)
    .execute()
  expect((await remove(owner)).status).toBe(204)
  expect(await isSignedIn(owner)).toBe(false)
})

test('two owners who delete their accounts at once leave no project without one', async () => {
  const shared = await makeProject(database.db)
  const [owner, editor] = [shared.people.owner as Person, shared.people.editor as Person]
  await database.db
    .updateTable('memberships')
    .set({ role: 'owner' })
    .where('projectId', '=', shared.id)
    .where('userId', '=', editor.id)
    .execute()
  const statuses = (await Promise.all([remove(owner), remove(editor)])).map(({ status }) => status)
  expect(statuses.sort()).toEqual([204, 409])
  const owners = database.db.selectFrom('memberships').select('userId').where('projectId', '=', shared.id)
  expect(await owners.where('role', '=', 'owner').execute()).toHaveLength(1)
})

test('an owner who deletes their account while the other one leaves waits, and is then the last', async () => {
  const shared = await makeProject(database.db)
  const { owner, editor } = shared.people
  const other = { projectId: shared.id, userId: editor.id }
  await database.db
    .updateTable('memberships')
    .set({ role: 'owner' })
    .where('projectId', '=', other.projectId)
    .where('userId', '=', other.userId)
    .execute()
  let removal: Promise<Response> | undefined
  await database.db.transaction().execute(async (trx) => {
    await lockPeople(trx, shared.id)
    let isAnswered = false
    removal = remove(owner).finally(() => (isAnswered = true))
    // Either it waits for us, or it went ahead without.
    while (!isAnswered && !(await isSomebodyWaiting())) await new Promise((resolve) => setTimeout(resolve, 5))
    await trx
      .deleteFrom('memberships')
      .where('projectId', '=', other.projectId)
      .where('userId', '=', other.userId)
      .execute()
  })
  expect((await removal)?.status).toBe(409)
  expect((await row(owner.id)).deletedAt).toBeNull()
})

async function isSomebodyWaiting(): Promise<boolean> {
  const { rows } = await sql`select from pg_locks where not granted`.execute(database.db)
  return rows.length > 0
}

test.each([1, 2, 3])(
  'people of the same projects who go while their roles change wait for each other (round %i)',
  async () => {
    const shared = [await makeProject(database.db), await makeProject(database.db), await makeProject(database.db)]
    const owner = shared[0].people.owner
    const leaving = [await signUpPerson('First Leaver'), await signUpPerson('Second Leaver')]
    for (const { id: projectId } of shared) {
      const rows = leaving.map(({ id: userId }) => ({ projectId, userId, role: 'editor' as const }))
      await database.db.insertInto('memberships').values(rows).execute()
    }
    const demote = ({ id: projectId, people }: TestProject, userId: string) =>
      call(
        changeRole,
        '/',
        { projectId, userId },
        { method: 'PATCH', body: { from: 'editor', role: 'viewer' }, ...people.owner },
      )
    const [removals, changes] = await Promise.all([
      Promise.all(leaving.map((person) => remove(person))),
      Promise.all(shared.flatMap((project) => leaving.map(({ id }) => demote(project, id)))),
    ])
    expect(removals.map(({ status }) => status)).toEqual([204, 204])
    // Changed before the person went, or gone by then; a deadlock would answer 500.
    for (const { status } of changes) expect([200, 404]).toContain(status)
    const ids = leaving.map(({ id }) => id)
    expect(await database.db.selectFrom('memberships').select('userId').where('userId', 'in', ids).execute()).toEqual(
      [],
    )
    expect(await isSignedIn(owner)).toBe(true)
  },
)

test.each([
  ['another address', { email: 'another@example.org' }, 'email'],
  ['a wrong password', { password: 'not this one' }, 'password'],
])('with %s nothing is deleted', async (_, form, field) => {
  const person = await signUpPerson('Undecided')
  const response = await remove(person, form)
  expect(response.status).toBe(422)
  expect(Object.keys((await response.json()).error.fields)).toEqual([field])
  expect(await isSignedIn(person)).toBe(true)
})

test('an empty shell stays, which nothing opens', async () => {
  const person = await signUpPerson('Gone')
  const own = await ownProject(person, 'Alone')
  await makeRun({ projectId: own, cookie: person.cookie })
  await writeTokenMail(database.db, 'reset-password', { userId: person.id, email: person.email })
  await takeMailJobs(database.db)
  // Another browser in which they are signed in.
  await openSession(makeRequest('/'), person.id)
  const response = await remove(person, { email: person.email.toUpperCase() })
  expect(response.status).toBe(204)
  expect(response.headers.get('set-cookie')).toMatch(/Max-Age=0/i)
  expect(await takeMailJobs(database.db)).toEqual([
    { kind: 'account-deleted', displayName: 'Gone', email: person.email },
  ])
  expect(await row(person.id)).toMatchObject({
    displayName: 'Former member',
    email: null,
    passwordHash: null,
    emailVerifiedAt: null,
    deletedAt: expect.any(Date),
  })
  const left = await Promise.all([
    database.db.selectFrom('projects').select('id').where('id', '=', own).execute(),
    database.db.selectFrom('sessions').select('id').where('userId', '=', person.id).execute(),
    database.db.selectFrom('emailTokens').select('id').where('userId', '=', person.id).execute(),
    database.db.selectFrom('memberships').select('userId').where('userId', '=', person.id).execute(),
    database.db.selectFrom('auditEvents').select('id').where('subject', '=', person.email).execute(),
  ])
  expect(left).toEqual([[], [], [], [], []])
  expect(await isSignedIn(person)).toBe(false)
  const again = await call(signIn, '/', {}, { method: 'POST', body: { email: person.email, password: PASSWORD } })
  expect(again.status).toBe(401)
  // The address is free for a new account.
  const body = { displayName: 'Back', email: person.email, password: PASSWORD }
  expect((await call(signUp, '/', {}, { method: 'POST', body })).status).toBe(202)
  expect((await takeMailJobs(database.db)).map(({ kind }) => kind)).toEqual(['sign-up'])
})

test('in shared projects the work stays, its author is a former member, and the log keeps the name', async () => {
  const shared = await makeProject(database.db)
  const [owner, editor] = [shared.people.owner as Person, shared.people.editor as Person]
  await makeRun({ projectId: shared.id, cookie: editor.cookie })
  const ask = async (handler: unknown) =>
    (await call(handler, '/', { projectId: shared.id }, { cookie: owner.cookie })).json()
  const { events } = await ask(listAuditEvents)
  const named = events.filter(({ actorName }: { actorName: string }) => actorName === editor.displayName)
  expect(named.length).toBeGreaterThan(0)

  expect((await remove(editor)).status).toBe(204)
  const { runs } = await ask(listRuns)
  expect(runs.map(({ createdBy }: { createdBy: string }) => createdBy)).toEqual(['Former member'])
  const { members } = await ask(listMembers)
  expect(members.map(({ userId }: { userId: string }) => userId)).not.toContain(editor.id)
  const after = await ask(listAuditEvents)
  expect(after.events).toEqual(expect.arrayContaining(named))
})

test('invitations that wait for an answer are revoked', async () => {
  const shared = await makeProject(database.db)
  const owner = shared.people.owner as Person
  await database.db
    .updateTable('memberships')
    .set({ role: 'owner' })
    .where('projectId', '=', shared.id)
    .where('userId', '=', (shared.people.editor as Person).id)
    .execute()
  const { id } = await insertPendingInvitation(database.db, shared)
  expect((await remove(owner)).status).toBe(204)
  const invitation = await database.db
    .selectFrom('invitations')
    .select(['revokedAt', 'revokedBy'])
    .where('id', '=', id)
    .executeTakeFirstOrThrow()
  expect(invitation).toEqual({ revokedAt: expect.any(Date), revokedBy: owner.id })
})

import { sql } from 'kysely'
import { beforeEach, expect, test, vi } from 'vitest'
import { DELETE as removeMember, PATCH as changeRole } from '@/app/api/projects/[projectId]/members/[userId]/route'
import { GET as listMembers } from '@/app/api/projects/[projectId]/members/route'
import { GET as listAuditEvents } from '@/app/api/projects/[projectId]/audit-events/route'
import { POST as invite } from '@/app/api/projects/[projectId]/invitations/route'
import { DELETE as deleteProject, GET as findProject } from '@/app/api/projects/[projectId]/route'
import type { Role } from '@/lib/schemas/api'
import { openTestDatabase } from '../support/test-database'
import { makeProject, type TestProject } from '../support/test-project'
import { call, signUpPerson, type Person } from '../support/test-server'

const database = openTestDatabase()
let project: TestProject

beforeEach(async () => {
  project = await makeProject(database.db)
})

const at = (userId: string) => ({ projectId: project.id, userId })

function change(asker: Person, userId: string, from: Role, role: Role) {
  return call(changeRole, '/', at(userId), { method: 'PATCH', body: { from, role }, cookie: asker.cookie })
}

function remove(asker: Person, userId: string) {
  return call(removeMember, '/', at(userId), { method: 'DELETE', cookie: asker.cookie })
}

async function rolesOf(): Promise<Record<string, Role>> {
  const rows = await database.db
    .selectFrom('memberships')
    .select(['userId', 'role'])
    .where('projectId', '=', project.id)
    .execute()
  return Object.fromEntries(rows.map(({ userId, role }) => [userId, role]))
}

async function events(): Promise<{ actorName: string; action: string; subject: string }[]> {
  const { cookie } = project.people.owner
  const response = await call(listAuditEvents, '/', { projectId: project.id }, { cookie })
  return (await response.json()).events
}

async function codeOf(response: Response): Promise<[number, string]> {
  return [response.status, (await response.json()).error.code]
}

test('an owner changes a role, and the history says from what to what', async () => {
  const { owner, editor } = project.people
  const response = await change(owner, editor.id, 'editor', 'viewer')
  expect(response.status).toBe(200)
  expect(await response.json()).toMatchObject({ userId: editor.id, displayName: 'Edda Editor', role: 'viewer' })
  expect((await rolesOf())[editor.id]).toBe('viewer')
  expect((await events())[0]).toMatchObject({
    actorName: 'Olga Owner',
    action: 'member.change',
    subject: 'Edda Editor, from editor to viewer',
  })
})

test('a role that somebody else changed meanwhile is not overwritten', async () => {
  const { owner, editor } = project.people
  await change(owner, editor.id, 'editor', 'owner')
  const response = await change(owner, editor.id, 'editor', 'viewer')
  expect(response.status).toBe(409)
  expect((await response.json()).error).toMatchObject({ code: 'changed-meanwhile', current: { role: 'owner' } })
  expect((await rolesOf())[editor.id]).toBe('owner')
})

test('a removed member meets the answer of a stranger from the next request on, and what was made stays', async () => {
  const { owner, editor } = project.people
  const read = () => call(findProject, '/', { projectId: project.id }, editor)
  expect((await read()).status).toBe(200)
  expect((await remove(owner, editor.id)).status).toBe(204)
  expect((await read()).status).toBe(404)
  expect((await remove(owner, editor.id)).status).toBe(404)
  expect((await events())[0]).toMatchObject({ action: 'member.remove', subject: 'Edda Editor, an editor' })
})

test.each(['viewer', 'editor'] as const)('a %s leaves without asking anyone', async (role) => {
  const person = project.people[role]
  expect((await remove(person, person.id)).status).toBe(204)
  expect(await rolesOf()).not.toHaveProperty(person.id)
  expect((await events())[0]).toMatchObject({ actorName: person.displayName, action: 'member.leave' })
})

test('nobody but an owner removes others or changes a role, their own included', async () => {
  const { owner, editor, viewer } = project.people
  for (const asker of [editor, viewer]) {
    expect((await remove(asker, owner.id)).status).toBe(403)
    expect((await change(asker, asker.id, 'viewer', 'owner')).status).toBe(403)
  }
  expect(await rolesOf()).toEqual({ [owner.id]: 'owner', [editor.id]: 'editor', [viewer.id]: 'viewer' })
})

test('the last owner can neither leave nor give the role up', async () => {
  const { owner, editor } = project.people
  expect(await codeOf(await remove(owner, owner.id))).toEqual([409, 'last-owner'])
  const refused = await change(owner, owner.id, 'owner', 'editor')
  expect(refused.status).toBe(409)
  expect((await refused.json()).error).toMatchObject({
    code: 'last-owner',
    message: expect.stringContaining('Make somebody else an owner first'),
  })
  expect((await rolesOf())[owner.id]).toBe('owner')

  expect((await change(owner, editor.id, 'editor', 'owner')).status).toBe(200)
  expect((await remove(owner, owner.id)).status).toBe(204)
  expect(await codeOf(await remove(editor, editor.id))).toEqual([409, 'last-owner'])
})

/** Several rounds, since two requests at once do not meet each time. */
const ROUNDS = [1, 2, 3, 4, 5]

async function twoOwners(): Promise<[Person, Person]> {
  const { owner, editor } = project.people
  expect((await change(owner, editor.id, 'editor', 'owner')).status).toBe(200)
  return [owner, editor]
}

test.each(ROUNDS)('two owners who demote each other at once: one of them succeeds (round %i)', async () => {
  const [first, second] = await twoOwners()
  const responses = await Promise.all([
    change(first, second.id, 'owner', 'viewer'),
    change(second, first.id, 'owner', 'viewer'),
  ])
  expect(responses.map(({ status }) => status).sort()).toEqual([200, 403])
  expect(Object.values(await rolesOf()).filter((role) => role === 'owner')).toHaveLength(1)
})

test.each(ROUNDS)('two owners who leave at once: one of them stays (round %i)', async () => {
  const [first, second] = await twoOwners()
  const responses = await Promise.all([remove(first, first.id), remove(second, second.id)])
  expect(responses.map(({ status }) => status).sort()).toEqual([204, 409])
  expect(Object.values(await rolesOf()).filter((role) => role === 'owner')).toHaveLength(1)
})

test.each(ROUNDS)('two owners who remove each other at once: one of them stays (round %i)', async () => {
  const [first, second] = await twoOwners()
  const responses = await Promise.all([remove(first, second.id), remove(second, first.id)])
  expect(responses.map(({ status }) => status).sort()).toEqual([204, 404])
  expect(Object.values(await rolesOf()).filter((role) => role === 'owner')).toHaveLength(1)
})

test('an owner who is demoted while inviting or deleting the project does neither', async () => {
  const [owner, second] = await twoOwners()
  const params = { projectId: project.id }
  const attempts: [unknown, object][] = [
    [invite, { method: 'POST', body: { email: 'accomplice@example.org', role: 'owner' } }],
    [deleteProject, { method: 'DELETE', body: { name: 'Test mount' } }],
  ]
  const pending = await database.db.transaction().execute(async (trx) => {
    await trx.selectFrom('projects').select('id').where('id', '=', project.id).forNoKeyUpdate().execute()
    const asked = attempts.map(([handler, options]) => call(handler, '/', params, { ...options, cookie: owner.cookie }))
    await vi.waitUntil(
      async () => {
        const { rows } = await sql<{ count: number }>`select count(*)::int as count from pg_stat_activity
          where datname = current_database() and wait_event_type = 'Lock'`.execute(database.db)
        return rows[0].count === attempts.length
      },
      { timeout: 20_000 },
    )
    await trx
      .updateTable('memberships')
      .set({ role: 'viewer' })
      .where('projectId', '=', project.id)
      .where('userId', '=', owner.id)
      .execute()
    return { asked }
  })
  for (const response of await Promise.all(pending.asked)) expect(response.status).toBe(403)
  expect((await rolesOf())[second.id]).toBe('owner')
  const invitations = database.db.selectFrom('invitations').select('id').where('projectId', '=', project.id)
  expect(await invitations.execute()).toEqual([])
})

test('people of an archived project can still leave and be let go', async () => {
  const { owner, editor, viewer } = project.people
  await database.db
    .updateTable('projects')
    .set({ archivedAt: new Date(), archivedBy: owner.id })
    .where('id', '=', project.id)
    .execute()
  expect((await remove(viewer, viewer.id)).status).toBe(204)
  expect((await change(owner, editor.id, 'editor', 'viewer')).status).toBe(200)
})

test('somebody who is no member can be neither changed nor removed', async () => {
  const { owner } = project.people
  const outsider = await signUpPerson('Otto Outsider')
  expect((await change(owner, outsider.id, 'viewer', 'editor')).status).toBe(404)
  expect((await remove(owner, outsider.id)).status).toBe(404)
})

test('members see who is here, and no address of anyone', async () => {
  const { viewer } = project.people
  const response = await call(listMembers, '/', { projectId: project.id }, viewer)
  const text = await response.text()
  expect(JSON.parse(text).members).toHaveLength(3)
  expect(text).not.toContain('@')
})

test('a role that does not exist is refused', async () => {
  const { owner, editor } = project.people
  const body = { from: 'editor', role: 'admin' }
  const response = await call(changeRole, '/', at(editor.id), { method: 'PATCH', body, cookie: owner.cookie })
  expect(response.status).toBe(422)
})

import { randomUUID } from 'node:crypto'
import { beforeAll, describe, expect, test } from 'vitest'
import { accessProject, hasRight, type Right } from '@/db/queries/access'
import { insertProject } from '@/db/queries/projects'
import { Refusal } from '@/db/queries/refusal'
import { insertUser } from '@/db/queries/users'
import type { Role } from '@/lib/schemas/api'
import { openTestDatabase } from '../support/test-database'

const database = openTestDatabase()
const driveTrain = { axisKind: 'worm' as const, wheelTeeth: 152, wormStarts: 1, stages: [] }

let projectId: string
const users: Partial<Record<Role | 'stranger', string>> = {}

beforeAll(async () => {
  for (const name of ['owner', 'editor', 'viewer', 'stranger'] as const) {
    const person = { displayName: name, email: `${name}@example.org`, passwordHash: '$argon2id$x' }
    users[name] = (await insertUser(database.db, person))!.id
  }
  const access = await database.db
    .transaction()
    .execute((trx) => insertProject(trx, users.owner!, { name: 'Mount', driveTrain }))
  projectId = access.projectId
  await database.db
    .insertInto('memberships')
    .values((['editor', 'viewer'] as const).map((role) => ({ projectId, userId: users[role]!, role })))
    .execute()
})

/** Written out once more by hand, so that a slip in the one table of rights is seen here. */
const EXPECTED: [Role | 'stranger', Right, 'granted' | 'forbidden' | 'unknown'][] = [
  ['stranger', 'read', 'unknown'],
  ['stranger', 'edit', 'unknown'],
  ['stranger', 'manage', 'unknown'],
  ['viewer', 'read', 'granted'],
  ['viewer', 'edit', 'forbidden'],
  ['viewer', 'manage', 'forbidden'],
  ['editor', 'read', 'granted'],
  ['editor', 'edit', 'granted'],
  ['editor', 'manage', 'forbidden'],
  ['owner', 'read', 'granted'],
  ['owner', 'edit', 'granted'],
  ['owner', 'manage', 'granted'],
]

async function outcome(userId: string, project: string, right: Right): Promise<string> {
  try {
    await accessProject(database.db, { userId, projectId: project, right })
    return 'granted'
  } catch (error) {
    return error instanceof Refusal ? error.reason.kind : String(error)
  }
}

describe('role × right', () => {
  test.each(EXPECTED)('%s asks to %s: %s', async (role, right, expected) => {
    expect(await outcome(users[role]!, projectId, right)).toBe(expected)
  })

  test('a project that does not exist looks like one that is not yours', async () => {
    expect(await outcome(users.owner!, randomUUID(), 'read')).toBe('unknown')
    expect(await outcome(randomUUID(), projectId, 'read')).toBe('unknown')
  })

  test('the proof names project, person and role', async () => {
    const access = await accessProject(database.db, { userId: users.editor!, projectId, right: 'read' })
    expect(access).toEqual({ projectId, userId: users.editor, role: 'editor' })
    expect([hasRight(access, 'edit'), hasRight(access, 'manage')]).toEqual([true, false])
  })

  test('a lost membership is a lost access', async () => {
    await database.db.deleteFrom('memberships').where('userId', '=', users.viewer!).execute()
    expect(await outcome(users.viewer!, projectId, 'read')).toBe('unknown')
  })
})

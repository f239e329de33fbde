import { sql } from 'kysely'
import { beforeAll, beforeEach, describe, expect, test } from 'vitest'
import * as auditEvents from '@/app/api/projects/[projectId]/audit-events/route'
import * as notes from '@/app/api/projects/[projectId]/analyses/[analysisId]/notes/route'
import * as note from '@/app/api/projects/[projectId]/notes/[noteId]/route'
import * as resolution from '@/app/api/projects/[projectId]/notes/[noteId]/resolution/route'
import type { MailJob } from '@/lib/schemas/mail-job'
import { openTestDatabase } from '../support/test-database'
import { makeAnalysis, makeProject, makeRun, type TestProject } from '../support/test-project'
import { call, signUpPerson, type Person } from '../support/test-server'

const database = openTestDatabase()

let project: TestProject
let people: TestProject['people']
let projectId: string
let analysisId: string
/** Somebody who is a member, but of another project. */
let elsewhere: string

beforeAll(async () => {
  project = await makeProject(database.db)
  projectId = project.id
  people = project.people
  const owner = { projectId, cookie: people.owner.cookie }
  analysisId = (await makeAnalysis(owner, (await makeRun(owner)).id)).id
  elsewhere = (await makeProject(database.db)).people.editor.id
})

beforeEach(async () => {
  await sql`delete from graphile_worker._private_jobs`.execute(database.db)
})

async function mentionMails(): Promise<MailJob[]> {
  const { rows } = await sql<{
    payload: MailJob
  }>`select payload from graphile_worker._private_jobs order by id`.execute(database.db)
  return rows.map(({ payload }) => payload).filter(({ kind }) => kind === 'mention')
}

const anchor = { kind: 'whole' }

function write(by: Person, mentions: string[], text = 'Look at this') {
  const body = { anchor, text, mentions }
  return call(notes.POST, '/', { projectId, analysisId }, { method: 'POST', body, cookie: by.cookie })
}

function change(by: Person, noteId: string, body: { version: number; text?: string; mentions?: string[] }) {
  const whole = { anchor, text: 'Look at this', ...body }
  return call(note.PATCH, '/', { projectId, noteId }, { method: 'PATCH', body: whole, cookie: by.cookie })
}

function settle(by: Person, noteId: string, body: { version: number; isResolved: boolean }) {
  return call(resolution.PUT, '/', { projectId, noteId }, { method: 'PUT', body, cookie: by.cookie })
}

async function latestActions(count: number): Promise<string[]> {
  const response = await call(auditEvents.GET, `/?limit=${count}`, { projectId }, { cookie: people.owner.cookie })
  return (await response.json()).events.map(({ action }: { action: string }) => action)
}

async function joinAsViewer(name: string): Promise<Person> {
  const person = await signUpPerson(name)
  await database.db.insertInto('memberships').values({ projectId, userId: person.id, role: 'viewer' }).execute()
  return person
}

describe('who is named in a note', () => {
  test('is kept with it, and gets one mail', async () => {
    const written = await (await write(people.editor, [people.owner.id, people.viewer.id, people.owner.id])).json()
    expect(written.mentions).toEqual([
      { userId: people.owner.id, displayName: 'Olga Owner' },
      { userId: people.viewer.id, displayName: 'Viktor Viewer' },
    ])
    const common = { kind: 'mention', noteId: written.id, actorId: people.editor.id }
    expect(await mentionMails()).toEqual([
      { ...common, userId: people.owner.id },
      { ...common, userId: people.viewer.id },
    ])
  })

  test('gets no mail from naming themselves', async () => {
    const written = await (await write(people.editor, [people.editor.id])).json()
    expect(written.mentions).toHaveLength(1)
    expect(await mentionMails()).toEqual([])
  })

  test('gets no second mail when the text is changed; who is added gets one', async () => {
    const { id } = await (await write(people.editor, [people.owner.id])).json()
    const changed = await change(people.editor, id, { version: 1, mentions: [people.viewer.id, people.owner.id] })
    expect((await changed.json()).mentions).toHaveLength(2)
    expect((await mentionMails()).map((job) => 'userId' in job && job.userId)).toEqual([
      people.owner.id,
      people.viewer.id,
    ])
  })

  test('is no longer named once the name is taken out', async () => {
    const { id } = await (await write(people.editor, [people.owner.id, people.viewer.id])).json()
    const changed = await (await change(people.editor, id, { version: 1, mentions: [people.viewer.id] })).json()
    expect(changed.mentions.map(({ userId }: { userId: string }) => userId)).toEqual([people.viewer.id])
    expect((await (await change(people.editor, id, { version: 2 })).json()).mentions).toEqual([])
  })

  test('gets another mail when they are named anew', async () => {
    const { id } = await (await write(people.editor, [people.viewer.id])).json()
    await change(people.editor, id, { version: 1, mentions: [] })
    await change(people.editor, id, { version: 2, mentions: [people.viewer.id] })
    expect((await mentionMails()).map((job) => 'userId' in job && job.userId)).toEqual([
      people.viewer.id,
      people.viewer.id,
    ])
  })

  test.each([
    ['a stranger', () => people.stranger.id],
    ['a member of another project', () => elsewhere],
    ['nobody', () => '5f0c0b9e-7d3c-4a58-9f0a-3d2f6b1c9e11'],
  ])('must be a member: %s is refused, and nothing is kept or sent', async (_, userId) => {
    const response = await write(people.editor, [people.owner.id, userId()], 'To a stranger')
    expect(response.status).toBe(422)
    const { error } = await response.json()
    expect(error).toMatchObject({ code: 'not-valid', fields: { mentions: expect.stringContaining('no member') } })
    expect(await mentionMails()).toEqual([])
    const kept = await database.db.selectFrom('notes').select('id').where('text', '=', 'To a stranger').execute()
    expect(kept).toEqual([])

    const { id } = await (await write(people.editor, [])).json()
    expect((await change(people.editor, id, { version: 1, mentions: [userId()] })).status).toBe(422)
    expect((await change(people.editor, id, { version: 1, text: 'Still version 1' })).status).toBe(200)
  })

  test('may have left since: the note can still be changed, but they can’t be named anew', async () => {
    const guest = await joinAsViewer('Gesa Guest')
    const { id } = await (await write(people.editor, [guest.id])).json()
    await database.db.deleteFrom('memberships').where('userId', '=', guest.id).execute()
    const changed = await (await change(people.editor, id, { version: 1, mentions: [guest.id], text: 'More' })).json()
    expect(changed).toMatchObject({ version: 2, text: 'More', mentions: [{ userId: guest.id }] })
    expect(await mentionMails()).toHaveLength(1)
    expect((await write(people.editor, [guest.id])).status).toBe(422)
  })

  test('gets no mail from a change that comes too late', async () => {
    const { id } = await (await write(people.editor, [])).json()
    await change(people.editor, id, { version: 1, text: 'First' })
    const late = await change(people.owner, id, { version: 1, text: 'Second', mentions: [people.viewer.id] })
    expect(late.status).toBe(409)
    expect((await late.json()).error).toMatchObject({
      code: 'changed-meanwhile',
      changedBy: 'Edda Editor',
      current: { text: 'First', version: 2, mentions: [], updatedByName: 'Edda Editor' },
    })
    expect(await mentionMails()).toEqual([])
  })
})

describe('a note is settled', () => {
  test('by whoever may edit, not only its author, and taken up again', async () => {
    const { id } = await (await write(people.owner, [])).json()
    const settled = await (await settle(people.editor, id, { version: 1, isResolved: true })).json()
    expect(settled).toMatchObject({ resolvedByName: 'Edda Editor', resolvedAt: expect.any(String), version: 1 })
    expect(settled.updatedAt).toBe(settled.createdAt)
    const open = await (await settle(people.owner, id, { version: 1, isResolved: false })).json()
    expect(open).toMatchObject({ resolvedByName: null, resolvedAt: null })
    expect(await latestActions(2)).toEqual(['note.reopen', 'note.resolve'])
  })

  test('once: whoever settles it again changes nothing', async () => {
    const { id } = await (await write(people.owner, [])).json()
    const first = await (await settle(people.editor, id, { version: 1, isResolved: true })).json()
    const second = await settle(people.owner, id, { version: 1, isResolved: true })
    expect([second.status, await second.json()]).toEqual([200, first])
    expect(await latestActions(2)).toEqual(['note.resolve', 'note.write'])
  })

  test('only from the text as it stands', async () => {
    const { id } = await (await write(people.owner, [])).json()
    await change(people.owner, id, { version: 1, text: 'Something else' })
    const late = await settle(people.editor, id, { version: 1, isResolved: true })
    expect(late.status).toBe(409)
    expect((await late.json()).error).toMatchObject({ changedBy: 'Olga Owner', current: { resolvedAt: null } })
  })

  test('while its text is being changed, and both are kept', async () => {
    const { id } = await (await write(people.owner, [])).json()
    await settle(people.editor, id, { version: 1, isResolved: true })
    const changed = await change(people.owner, id, { version: 1, text: 'Mended on Sunday' })
    expect(await changed.json()).toMatchObject({ text: 'Mended on Sunday', resolvedByName: 'Edda Editor', version: 2 })
  })

  test.each([
    ['viewer', 403],
    ['stranger', 404],
  ] as const)('not by a %s: %i', async (role, status) => {
    const { id } = await (await write(people.owner, [])).json()
    expect((await settle(people[role], id, { version: 1, isResolved: true })).status).toBe(status)
  })
})

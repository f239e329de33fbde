import { beforeEach, expect, test } from 'vitest'
import * as project from '@/app/api/projects/[projectId]/route'
import { GET as listAnalyses } from '@/app/api/projects/[projectId]/analyses/route'
import { GET as downloadArchive } from '@/app/api/projects/[projectId]/archive/route'
import { PUT as setArchived } from '@/app/api/projects/[projectId]/archived/route'
import { GET as getContents } from '@/app/api/projects/[projectId]/contents/route'
import { POST as uploadRun } from '@/app/api/projects/[projectId]/runs/route'
import { newToken } from '@/db/tokens'
import { openTestDatabase } from '../support/test-database'
import {
  makeAnalysis,
  makeNote,
  makeProject,
  makeRun,
  makeTable,
  recordingText,
  type TestProject,
} from '../support/test-project'
import { call, type Person } from '../support/test-server'

const database = openTestDatabase()

let shared: TestProject
let owner: Person

beforeEach(async () => {
  shared = await makeProject(database.db)
  owner = shared.people.owner
})

const at = (person: Person, method = 'GET', body?: unknown) => ({ method, body, cookie: person.cookie })
const params = () => ({ projectId: shared.id })
const archive = (version: number, isArchived: boolean) =>
  call(setArchived, '/', params(), at(owner, 'PUT', { version, isArchived }))

async function fill() {
  const where = { projectId: shared.id, cookie: owner.cookie }
  const analysis = await makeAnalysis(where, (await makeRun(where)).id)
  await makeNote(where, analysis.id)
  await makeTable(where, analysis.id)
  const link = { projectId: shared.id, analysisId: analysis.id, createdBy: owner.id }
  await database.db
    .insertInto('shareLinks')
    .values([
      { ...link, token: newToken() },
      { ...link, token: newToken(), expiresAt: new Date(Date.now() - 1000) },
      { ...link, token: newToken(), revokedAt: new Date(), revokedBy: owner.id },
    ])
    .execute()
}

const events = (where: { projectId: string } | { actorId: string }) =>
  Object.entries(where)
    .reduce(
      (query, [column, value]) => query.where(column as 'projectId' | 'actorId', '=', value),
      database.db.selectFrom('auditEvents').select(['projectId', 'action', 'subject']),
    )
    .orderBy('at', 'desc')
    .execute()

test('an archived project is read on, and changed by nobody until an owner opens it again', async () => {
  const body = new TextEncoder().encode(recordingText())
  const upload = () => call(uploadRun, '/?fileName=a.csv', params(), at(shared.people.editor, 'POST', body))
  const archived = await archive(1, true)
  expect([archived.status, await archived.json()]).toMatchObject([200, { archivedAt: expect.any(String), version: 2 }])

  const refused = await upload()
  expect([refused.status, (await refused.json()).error.code]).toEqual([409, 'archived'])
  const renaming = await call(project.PATCH, '/', params(), at(owner, 'PATCH', { version: 2, name: 'Other' }))
  expect([renaming.status, (await renaming.json()).error.code]).toEqual([409, 'archived'])
  const { viewer } = shared.people
  for (const read of [project.GET, listAnalyses, getContents]) {
    expect((await call(read, '/', params(), at(viewer))).status).toBe(200)
  }
  const download = await call(downloadArchive, '/', params(), at(viewer))
  expect(download.status).toBe(200)
  await download.body?.cancel()

  const stale = await archive(1, false)
  expect([stale.status, (await stale.json()).error.code]).toEqual([409, 'changed-meanwhile'])
  const opened = await archive(2, false)
  expect([opened.status, await opened.json()]).toMatchObject([200, { archivedAt: null, name: 'Test mount' }])
  expect((await upload()).status).toBe(201)
  expect((await events({ projectId: shared.id })).map(({ action }) => action)).toEqual(
    expect.arrayContaining(['project.archive', 'project.reopen']),
  )
})

test('what goes with a project is counted, its links only where they open something', async () => {
  await fill()
  const counts = await (await call(getContents, '/', params(), at(shared.people.viewer))).json()
  expect(counts).toEqual({
    runCount: 1,
    runBytes: recordingText().length,
    analysisCount: 1,
    noteCount: 1,
    correctionCount: 1,
    memberCount: 3,
    shareLinkCount: 1,
    invitationCount: 0,
  })
})

test('a project is deleted by its name, with all that is in it; who did it stays in the account’s own trail', async () => {
  await fill()
  const remove = (name: unknown) => call(project.DELETE, '/', params(), at(owner, 'DELETE', { name }))
  for (const wrong of ['test mount', 'Test', '']) {
    const refused = await remove(wrong)
    expect([refused.status, (await refused.json()).error.fields]).toEqual([
      422,
      { name: expect.stringContaining('Test mount') },
    ])
  }
  expect((await call(project.GET, '/', params(), at(owner))).status).toBe(200)

  expect((await remove(' Test mount ')).status).toBe(204)
  expect((await call(project.GET, '/', params(), at(owner))).status).toBe(404)
  for (const table of ['runs', 'analyses', 'corrections', 'memberships', 'shareLinks', 'auditEvents'] as const) {
    const rows = await database.db.selectFrom(table).select('projectId').where('projectId', '=', shared.id).execute()
    expect(rows, table).toEqual([])
  }
  expect((await events({ actorId: owner.id }))[0]).toEqual({
    projectId: null,
    action: 'project.delete',
    subject: 'Test mount',
  })
})

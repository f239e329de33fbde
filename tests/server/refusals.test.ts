import { beforeAll, describe, expect, test } from 'vitest'
import * as projects from '@/app/api/projects/route'
import * as project from '@/app/api/projects/[projectId]/route'
import * as archive from '@/app/api/projects/[projectId]/archive/route'
import * as archived from '@/app/api/projects/[projectId]/archived/route'
import * as contents from '@/app/api/projects/[projectId]/contents/route'
import * as driveTrain from '@/app/api/projects/[projectId]/drive-train/route'
import * as members from '@/app/api/projects/[projectId]/members/route'
import * as member from '@/app/api/projects/[projectId]/members/[userId]/route'
import * as invitations from '@/app/api/projects/[projectId]/invitations/route'
import * as invitation from '@/app/api/projects/[projectId]/invitations/[invitationId]/route'
import * as resend from '@/app/api/projects/[projectId]/invitations/[invitationId]/resend/route'
import * as auditEvents from '@/app/api/projects/[projectId]/audit-events/route'
import * as history from '@/app/api/projects/[projectId]/history/route'
import * as presets from '@/app/api/projects/[projectId]/optics-presets/route'
import * as preset from '@/app/api/projects/[projectId]/optics-presets/[presetId]/route'
import * as runs from '@/app/api/projects/[projectId]/runs/route'
import * as run from '@/app/api/projects/[projectId]/runs/[runId]/route'
import * as runImport from '@/app/api/projects/[projectId]/runs/[runId]/import/route'
import * as runColumns from '@/app/api/projects/[projectId]/runs/[runId]/columns/route'
import * as runFile from '@/app/api/projects/[projectId]/runs/[runId]/file/route'
import * as analyses from '@/app/api/projects/[projectId]/analyses/route'
import * as analysis from '@/app/api/projects/[projectId]/analyses/[analysisId]/route'
import * as notes from '@/app/api/projects/[projectId]/analyses/[analysisId]/notes/route'
import * as shareLinks from '@/app/api/projects/[projectId]/analyses/[analysisId]/share-links/route'
import * as shareLink from '@/app/api/projects/[projectId]/share-links/[linkId]/route'
import * as note from '@/app/api/projects/[projectId]/notes/[noteId]/route'
import * as noteResolution from '@/app/api/projects/[projectId]/notes/[noteId]/resolution/route'
import * as corrections from '@/app/api/projects/[projectId]/corrections/route'
import * as correction from '@/app/api/projects/[projectId]/corrections/[correctionId]/route'
import * as download from '@/app/api/projects/[projectId]/corrections/[correctionId]/download/route'
import { defaultRecipe } from '@/lib/schemas/recipe'
import { unknownRunFacts } from '@/lib/schemas/run-facts'
import { openTestDatabase } from '../support/test-database'
import {
  CONVERSION,
  DRIVE_TRAIN,
  makeAnalysis,
  makeNote,
  makePreset,
  makeProject,
  makeRun,
  makeTable,
  OPTICS,
  recordingText,
  SETTINGS,
  someResult,
  type Role,
  type TestProject,
} from '../support/test-project'
import { insertPendingInvitation, newAddress } from '../support/test-invitation'
import { call, signUpPerson } from '../support/test-server'

const database = openTestDatabase()

/** Rights that a handler asks for: who gets through. */
const READ: Role[] = ['viewer', 'editor', 'owner']
const EDIT: Role[] = ['editor', 'owner']
const MANAGE: Role[] = ['owner']

let shared: TestProject
let ids: Record<string, string>

interface Fresh {
  /** Made anew for each call, so that one person's deletion does not spoil the next one's. */
  runId: () => Promise<string>
  presetId: () => Promise<string>
  analysisId: () => Promise<string>
  noteId: () => Promise<string>
  correctionId: () => Promise<string>
  linkId: () => Promise<string>
  /** An editor beside the shared ones. */
  userId: () => Promise<string>
  invitationId: () => Promise<string>
}

let fresh: Fresh

beforeAll(async () => {
  shared = await makeProject(database.db)
  const owner = { projectId: shared.id, cookie: shared.people.owner.cookie }
  const runId = async () => (await makeRun(owner)).id
  const analysisId = async () => (await makeAnalysis(owner, await runId())).id
  fresh = {
    runId,
    analysisId,
    presetId: async () => (await makePreset(owner)).id,
    noteId: async () => (await makeNote(owner, await analysisId())).id,
    correctionId: async () => (await makeTable(owner, await analysisId())).id,
    linkId: async () => {
      const params = { projectId: shared.id, analysisId: await analysisId() }
      const options = { method: 'POST', body: SHARED, cookie: shared.people.owner.cookie }
      return (await (await call(shareLinks.POST, '/', params, options)).json()).id
    },
    userId: async () => {
      const { id } = await signUpPerson('Emil Editor')
      await database.db.insertInto('memberships').values({ projectId: shared.id, userId: id, role: 'editor' }).execute()
      return id
    },
    invitationId: async () => (await insertPendingInvitation(database.db, shared)).id,
  }
  ids = {}
  for (const [name, make] of Object.entries(fresh)) ids[name] = await make()
})

type Method = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE'

interface Case {
  method: Method
  module: Partial<Record<Method, unknown>>
  may: Role[]
  status: number
  /** Names of further parts of the address; `fresh` ones are made for each call. */
  part?: string
  fresh?: keyof Fresh
  query?: string
  body?: () => unknown
}

const SHARED = { preface: 'Read this', expiresAt: null, noteIds: [] }
const anyNote = { anchor: { kind: 'whole' }, text: 'Seen' }
const cases: [string, Case][] = [
  ['GET project', { method: 'GET', module: project, may: READ, status: 200 }],
  [
    'PATCH project',
    // A version from before: whoever may change it learns that it was changed, the others nothing.
    { method: 'PATCH', module: project, may: MANAGE, status: 409, body: () => ({ version: 999, name: 'New' }) },
  ],
  [
    'DELETE project',
    // Another name than the project's: whoever may delete it is asked for the right one.
    { method: 'DELETE', module: project, may: MANAGE, status: 422, body: () => ({ name: 'Another mount' }) },
  ],
  [
    'PUT archived',
    { method: 'PUT', module: archived, may: MANAGE, status: 409, body: () => ({ version: 999, isArchived: true }) },
  ],
  ['GET archive', { method: 'GET', module: archive, may: READ, status: 200 }],
  ['GET contents', { method: 'GET', module: contents, may: READ, status: 200 }],
  [
    'PUT drive-train',
    {
      method: 'PUT',
      module: driveTrain,
      may: EDIT,
      status: 409,
      body: () => ({ version: 999, driveTrain: DRIVE_TRAIN }),
    },
  ],
  ['GET members', { method: 'GET', module: members, may: READ, status: 200 }],
  [
    'PATCH members/…',
    {
      method: 'PATCH',
      module: member,
      may: MANAGE,
      status: 200,
      fresh: 'userId',
      body: () => ({ from: 'editor', role: 'viewer' }),
    },
  ],
  ['DELETE members/… (somebody else)', { method: 'DELETE', module: member, may: MANAGE, status: 204, fresh: 'userId' }],
  ['GET invitations', { method: 'GET', module: invitations, may: MANAGE, status: 200 }],
  [
    'POST invitations',
    {
      method: 'POST',
      module: invitations,
      may: MANAGE,
      status: 201,
      body: () => ({ email: newAddress(), role: 'viewer' }),
    },
  ],
  ['DELETE invitations/…', { method: 'DELETE', module: invitation, may: MANAGE, status: 204, fresh: 'invitationId' }],
  ['POST invitations/…/resend', { method: 'POST', module: resend, may: MANAGE, status: 200, fresh: 'invitationId' }],
  ['GET audit-events', { method: 'GET', module: auditEvents, may: READ, status: 200 }],
  ['GET history', { method: 'GET', module: history, may: READ, status: 200 }],
  ['GET optics-presets', { method: 'GET', module: presets, may: READ, status: 200 }],
  ['POST optics-presets', { method: 'POST', module: presets, may: EDIT, status: 201, body: () => OPTICS }],
  [
    'PATCH optics-presets/…',
    {
      method: 'PATCH',
      module: preset,
      may: EDIT,
      status: 200,
      fresh: 'presetId',
      body: () => ({ ...OPTICS, version: 1 }),
    },
  ],
  ['DELETE optics-presets/…', { method: 'DELETE', module: preset, may: EDIT, status: 204, fresh: 'presetId' }],
  ['GET runs', { method: 'GET', module: runs, may: READ, status: 200 }],
  [
    'POST runs',
    {
      method: 'POST',
      module: runs,
      may: EDIT,
      status: 201,
      query: '?fileName=a.csv',
      body: () => new TextEncoder().encode(recordingText()),
    },
  ],
  ['GET runs/…', { method: 'GET', module: run, may: READ, status: 200, part: 'runId' }],
  [
    'PATCH runs/…',
    {
      method: 'PATCH',
      module: run,
      may: EDIT,
      status: 200,
      fresh: 'runId',
      body: () => ({ version: 2, name: 'Renamed', conversion: CONVERSION, facts: unknownRunFacts() }),
    },
  ],
  ['DELETE runs/…', { method: 'DELETE', module: run, may: EDIT, status: 204, fresh: 'runId' }],
  [
    'PUT runs/…/import',
    {
      method: 'PUT',
      module: runImport,
      may: EDIT,
      status: 200,
      fresh: 'runId',
      body: () => ({ version: 2, settings: SETTINGS, conversion: CONVERSION, facts: unknownRunFacts() }),
    },
  ],
  ['GET runs/…/columns', { method: 'GET', module: runColumns, may: READ, status: 200, part: 'runId' }],
  ['GET runs/…/file', { method: 'GET', module: runFile, may: READ, status: 200, part: 'runId' }],
  ['GET analyses', { method: 'GET', module: analyses, may: READ, status: 200 }],
  [
    'POST analyses',
    {
      method: 'POST',
      module: analyses,
      may: EDIT,
      status: 201,
      body: () => ({ runId: ids.runId, name: 'Look', recipe: defaultRecipe(), result: someResult() }),
    },
  ],
  ['GET analyses/…', { method: 'GET', module: analysis, may: READ, status: 200, part: 'analysisId' }],
  [
    'PATCH analyses/…',
    {
      method: 'PATCH',
      module: analysis,
      may: EDIT,
      status: 200,
      fresh: 'analysisId',
      body: () => ({ version: 1, name: 'Renamed' }),
    },
  ],
  ['DELETE analyses/…', { method: 'DELETE', module: analysis, may: EDIT, status: 204, fresh: 'analysisId' }],
  ['GET notes', { method: 'GET', module: notes, may: READ, status: 200, part: 'analysisId' }],
  ['POST notes', { method: 'POST', module: notes, may: EDIT, status: 201, part: 'analysisId', body: () => anyNote }],
  [
    "PATCH notes/… (the owner's)",
    {
      method: 'PATCH',
      module: note,
      may: MANAGE,
      status: 200,
      fresh: 'noteId',
      body: () => ({ ...anyNote, version: 1 }),
    },
  ],
  [
    "PUT notes/…/resolution (the owner's)",
    {
      method: 'PUT',
      module: noteResolution,
      may: EDIT,
      status: 200,
      fresh: 'noteId',
      body: () => ({ version: 1, isResolved: true }),
    },
  ],
  ["DELETE notes/… (the owner's)", { method: 'DELETE', module: note, may: MANAGE, status: 204, fresh: 'noteId' }],
  ['GET share-links', { method: 'GET', module: shareLinks, may: EDIT, status: 200, part: 'analysisId' }],
  [
    'POST share-links',
    { method: 'POST', module: shareLinks, may: EDIT, status: 201, part: 'analysisId', body: () => SHARED },
  ],
  [
    'PATCH share-links/…',
    {
      method: 'PATCH',
      module: shareLink,
      may: EDIT,
      status: 200,
      fresh: 'linkId',
      body: () => ({ ...SHARED, version: 1 }),
    },
  ],
  ['DELETE share-links/…', { method: 'DELETE', module: shareLink, may: EDIT, status: 204, fresh: 'linkId' }],
  ['GET corrections', { method: 'GET', module: corrections, may: READ, status: 200 }],
  [
    'POST corrections',
    {
      method: 'POST',
      module: corrections,
      may: EDIT,
      status: 201,
      body: () => ({
        analysisId: ids.analysisId,
        name: 'Another',
        kind: 'stand-alone',
        isAssumedSenseConfirmed: true,
      }),
    },
  ],
  ['GET corrections/…', { method: 'GET', module: correction, may: READ, status: 200, part: 'correctionId' }],
  ['DELETE corrections/…', { method: 'DELETE', module: correction, may: EDIT, status: 204, fresh: 'correctionId' }],
  [
    'GET corrections/…/download',
    { method: 'GET', module: download, may: READ, status: 200, part: 'correctionId', query: '?format=csv' },
  ],
]

const ROLES: Role[] = ['none', 'stranger', 'viewer', 'editor', 'owner']
const REFUSED: Record<Role, number> = { none: 401, stranger: 404, viewer: 403, editor: 403, owner: 403 }

async function ask(item: Case, role: Role, { origin, projectId }: { origin?: string | null; projectId?: string } = {}) {
  const params: Record<string, string> = { projectId: projectId ?? shared.id }
  if (item.part) params[item.part] = ids[item.part]
  if (item.fresh) params[item.fresh] = await fresh[item.fresh]()
  const cookie = role === 'none' ? undefined : shared.people[role].cookie
  const options = { method: item.method, body: item.body?.(), cookie, origin }
  return call(item.module[item.method], `/${item.query ?? ''}`, params, options)
}

describe.each(cases)('%s', (_, item) => {
  test.each(ROLES)('asked by: %s', async (role) => {
    const response = await ask(item, role)
    expect(response.status).toBe(item.may.includes(role) ? item.status : REFUSED[role])
    if (response.status >= 400) {
      expect(await response.json()).toEqual({
        error: expect.objectContaining({ code: expect.any(String), message: expect.any(String) }),
      })
    } else {
      // A download that nobody reads would hold its connection.
      await response.body?.cancel()
    }
  })

  if (item.method !== 'GET') {
    test.each([['none'], ['https://elsewhere.example'], ['null'], ['http://localhost:3001']])(
      'from a page of origin %s is refused before anything else',
      async (origin) => {
        for (const role of ['none', 'owner'] as const) {
          const response = await ask(item, role, { origin: origin === 'none' ? null : origin })
          expect(response.status).toBe(403)
          expect((await response.json()).error.code).toBe('wrong-origin')
        }
      },
    )
  }

  if (item.part || item.fresh) {
    test("below a project of one's own that it does not belong to: 404", async () => {
      const other = await call(
        projects.POST,
        '/',
        {},
        {
          method: 'POST',
          body: { name: 'Mine', driveTrain: DRIVE_TRAIN },
          cookie: shared.people.owner.cookie,
        },
      )
      const response = await ask(item, 'owner', { projectId: (await other.json()).id })
      expect(response.status).toBe(404)
    })
  }

  test('at an address that names no project', async () => {
    for (const projectId of ['5f0c0b9e-7d3c-4a58-9f0a-3d2f6b1c9e11', 'no-uuid']) {
      expect((await ask(item, 'owner', { projectId })).status).toBe(404)
    }
  })
})

test('every handler below a project stands in the table above', async () => {
  const modules = import.meta.glob('../../app/api/projects/[[]projectId[]]/**/route.ts')
  const listed = new Set<unknown>(cases.map(([, { module, method }]) => module[method]))
  expect(Object.keys(modules).length).toBeGreaterThan(15)
  for (const [path, load] of Object.entries(modules)) {
    for (const [name, handler] of Object.entries((await load()) as object)) {
      if (/^[A-Z]+$/.test(name)) expect(listed.has(handler), `${name} of ${path}`).toBe(true)
    }
  }
})

test('projects are listed to their members, and made by whoever is signed in', async () => {
  const anonymous = await call(projects.GET, '/', {})
  expect(anonymous.status).toBe(401)
  const body = { name: 'Mount', driveTrain: DRIVE_TRAIN }
  expect((await call(projects.POST, '/', {}, { method: 'POST', body })).status).toBe(401)
  const newcomer = await signUpPerson('New Comer')
  const list = async () => (await (await call(projects.GET, '/', {}, newcomer)).json()).projects
  expect(await list()).toEqual([])
  const made = await call(projects.POST, '/', {}, { method: 'POST', body, cookie: newcomer.cookie })
  const { id, name } = await made.json()
  expect(await list()).toEqual([expect.objectContaining({ id, name, role: 'owner', runCount: 0, memberCount: 1 })])
})

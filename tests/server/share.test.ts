import { NextRequest } from 'next/server'
import { beforeAll, describe, expect, test } from 'vitest'
import * as analysis from '@/app/api/projects/[projectId]/analyses/[analysisId]/route'
import * as shareLinks from '@/app/api/projects/[projectId]/analyses/[analysisId]/share-links/route'
import * as shareLink from '@/app/api/projects/[projectId]/share-links/[linkId]/route'
import * as shared from '@/app/api/share/[token]/route'
import * as sharedColumns from '@/app/api/share/[token]/columns/route'
import { accessProject } from '@/db/queries/access'
import { shareReportSchema, type ShareLink } from '@/lib/schemas/share'
import { loadReportSubject } from '@/lib/server/load-report'
import { shareStatus, visitShareReport } from '@/lib/server/share'
import { proxy } from '@/proxy'
import { openTestDatabase } from '../support/test-database'
import { makeAnalysis, makeNote, makeProject, makeRun, type TestProject } from '../support/test-project'
import { call, makeRequest } from '../support/test-server'

const database = openTestDatabase()

let project: TestProject
let owner: { projectId: string; cookie: string }
let editor: { projectId: string; cookie: string }
let analysisId: string
let chosen: string
let hidden: string

beforeAll(async () => {
  project = await makeProject(database.db)
  owner = { projectId: project.id, cookie: project.people.owner.cookie }
  editor = { projectId: project.id, cookie: project.people.editor.cookie }
  analysisId = (await makeAnalysis(owner, (await makeRun(owner)).id)).id
  chosen = (await makeNote(owner, analysisId)).id
  hidden = (await makeNote(owner, analysisId)).id
  await database.db.updateTable('notes').set({ text: 'For the support desk' }).where('id', '=', chosen).execute()
  await database.db.updateTable('notes').set({ text: 'Not for strangers' }).where('id', '=', hidden).execute()
})

const FIELDS = { preface: null, expiresAt: null, noteIds: [] as string[] }
const inDays = (days: number) => new Date(Date.now() + days * 86_400_000).toISOString()

function post(body: unknown, { cookie, id = analysisId }: { cookie?: string; id?: string } = {}) {
  const options = { method: 'POST', body, cookie: cookie ?? editor.cookie }
  return call(shareLinks.POST, '/', { projectId: project.id, analysisId: id }, options)
}

async function makeLink(body: unknown = FIELDS, id = analysisId): Promise<ShareLink> {
  const response = await post(body, { id })
  expect(response.status).toBe(201)
  return response.json()
}

function change(linkId: string, method: 'PATCH' | 'DELETE', body?: unknown) {
  const options = { method, body, cookie: editor.cookie }
  return call(shareLink[method], '/', { projectId: project.id, linkId }, options)
}

const open = (token: string) => call(shared.GET, '/', { token })
const openColumns = (token: string) => call(sharedColumns.GET, '/', { token })

async function list(): Promise<ShareLink[]> {
  const response = await call(shareLinks.GET, '/', { projectId: project.id, analysisId }, { cookie: editor.cookie })
  return (await response.json()).links
}

async function expire(linkId: string) {
  await database.db
    .updateTable('shareLinks')
    .set({ expiresAt: new Date(Date.now() - 1000) })
    .where('id', '=', linkId)
    .execute()
}

describe('a share link', () => {
  test('is made, changed and listed with who made it; every step stands in the audit trail', async () => {
    const expiresAt = inDays(7)
    const made = await makeLink({ preface: '  Have a look  ', expiresAt, noteIds: [chosen] })
    expect(made).toMatchObject({
      preface: 'Have a look',
      expiresAt,
      noteIds: [chosen],
      createdBy: 'Edda Editor',
      revokedAt: null,
      openedCount: 0,
      lastOpenedAt: null,
    })
    expect(made.token).toMatch(/^[A-Za-z0-9_-]{43}$/)
    const changed = await (await change(made.id, 'PATCH', { ...FIELDS, preface: '', version: 1 })).json()
    expect(changed).toEqual({ ...made, version: 2, preface: null, expiresAt: null, noteIds: [] })
    expect((await list())[0]).toEqual(changed)
    expect((await change(made.id, 'DELETE')).status).toBe(204)
    expect((await change(made.id, 'DELETE')).status).toBe(204)
    expect((await list())[0]).toEqual({ ...changed, revokedAt: expect.any(String) })
    const events = await database.db
      .selectFrom('auditEvents')
      .select('action')
      .where('action', 'like', 'share-link.%')
      .orderBy('at')
      .execute()
    expect(events.map(({ action }) => action)).toEqual(['share-link.create', 'share-link.change', 'share-link.revoke'])
  })

  test.each([
    ['expiry in the past', { expiresAt: '2020-01-01T00:00:00.000Z' }, 422, 'expiresAt'],
    ['preface too long', { preface: 'x'.repeat(2001) }, 422, 'preface'],
    ['no date', { expiresAt: 'tomorrow' }, 422, 'expiresAt'],
  ])('%s is refused at its field', async (_, given, status, field) => {
    const response = await post({ ...FIELDS, ...given })
    expect(response.status).toBe(status)
    expect(Object.keys((await response.json()).error.fields)).toEqual([field])
  })

  test('shows no note of another analysis', async () => {
    const other = (await makeAnalysis(owner, (await makeRun(owner)).id)).id
    expect((await post({ ...FIELDS, noteIds: [chosen] }, { id: other })).status).toBe(404)
    expect(await database.db.selectFrom('shareLinks').select('id').where('analysisId', '=', other).execute()).toEqual(
      [],
    )
  })

  test('shows the notes that were chosen for it, not those of another link to the same analysis', async () => {
    const [one, both, none] = [
      await makeLink({ ...FIELDS, noteIds: [chosen] }),
      await makeLink({ ...FIELDS, noteIds: [chosen, hidden] }),
      await makeLink(),
    ]
    const textsOf = async ({ token }: ShareLink) =>
      shareReportSchema.parse(await (await open(token)).json()).subject.notes.map(({ text }) => text)
    expect(await textsOf(one)).toEqual(['For the support desk'])
    expect(await textsOf(both)).toEqual(['For the support desk', 'Not for strangers'])
    expect(await textsOf(none)).toEqual([])
  })

  test('is not changed from a version that somebody else has changed: a note taken out stays out', async () => {
    const { id, token } = await makeLink({ ...FIELDS, noteIds: [chosen, hidden] })
    const taken = await change(id, 'PATCH', { ...FIELDS, noteIds: [chosen], version: 1 })
    expect(taken.status).toBe(200)
    const stale = await change(id, 'PATCH', {
      preface: 'Hello',
      expiresAt: null,
      noteIds: [chosen, hidden],
      version: 1,
    })
    expect(stale.status).toBe(409)
    expect((await stale.json()).error).toMatchObject({ code: 'changed-meanwhile', current: await taken.json() })
    const report = shareReportSchema.parse(await (await open(token)).json())
    expect(report.preface).toBeNull()
    expect(report.subject.notes.map(({ text }) => text)).toEqual(['For the support desk'])
  })

  test('is changed by one of two at once', async () => {
    const { id } = await makeLink()
    const responses = await Promise.all(
      [[chosen], [hidden]].map((noteIds) => change(id, 'PATCH', { ...FIELDS, noteIds, version: 1 })),
    )
    expect(responses.map(({ status }) => status).sort()).toEqual([200, 409])
  })

  test('once revoked is changed no more', async () => {
    const { id } = await makeLink()
    await change(id, 'DELETE')
    const response = await change(id, 'PATCH', { ...FIELDS, version: 1 })
    expect(response.status).toBe(410)
    expect((await response.json()).error.code).toBe('link-ended')
  })
})

test('members read the same report without a link, with every note and what is settled', async () => {
  const { id } = await makeAnalysis(owner, (await makeRun(owner)).id)
  const settled = await makeNote(owner, id)
  const other = await makeNote(owner, id)
  await database.db
    .updateTable('notes')
    .set({ resolvedAt: new Date(), resolvedBy: project.people.owner.id })
    .where('id', '=', settled.id)
    .execute()
  const userId = project.people.viewer.id
  const access = await accessProject(database.db, { userId, projectId: project.id, right: 'read' })
  const { subject } = await loadReportSubject(access, id)
  expect(subject.notes.map(({ isSettled }) => isSettled)).toEqual([true, false])

  const link = await makeLink({ ...FIELDS, noteIds: [settled.id, other.id] }, id)
  expect((await (await open(link.token)).json()).subject).toEqual(subject)
})

describe('what a link opens', () => {
  test('is the report and nothing beside it, without a session', async () => {
    const { token } = await makeLink({ preface: 'Read this', expiresAt: inDays(1), noteIds: [chosen] })
    const response = await open(token)
    expect(response.status).toBe(200)
    expect(response.headers.get('cache-control')).toBe('no-store')
    const text = await response.text()
    const report = shareReportSchema.parse(JSON.parse(text))
    expect(JSON.parse(text)).toEqual(report)
    expect(report).toMatchObject({ sharedBy: 'Edda Editor', preface: 'Read this', subject: { kind: 'analysis' } })
    expect(report.subject.notes.map((note) => note.text)).toEqual(['For the support desk'])
    expect(report.subject.result?.worm).not.toBeNull()
  })

  test('holds no address, no free text of the run, no id and no note that was not chosen', async () => {
    const run = await makeRun(owner)
    const facts = {
      ...run.facts,
      loadAndBalance: 'secret load',
      senseProof: 'secret proof',
      mountCorrectionTable: 'mct',
    }
    await database.db
      .updateTable('runs')
      .set({ facts: JSON.stringify(facts), fileName: 'secret-file.csv' })
      .where('id', '=', run.id)
      .execute()
    const { id } = await makeAnalysis(owner, run.id)
    const link = await makeLink(FIELDS, id)
    const text = await (await open(link.token)).text()
    expect(text).toContain(run.fileSha256)
    const secrets = ['secret', '"mct"', 'Not for strangers', '@', run.id, id, link.id, project.id, link.token]
    for (const secret of secrets) expect(text).not.toContain(secret)
  })

  test('includes the columns as they are packed', async () => {
    const { token } = await makeLink()
    const response = await openColumns(token)
    expect(response.status).toBe(200)
    expect(response.headers.get('content-type')).toBe('application/gzip')
    expect(response.headers.get('cache-control')).toBe('no-store')
    const first = new Uint8Array(await response.arrayBuffer()).slice(0, 2)
    expect([...first]).toEqual([0x1f, 0x8b])
  })

  test('has no columns once the run was read anew with other samples', async () => {
    const run = await makeRun(owner)
    const { id } = await makeAnalysis(owner, run.id)
    const { token } = await makeLink(FIELDS, id)
    await database.db
      .updateTable('runs')
      .set({ samplesSha256: 'f'.repeat(64) })
      .where('id', '=', run.id)
      .execute()
    expect((await openColumns(token)).status).toBe(404)
    expect((await (await open(token)).json()).subject.run.hasSameSamples).toBe(false)
  })

  test.each([
    ['unknown', async () => 'A'.repeat(43), 404, 'not-found'],
    ['no token at all', async () => '../x', 404, 'not-found'],
    [
      'expired',
      async () => {
        const link = await makeLink()
        await expire(link.id)
        return link.token
      },
      410,
      'link-ended',
    ],
    [
      'revoked',
      async () => {
        const link = await makeLink()
        await change(link.id, 'DELETE')
        return link.token
      },
      410,
      'link-ended',
    ],
    [
      'of a deleted analysis',
      async () => {
        const { id } = await makeAnalysis(owner, (await makeRun(owner)).id)
        const { token } = await makeLink(FIELDS, id)
        const params = { projectId: project.id, analysisId: id }
        expect((await call(analysis.DELETE, '/', params, { method: 'DELETE', cookie: owner.cookie })).status).toBe(204)
        return token
      },
      404,
      'not-found',
    ],
  ])('is nothing when %s: constant answers', async (_, make, status, code) => {
    const token = await make()
    for (const response of [await open(token), await openColumns(token)]) {
      expect(response.status).toBe(status)
      const { error } = await response.json()
      expect(Object.keys(error)).toEqual(['code', 'message'])
      expect(error.code).toBe(code)
      expect(response.headers.get('cache-control')).toBe('no-store')
    }
    expect(await shareStatus(makeRequest('/'), token)).toBe(status)
  })

  test('goes on in an archived project until it is revoked there', async () => {
    const { id, token } = await makeLink()
    const archive = (values: { archivedAt: Date | null; archivedBy: string | null }) =>
      database.db.updateTable('projects').set(values).where('id', '=', project.id).execute()
    await archive({ archivedAt: new Date(), archivedBy: project.people.owner.id })
    try {
      expect((await open(token)).status).toBe(200)
      expect((await openColumns(token)).status).toBe(200)
      expect((await post(FIELDS)).status).toBe(409)
      expect((await change(id, 'PATCH', { ...FIELDS, version: 1 })).status).toBe(409)
      expect((await list()).map((link) => link.id)).toContain(id)
      expect((await change(id, 'DELETE')).status).toBe(204)
      expect((await open(token)).status).toBe(410)
    } finally {
      await archive({ archivedAt: null, archivedBy: null })
    }
  })

  test('its page is answered with 200, 404 or 410, however its token is written', async () => {
    const [link, revoked] = [await makeLink(), await makeLink()]
    await change(revoked.id, 'DELETE')
    const statusOf = async (path: string, headers = {}) =>
      (await proxy(new NextRequest(`http://localhost:3000${path}`, { headers }))).status
    const encoded = (token: string) => [...token].map((c) => `%${c.charCodeAt(0).toString(16)}`).join('')
    for (const write of [(token: string) => token, encoded]) {
      expect(await statusOf(`/share/${write(link.token)}`)).toBe(200)
      expect(await statusOf(`/share/${write(revoked.token)}`, { 'x-share-status': '200' })).toBe(410)
      expect(await statusOf(`/share/${write('A'.repeat(43))}`)).toBe(404)
    }
    expect(await statusOf('/share/%ff')).toBe(404)
  })

  test('is counted once for each visit of the page, not for its data', async () => {
    const { id, token } = await makeLink()
    await open(token)
    await openColumns(token)
    await visitShareReport(token)
    await visitShareReport(token)
    const link = (await list()).find((each) => each.id === id)
    expect(link).toMatchObject({ openedCount: 2, lastOpenedAt: expect.any(String) })
  })

  test('is held back from an address that asks too often', async () => {
    process.env.TRUST_PROXY = '1'
    try {
      const { token } = await makeLink()
      const from = (address: string) => call(shared.GET, '/', { token }, { headers: { 'x-forwarded-for': address } })
      expect((await from('192.0.2.7')).status).toBe(200)
      await database.db
        .updateTable('rateLimits')
        .set({ hits: 300 })
        .where('key', 'like', 'share address %')
        .where('key', '<>', 'share address shared')
        .execute()
      const refused = await from('192.0.2.7')
      expect(refused.status).toBe(429)
      expect((await refused.json()).error.code).toBe('too-many-attempts')
      expect((await from('192.0.2.8')).status).toBe(200)
      const page = makeRequest('/', { headers: { 'x-forwarded-for': '192.0.2.7' } })
      expect(await shareStatus(page, token)).toBe(429)
    } finally {
      delete process.env.TRUST_PROXY
    }
  })
})

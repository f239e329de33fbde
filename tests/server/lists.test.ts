import { beforeAll, describe, expect, test } from 'vitest'
import * as projects from '@/app/api/projects/route'
import * as auditEvents from '@/app/api/projects/[projectId]/audit-events/route'
import * as analyses from '@/app/api/projects/[projectId]/analyses/route'
import * as corrections from '@/app/api/projects/[projectId]/corrections/route'
import * as history from '@/app/api/projects/[projectId]/history/route'
import * as runs from '@/app/api/projects/[projectId]/runs/route'
import {
  analysisListSchema,
  auditEventListSchema,
  correctionListSchema,
  historySchema,
  projectListSchema,
  runListSchema,
  type PageFacts,
} from '@/lib/schemas/lists'
import { seedManyRows } from '../support/many-rows'
import { openTestDatabase } from '../support/test-database'
import { makeAnalysis, makeProject, makeRun, makeTable, someResult, type TestProject } from '../support/test-project'
import { call } from '../support/test-server'

const database = openTestDatabase()
let project: TestProject

beforeAll(async () => {
  project = await makeProject(database.db)
  const { owner, editor } = project.people
  await seedManyRows(database.db, {
    projectId: project.id,
    userIds: [owner.id, editor.id],
    runCount: 120,
    analysisCount: 90,
    eventCount: 80,
  })
  const where = { projectId: project.id, cookie: owner.cookie }
  const run = await makeRun(where)
  await makeTable(where, (await makeAnalysis(where, run.id)).id)
  await database.db
    .updateTable('runs')
    .set({ name: '100%_sure', fileName: 'Ünder_score.csv' })
    .where('id', '=', run.id)
    .execute()
}, 60_000)

const LISTS = {
  projects: {
    module: projects,
    schema: projectListSchema,
    rows: 'projects',
    sorts: ['name', 'period', 'runs', 'analyses', 'people', 'role', 'changed'],
  },
  runs: {
    module: runs,
    schema: runListSchema,
    rows: 'runs',
    sorts: ['name', 'started', 'rows', 'correction', 'sense', 'analyses', 'size', 'by', 'created'],
  },
  analyses: {
    module: analyses,
    schema: analysisListSchema,
    rows: 'analyses',
    sorts: ['name', 'run', 'period', 'amplitude', 'peak', 'by', 'created'],
  },
  corrections: {
    module: corrections,
    schema: correctionListSchema,
    rows: 'corrections',
    sorts: ['name', 'analysis', 'kind', 'bins', 'sense', 'by', 'created'],
  },
  'audit-events': {
    module: auditEvents,
    schema: auditEventListSchema,
    rows: 'events',
    sorts: ['at', 'person', 'action', 'subject'],
  },
} as const
type ListName = keyof typeof LISTS

function ask(list: ListName, query: Record<string, string>) {
  const { cookie } = project.people.owner
  return call(LISTS[list].module.GET, `/?${new URLSearchParams(query)}`, { projectId: project.id }, { cookie })
}

interface Got extends PageFacts {
  rows: Record<string, unknown>[]
  overview: Record<string, unknown>
}

async function get(list: ListName, query: Record<string, string> = {}): Promise<Got> {
  const response = await ask(list, query)
  const body = await response.json()
  expect([response.status, body.error]).toEqual([200, undefined])
  // What is answered holds nothing that the schema does not name.
  expect(LISTS[list].schema.strict().parse(body)).toEqual(body)
  return { ...body, rows: body[LISTS[list].rows] }
}

describe.each(Object.keys(LISTS) as ListName[])('the list of %s', (list) => {
  test('can be sorted by each of its columns in both directions', async () => {
    for (const sort of LISTS[list].sorts) {
      for (const direction of ['asc', 'desc']) {
        const { rows, total, all } = await get(list, { sort, direction, limit: '200' })
        expect(rows).toHaveLength(total)
        expect(all).toBe(total)
      }
    }
  })

  test.each([
    [{ sort: 'colour' }, 'sort'],
    [{ direction: 'up' }, 'direction'],
    [{ limit: '0' }, 'limit'],
    [{ limit: '201' }, 'limit'],
    [{ limit: 'many' }, 'limit'],
    [{ q: 'x'.repeat(201) }, 'q'],
    [{ q: 'a\0b' }, 'q'],
    [{ cursor: 'not one of ours' }, 'cursor'],
    [{ cursor: Buffer.from('["runs.name","asc","after","x","y"]').toString('base64url') }, 'cursor'],
    [{ cursor: 'x'.repeat(4001) }, 'cursor'],
  ])('refuses %o with a word for the field', async (query, field) => {
    const response = await ask(list, query as Record<string, string>)
    expect(response.status).toBe(422)
    const { error } = await response.json()
    expect(Object.keys(error.fields)).toEqual([field])
    expect(error.fields[field]).toMatch(/^[A-Z].{8,}/)
  })

  test('refuses a place of another list', async () => {
    const other: ListName = list === 'runs' ? 'analyses' : 'runs'
    const { nextCursor } = await get(other, { limit: '1' })
    const response = await ask(list, { cursor: nextCursor! })
    expect(response.status).toBe(422)
    expect((await response.json()).error.message).toContain('sorted otherwise')
  })
})

describe('cursors', () => {
  test('belong to one sort in one direction', async () => {
    const { nextCursor } = await get('runs', { sort: 'name', direction: 'asc', limit: '5' })
    expect((await get('runs', { sort: 'name', direction: 'asc', limit: '7', cursor: nextCursor! })).before).toBe(5)
    for (const query of [
      { sort: 'name', direction: 'desc' },
      { sort: 'by', direction: 'asc' },
    ]) {
      expect((await ask('runs', { ...query, cursor: nextCursor! })).status).toBe(422)
    }
  })

  test.each([
    ['runs.started', 'started', 'yesterday'],
    ['runs.started', 'started', '2026-13-45T25:00:00.000000Z'],
    ['runs.started', 'started', '2026-02-30T20:00:00.000000Z'],
    ['runs.started', 'started', '0000-01-01T00:00:00.000000Z'],
    ['runs.size', 'size', '1e999'],
    ['runs.size', 'size', '1e-999'],
    ['runs.size', 'size', `0.${'0'.repeat(400)}1`],
    ['runs.size', 'size', 'NaN'],
    ['runs.size', 'size', null],
    ['runs.name', 'name', 'a\0b'],
    ['runs.name', 'name', '\ud800'],
  ])('written by hand for %s with a value that none has: refused, not passed on', async (name, sort, value) => {
    const id = '5f0c0b9e-7d3c-4a58-9f0a-3d2f6b1c9e11'
    const cursor = Buffer.from(JSON.stringify([name, 'asc', 'after', value, id])).toString('base64url')
    expect((await ask('runs', { sort, direction: 'asc', cursor })).status).toBe(422)
  })
})

/** Whether an instant lies from the beginning of one day to the end of another, in UTC. */
const within = (instant: string | null, from: string, to: string) =>
  instant !== null && instant.slice(0, 10) >= from && instant.slice(0, 10) <= to

describe('filters', () => {
  test.each(['from', 'to'])('a day that the calendar does not have is refused (%s)', async (field) => {
    for (const day of ['0000-01-01', '2026-02-30', '2026-2-3', '+12026-01-01']) {
      const response = await ask('runs', { [field]: day })
      expect([day, response.status]).toEqual([day, 422])
      expect(Object.keys((await response.json()).error.fields)).toEqual([field])
    }
    for (const day of ['1900-01-01', '2999-12-31']) expect((await ask('runs', { [field]: day })).status).toBe(200)
  })

  test('a run without what the list does not show', async () => {
    const { rows } = await get('runs', { limit: '1' })
    for (const field of ['facts', 'importSettings', 'conversion', 'fileSha256'])
      expect(rows[0]).not.toHaveProperty(field)
  })

  const allRuns = async () =>
    (await get('runs', { limit: '200' })).rows as unknown as ReturnType<typeof runListSchema.parse>['runs']
  test.each([
    ['100%', 1],
    ['%_sure', 1],
    ['%', 1],
    ['ÜNDER', 1],
    ['no such thing', 0],
    ['\\', 0],
  ])('the text “%s” finds %i runs: % and _ stand for themselves', async (q, count) => {
    expect(await get('runs', { q })).toMatchObject({ total: count, all: 121 })
  })

  test.each(['NIGHT 7', '  guest 1', 'log17.csv', '_', 'ärger olga'])(
    'the text “%s” finds what holds every word',
    async (q) => {
      const words = q.toLowerCase().trim().split(/\s+/)
      const expected = (await allRuns()).filter(({ name, fileName, createdBy }) =>
        words.every((word) => `${name} ${fileName} ${createdBy}`.toLowerCase().includes(word)),
      )
      const { rows } = await get('runs', { q, limit: '200' })
      expect(expected.length).toBeGreaterThan(0)
      expect(rows).toEqual(expected)
    },
  )

  test.each([
    [{ correction: 'off' }, (run) => run.mountCorrection === 'off'],
    [{ side: 'east' }, (run) => run.sideOfPier === 'east'],
    [{ sense: 'assumed' }, (run) => run.senseBasis === 'assumed'],
    [{ state: 'unread' }, (run) => run.status === 'uploaded'],
    [{ state: 'read', correction: 'on' }, (run) => run.status === 'ready' && run.mountCorrection === 'on'],
    [{ from: '2026-01-10', to: '2026-01-20' }, (run) => within(run.startedAt, '2026-01-10', '2026-01-20')],
    [{ from: '2026-02-01' }, (run) => within(run.startedAt, '2026-02-01', '9999-01-01')],
    [{ to: '2026-01-01' }, (run) => within(run.startedAt, '0000-01-01', '2026-01-01')],
  ] as [Record<string, string>, (run: Awaited<ReturnType<typeof allRuns>>[number]) => boolean][])(
    'runs by %o',
    async (query, fits) => {
      const expected = (await allRuns()).filter(fits)
      const { rows, total, all, overview } = await get('runs', { ...query, limit: '200' })
      expect(expected.length).toBeGreaterThan(0)
      expect(expected.length).toBeLessThan(121)
      expect(rows).toEqual(expected)
      expect([total, all]).toEqual([expected.length, 121])
      expect(overview).toEqual((await get('runs')).overview)
    },
  )

  test('runs: what is left to do is counted over all of them', async () => {
    const rows = await allRuns()
    const { overview } = await get('runs', { q: 'no such thing' })
    expect(overview).toEqual({
      unread: rows.filter(({ status }) => status === 'uploaded').length,
      withoutAnalysis: rows.filter(({ status, analysisCount }) => status === 'ready' && analysisCount === 0).length,
      assumedSense: rows.filter(({ senseBasis }) => senseBasis === 'assumed').length,
    })
  })

  test('analyses by run and by whether there is a figure for the worm', async () => {
    const { rows } = await get('analyses', { limit: '200' })
    const without = await get('analyses', { worm: 'without', limit: '200' })
    expect(without.rows).toEqual(rows.filter((row) => row.wormAmplitudeArcsec === null))
    expect(without.total + (await get('analyses', { worm: 'with' })).total).toBe(91)
    const { runId, runName } = rows[0]
    const ofRun = await get('analyses', { runId: String(runId) })
    expect(ofRun.rows).toEqual(rows.filter((row) => row.runId === runId))
    expect(ofRun.overview).toMatchObject({ runName, mostPeakToPeakArcsec: 8 })
    expect((await get('analyses', { q: String(runName) })).total).toBeGreaterThan(0)
  })

  test('corrections by kind and sense', async () => {
    for (const [query, count] of [
      [{ kind: 'stand-alone', sense: 'assumed', q: 'club' }, 1],
      [{ kind: 'addition' }, 0],
      [{ sense: 'proven' }, 0],
    ] as [Record<string, string>, number][]) {
      expect(await get('corrections', query)).toMatchObject({ total: count, all: 1, overview: { assumedSense: 1 } })
    }
  })

  test('the log by person, kind of thing and day', async () => {
    const { editor } = project.people
    const { rows } = await get('audit-events', { limit: '200' })
    const byEditor = await get('audit-events', { person: editor.id, limit: '200' })
    expect(byEditor.rows).toEqual(rows.filter(({ actorName }) => actorName === 'Edda Editor'))
    const ofRuns = await get('audit-events', { thing: 'run', limit: '200' })
    expect(ofRuns.rows).toEqual(rows.filter(({ action }) => String(action).startsWith('run.')))
    const day = await get('audit-events', { from: '2026-08-01', to: '2026-08-01', limit: '200' })
    expect(day.total).toBe(80)
    for (const part of [byEditor, ofRuns, day]) expect(part.total).toBeLessThan(rows.length)
    expect((await get('audit-events', { thing: 'run', person: project.people.stranger.id })).total).toBe(0)
  })

  test('days are those of the zone that was asked in', async () => {
    const day = { from: '2026-01-10', to: '2026-01-10', limit: '200' }
    const inUtc = await get('runs', day)
    // The evening of the 10th in UTC is the morning of the 11th in Auckland, 13 hours ahead.
    const inAuckland = await get('runs', { ...day, from: '2026-01-11', to: '2026-01-11', zone: 'Pacific/Auckland' })
    expect(inUtc.total).toBeGreaterThan(0)
    expect(inAuckland.rows).toEqual(inUtc.rows)
    const [last, next] = await Promise.all(
      ['2026-01-09', '2026-01-10'].map((from) => get('runs', { from, to: from, zone: 'Pacific/Auckland' })),
    )
    expect([last.total, next.total]).toEqual(
      await Promise.all(
        ['2026-01-08', '2026-01-09'].map(async (from) => (await get('runs', { from, to: from })).total),
      ),
    )
  })

  test.each<Record<string, string>>([{ zone: 'Middle/Earth' }, { from: '0000-01-01' }, { to: '9999-12-31' }])(
    '%o is refused',
    async (query) => {
      const refused = await ask('runs', query)
      expect(refused.status).toBe(422)
    },
  )

  test('projects: archived ones are left out unless they are asked for', async () => {
    await database.db
      .updateTable('projects')
      .set({ archivedAt: new Date(), archivedBy: project.people.owner.id })
      .where('id', '=', project.id)
      .execute()
    expect(await get('projects')).toMatchObject({ total: 0, all: 1, overview: { archived: 1 } })
    expect((await get('projects', { archived: 'too' })).rows[0]).toMatchObject({ id: project.id, memberCount: 3 })
    expect((await get('projects', { archived: 'only', role: 'viewer' })).total).toBe(0)
    await database.db
      .updateTable('projects')
      .set({ archivedAt: null, archivedBy: null })
      .where('id', '=', project.id)
      .execute()
    expect(await get('projects')).toMatchObject({ total: 1, overview: { archived: 0, lastChangedName: 'Test mount' } })
  })
})

describe('the history', () => {
  test('has the newest analysis of each run, by the time of the run, and says where that is not known', async () => {
    const fresh = await makeProject(database.db)
    const where = { projectId: fresh.id, cookie: fresh.people.owner.cookie }
    const [late, early, bare] = [await makeRun(where), await makeRun(where), await makeRun(where)]
    const start = (id: string, startedAt: string) =>
      database.db
        .updateTable('runs')
        .set({ facts: JSON.stringify({ ...late.facts, startedAt }) })
        .where('id', '=', id)
        .execute()
    await start(late.id, '2026-11-14T23:00:00+02:00')
    await start(early.id, '2026-11-14T20:00:00Z')
    const first = await makeAnalysis(where, early.id)
    await database.db
      .updateTable('analyses')
      .set({ createdAt: new Date('2026-01-01') })
      .where('id', '=', first.id)
      .execute()
    const newest = await makeAnalysis(where, early.id, someResult({ used: 58 }))
    const other = await makeAnalysis(where, late.id)
    const unknown = await makeAnalysis(where, bare.id)
    const answer = await call(history.GET, '/', { projectId: fresh.id }, where)
    const { points, total } = historySchema.parse(await answer.json())
    expect(total).toBe(3)
    expect(points.map(({ analysisId }) => analysisId)).toEqual([newest.id, other.id, unknown.id])
    expect(points.map(({ isRecordingTimeKnown }) => isRecordingTimeKnown)).toEqual([true, true, false])
    expect(points[0]).toMatchObject({ wormAmplitudeStderrArcsec: 0.1, peakToPeakStderrArcsec: 0.2 })
    await makeAnalysis(where, bare.id, someResult({ worm: null, wormReason: 'short-run', table: null }))
    const after = await call(history.GET, '/', { projectId: fresh.id }, where)
    expect(historySchema.parse(await after.json()).points.map(({ runId }) => runId)).toEqual([early.id, late.id])
  })
})

import { beforeAll, describe, expect, test } from 'vitest'
import { accessProject, type ProjectAccess } from '@/db/queries/access'
import { listAnalyses } from '@/db/queries/list-analyses'
import { listAuditEvents } from '@/db/queries/list-audit-events'
import { listCorrections } from '@/db/queries/list-corrections'
import { listProjects } from '@/db/queries/list-projects'
import { listRuns } from '@/db/queries/list-runs'
import {
  analysisQuerySchema,
  auditQuerySchema,
  correctionQuerySchema,
  projectQuerySchema,
  runQuerySchema,
  type AnalysisQuery,
  type AuditQuery,
  type CorrectionQuery,
  type PageFacts,
  type ProjectQuery,
  type RunQuery,
} from '@/lib/schemas/lists'
import { seedManyCorrections, seedManyProjects, seedManyRows } from '../support/many-rows'
import { openTestDatabase } from '../support/test-database'
import { makeProject } from '../support/test-project'

const database = openTestDatabase()
let small: ProjectAccess<'read'>
let large: ProjectAccess<'read'>

async function seededProject(runCount: number, analysisCount = 0) {
  const { id: projectId, people } = await makeProject(database.db)
  const userIds = [people.owner.id, people.editor.id]
  await seedManyRows(database.db, { projectId, userIds, runCount, analysisCount, eventCount: analysisCount })
  return accessProject(database.db, { userId: people.owner.id, projectId, right: 'read' })
}

beforeAll(async () => {
  small = await seededProject(40, 40)
  large = await seededProject(2500, 2500)
}, 60_000)

type AnyRow = { id: string }
type Listed<Row> = PageFacts & { rows: Row[] }
type Value = string | number | null

// Two implementations of one standard (ICU): PostgreSQL's collation and the one of JavaScript.
const collator = new Intl.Collator('en', { numeric: true, sensitivity: 'accent' })

function compare(a: Value, b: Value): number {
  return typeof a === 'number' && typeof b === 'number' ? a - b : collator.compare(String(a), String(b))
}

/** The order that is promised, by a plain sort of all rows: values, none last, ties by id. */
function sorted<Row extends AnyRow>(
  rows: readonly Row[],
  valueOf: (row: Row) => Value,
  direction: 'asc' | 'desc',
): string[] {
  const sign = direction === 'asc' ? 1 : -1
  return [...rows]
    .sort((a, b) => {
      const [x, y] = [valueOf(a), valueOf(b)]
      if (x === null || y === null) {
        return Number(x === null) - Number(y === null) || sign * (a.id < b.id ? -1 : 1)
      }
      return sign * (compare(x, y) || (a.id < b.id ? -1 : 1))
    })
    .map(({ id }) => id)
}

interface Asked {
  sort: string
  direction: 'asc' | 'desc'
  limit: number
}
type Lister<Row> = (access: ProjectAccess, query: Asked & { cursor?: string }) => Promise<Listed<Row>>

/** All pages, one after the other. */
async function walk<Row extends AnyRow>(list: Lister<Row>, access: ProjectAccess, asked: Asked): Promise<Row[]> {
  const rows: Row[] = []
  let cursor: string | undefined
  do {
    const page: Listed<Row> = await list(access, { ...asked, cursor })
    expect(page.before).toBe(rows.length)
    expect(page.previousCursor === null).toBe(cursor === undefined)
    if (page.nextCursor !== null) expect(page.rows).toHaveLength(asked.limit)
    rows.push(...page.rows)
    cursor = page.nextCursor ?? undefined
    if (cursor === undefined) expect(rows).toHaveLength(page.total)
  } while (cursor !== undefined)
  return rows
}

const runs: Lister<Awaited<ReturnType<typeof listRuns>>['runs'][number]> = async (access, query) => {
  const { runs: rows, ...facts } = await listRuns(database.db, access, runQuerySchema.parse(query))
  return { rows, ...facts }
}
const analyses: Lister<Awaited<ReturnType<typeof listAnalyses>>['analyses'][number]> = async (access, query) => {
  const { analyses: rows, ...facts } = await listAnalyses(database.db, access, analysisQuerySchema.parse(query))
  return { rows, ...facts }
}
const events: Lister<Awaited<ReturnType<typeof listAuditEvents>>['events'][number]> = async (access, query) => {
  const { events: rows, ...facts } = await listAuditEvents(database.db, access, auditQuerySchema.parse(query))
  return { rows, ...facts }
}

const corrections: Lister<Awaited<ReturnType<typeof listCorrections>>['corrections'][number]> = async (
  access,
  query,
) => {
  const parsed = correctionQuerySchema.parse(query)
  const { corrections: rows, ...facts } = await listCorrections(database.db, access, parsed)
  return { rows, ...facts }
}
/** Of all projects of the person, whichever of them the access is for. */
const projects: Lister<Awaited<ReturnType<typeof listProjects>>['projects'][number]> = async ({ userId }, query) => {
  const parsed = projectQuerySchema.parse({ ...query, archived: 'too' })
  const { projects: rows, ...facts } = await listProjects(database.db, userId, parsed)
  return { rows, ...facts }
}

type RowOf<L> = L extends Lister<infer Row> ? Row : never
const runValues: Record<RunQuery['sort'], (row: RowOf<typeof runs>) => Value> = {
  name: ({ name }) => name,
  started: ({ startedAt }) => startedAt?.getTime() ?? null,
  rows: ({ rowCount }) => rowCount,
  correction: ({ mountCorrection }) => mountCorrection,
  sense: ({ senseBasis }) => senseBasis,
  analyses: ({ analysisCount }) => analysisCount,
  size: ({ byteLength }) => byteLength,
  by: ({ createdBy }) => createdBy,
  created: ({ createdAt }) => createdAt.getTime(),
}
const analysisValues: Record<AnalysisQuery['sort'], (row: RowOf<typeof analyses>) => Value> = {
  name: ({ name }) => name,
  run: ({ runName }) => runName,
  period: ({ wormPeriodSeconds }) => wormPeriodSeconds,
  amplitude: ({ wormAmplitudeArcsec }) => wormAmplitudeArcsec,
  peak: ({ peakToPeakArcsec }) => peakToPeakArcsec,
  by: ({ createdBy }) => createdBy,
  created: ({ createdAt }) => createdAt.getTime(),
}
const eventValues: Record<AuditQuery['sort'], (row: RowOf<typeof events>) => Value> = {
  at: ({ at }) => at.getTime(),
  person: ({ actorName }) => actorName,
  action: ({ action }) => action,
  subject: ({ subject }) => subject,
}

const correctionValues: Record<CorrectionQuery['sort'], (row: RowOf<typeof corrections>) => Value> = {
  name: ({ name }) => name,
  analysis: ({ analysisName }) => analysisName,
  kind: ({ kind }) => kind,
  bins: ({ settings }) => settings.binCount,
  sense: ({ senseBasis }) => senseBasis,
  by: ({ createdBy }) => createdBy,
  created: ({ createdAt }) => createdAt.getTime(),
}
const projectValues: Record<ProjectQuery['sort'], (row: RowOf<typeof projects>) => Value> = {
  name: ({ name }) => name,
  // More teeth, shorter period; the same two numbers divide to the same double everywhere.
  period: ({ wheelTeeth, wormStarts }) => (wheelTeeth === null ? null : wormStarts / wheelTeeth),
  runs: ({ runCount }) => runCount,
  analyses: ({ analysisCount }) => analysisCount,
  people: ({ memberCount }) => memberCount,
  role: ({ role }) => role,
  changed: ({ updatedAt }) => updatedAt.getTime(),
}

function walksLikeASort<Row extends AnyRow>(list: Lister<Row>, values: Record<string, (row: Row) => Value>) {
  describe.each(Object.keys(values))('by %s', (sort) => {
    test.each(['asc', 'desc'] as const)('%s: all pages together are the sorted whole', async (direction) => {
      for (const limit of [1, 3, 7, 40]) {
        const rows = await walk(list, small, { sort, direction, limit })
        expect(rows.map(({ id }) => id)).toEqual(sorted(rows, values[sort], direction))
        expect(new Set(rows.map(({ id }) => id)).size).toBe(40)
      }
      const rows = await walk(list, large, { sort, direction, limit: 200 })
      expect(rows.map(({ id }) => id)).toEqual(sorted(rows, values[sort], direction))
      expect(new Set(rows.map(({ id }) => id)).size).toBe(2500)
    })

    test.each(['asc', 'desc'] as const)('%s: the pages back are the pages that were left', async (direction) => {
      const asked = { sort, direction, limit: 7 }
      const seen: string[][] = []
      let page = await list(small, asked)
      seen.push(page.rows.map(({ id }) => id))
      while (page.nextCursor) {
        page = await list(small, { ...asked, cursor: page.nextCursor })
        seen.push(page.rows.map(({ id }) => id))
      }
      expect(seen).toHaveLength(6)
      for (const left of seen.slice(0, -1).reverse()) {
        page = await list(small, { ...asked, cursor: page.previousCursor! })
        expect(page.rows.map(({ id }) => id)).toEqual(left)
      }
      expect([page.previousCursor, page.before]).toEqual([null, 0])
    })
  })
}

describe('runs', () => walksLikeASort(runs, runValues))
describe('analyses', () => walksLikeASort(analyses, analysisValues))
describe('corrections', () => {
  beforeAll(async () => {
    await seedManyCorrections(database.db, { projectId: small.projectId, count: 40 })
    await seedManyCorrections(database.db, { projectId: large.projectId, count: 2500 })
  }, 60_000)
  walksLikeASort(corrections, correctionValues)
})
describe('projects', () => {
  beforeAll(async () => {
    // The person's first project counts as well.
    await seedManyProjects(database.db, { userId: small.userId, count: 39 })
    await seedManyProjects(database.db, { userId: large.userId, count: 2499 })
  }, 60_000)
  walksLikeASort(projects, projectValues)
})
describe('audit events', () => {
  beforeAll(async () => {
    // makeProject has told of itself: these two would be one more than the rows that were counted out.
    for (const { projectId } of [small, large]) {
      await database.db
        .deleteFrom('auditEvents')
        .where('projectId', '=', projectId)
        .where('action', '=', 'project.create')
        .execute()
    }
  })
  walksLikeASort(events, eventValues)
})

test('numbers in names count as numbers, and case does not matter', async () => {
  const access = await seededProject(0)
  const userId = access.userId
  for (const name of ['night 10', 'Night 9', 'NIGHT 2', 'Évian', 'Eva', 'zero', '100%', '2 nights']) {
    await database.db
      .insertInto('runs')
      .values({
        projectId: access.projectId,
        name,
        fileName: 'a.csv',
        byteLength: 1,
        fileSha256: 'b'.repeat(64),
        status: 'uploaded',
        facts: '{"mountCorrection":"off","sideOfPier":"east"}',
        createdBy: userId,
        updatedBy: userId,
      })
      .execute()
  }
  const { rows } = await runs(access, { sort: 'name', direction: 'asc', limit: 50 })
  expect(rows.map(({ name }) => name)).toEqual([
    '2 nights',
    '100%',
    'Eva',
    'Évian',
    'NIGHT 2',
    'Night 9',
    'night 10',
    'zero',
  ])
})

describe('while others write', () => {
  test('rows that come and go between two pages neither repeat nor hide others', async () => {
    const access = await seededProject(60)
    const before = await walk(runs, access, { sort: 'started', direction: 'desc', limit: 200 })
    const first = await runs(access, { sort: 'started', direction: 'desc', limit: 20 })
    // Goes: the very row the cursor stands on, one seen and one yet to come. Comes: rows before and after the place.
    const gone = [before[19].id, before[3].id, before[30].id]
    await database.db.deleteFrom('runs').where('id', 'in', gone).execute()
    await seedManyRows(database.db, { projectId: access.projectId, userIds: [access.userId], runCount: 30 })
    const rest: string[] = []
    let cursor = first.nextCursor
    while (cursor !== null) {
      const page = await runs(access, { sort: 'started', direction: 'desc', limit: 20, cursor })
      rest.push(...page.rows.map(({ id }) => id))
      cursor = page.nextCursor
    }
    const seen = [...first.rows.map(({ id }) => id), ...rest]
    expect(new Set(seen).size).toBe(seen.length)
    const expected = before
      .slice(20)
      .map(({ id }) => id)
      .filter((id) => !gone.includes(id))
    expect(rest.filter((id) => expected.includes(id))).toEqual(expected)
  })

  test('a place after which nothing is left shows the last page, one before which nothing is left the first', async () => {
    const access = await seededProject(25)
    const asked = { sort: 'name', direction: 'asc', limit: 10 } as const
    const all = (await walk(runs, access, asked)).map(({ id }) => id)
    const first = await runs(access, asked)
    const second = await runs(access, { ...asked, cursor: first.nextCursor! })
    await database.db.deleteFrom('runs').where('id', 'in', all.slice(20)).execute()
    const beyond = await runs(access, { ...asked, cursor: second.nextCursor! })
    expect(beyond.rows.map(({ id }) => id)).toEqual(all.slice(10, 20))
    expect([beyond.nextCursor, beyond.before]).toEqual([null, 10])
    await database.db.deleteFrom('runs').where('id', 'in', all.slice(0, 5)).execute()
    const back = await runs(access, { ...asked, cursor: beyond.previousCursor! })
    expect(back.rows.map(({ id }) => id)).toEqual(all.slice(5, 15))
    expect(back.previousCursor).toBeNull()
  })
})

test('doubles that differ in their last digit stay apart', async () => {
  const access = await seededProject(1)
  const run = (await runs(access, { sort: 'name', direction: 'asc', limit: 1 })).rows[0]
  const values = [0.1 + 0.2, 0.3, 0.30000000000000027, 5e-324, 1.7976931348623157e308]
  for (const wormAmplitudeArcsec of values) {
    await database.db
      .insertInto('analyses')
      .values({
        projectId: access.projectId,
        runId: run.id,
        name: 'Same',
        engineVersion: '1',
        samplesSha256: 'c'.repeat(64),
        recipe: '{}',
        result: '{}',
        wormAmplitudeArcsec,
        createdBy: access.userId,
        updatedBy: access.userId,
      })
      .execute()
  }
  const rows = await walk(analyses, access, { sort: 'amplitude', direction: 'desc', limit: 1 })
  expect(rows.map(({ wormAmplitudeArcsec }) => wormAmplitudeArcsec)).toEqual([...values].sort((a, b) => b - a))
})

import { sql, type Kysely } from 'kysely'
import type { RunQuery } from '@/lib/schemas/lists'
import type { Database } from '../schema'
import type { ProjectAccess } from './access'
import { allOf, equals, holdsWords, withinDays } from './filters'
import { fetchPage, naturally, type Sorts } from './keyset'

const author = sql<string>`coalesce(runs.author_name, users.display_name)`
const mountCorrection = sql<'off' | 'on' | 'unknown'>`(runs.facts ->> 'mountCorrection')`
const sideOfPier = sql<'east' | 'west' | 'unknown'>`(runs.facts ->> 'sideOfPier')`
const senseBasis = sql<'proven' | 'assumed' | null>`(runs.conversion ->> 'senseBasis')`
const analysisCount = sql<number>`(select count(*)::int from analyses where analyses.run_id = runs.id)`

const sorts: Sorts<RunQuery['sort']> = {
  name: naturally(sql.ref('runs.name')),
  started: { expression: sql.ref('runs.startedAt'), kind: 'instant', isNullable: true },
  rows: { expression: sql.ref('runs.rowCount'), kind: 'number', isNullable: true },
  correction: naturally(mountCorrection),
  sense: naturally(senseBasis, { isNullable: true }),
  analyses: { expression: analysisCount, kind: 'number' },
  size: { expression: sql.ref('runs.byteLength'), kind: 'number' },
  by: naturally(author),
  created: { expression: sql.ref('runs.createdAt'), kind: 'instant' },
}

function matches(query: RunQuery) {
  return allOf([
    holdsWords(query.q, [sql.ref('runs.name'), sql.ref('runs.fileName'), author]),
    equals(mountCorrection, query.correction),
    equals(sideOfPier, query.side),
    equals(senseBasis, query.sense),
    equals(sql.ref('runs.status'), query.state && (query.state === 'read' ? 'ready' : 'uploaded')),
    withinDays(sql.ref('runs.startedAt'), query),
  ])
}

/** One page of a project's runs with what the list shows of each, and counts of all of them. */
export async function listRuns(db: Kysely<Database>, access: ProjectAccess, query: RunQuery) {
  const source = db
    .selectFrom('runs')
    .innerJoin('users', 'users.id', 'runs.createdBy')
    .where('runs.projectId', '=', access.projectId)
  const isMatch = matches(query)
  const rows = source
    .where(isMatch)
    .select([
      'runs.id',
      'runs.projectId',
      'runs.name',
      'runs.fileName',
      'runs.byteLength',
      'runs.status',
      'runs.rowCount',
      'runs.startedAt',
      mountCorrection.as('mountCorrection'),
      sideOfPier.as('sideOfPier'),
      senseBasis.as('senseBasis'),
      analysisCount.as('analysisCount'),
      'runs.createdAt',
      author.as('createdBy'),
    ])
  const {
    isBefore,
    rows: runs,
    ...cursors
  } = await fetchPage(rows, {
    list: 'runs',
    sorts,
    id: sql.ref('runs.id'),
    query,
  })
  const isAnalysed = sql`runs.id in (select run_id from analyses where project_id = ${access.projectId})`
  const { all, total, before, ...overview } = await source
    .select([
      sql<number>`count(*)::int`.as('all'),
      sql<number>`(count(*) filter (where ${isMatch}))::int`.as('total'),
      sql<number>`(count(*) filter (where ${isMatch} and ${isBefore}))::int`.as('before'),
      sql<number>`(count(*) filter (where runs.status = 'uploaded'))::int`.as('unread'),
      sql<number>`(count(*) filter (where runs.status = 'ready' and not ${isAnalysed}))::int`.as('withoutAnalysis'),
      sql<number>`(count(*) filter (where ${senseBasis} = 'assumed'))::int`.as('assumedSense'),
    ])
    .executeTakeFirstOrThrow()
  return { runs, ...cursors, all, total, before, overview }
}

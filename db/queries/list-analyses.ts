import { sql, type Kysely } from 'kysely'
import { LONGEST_HISTORY, type AnalysisQuery } from '@/lib/schemas/lists'
import type { Database } from '../schema'
import type { ProjectAccess } from './access'
import { allOf, holdsWords } from './filters'
import { fetchPage, naturally, type Sorts } from './keyset'

const author = sql<string>`coalesce(analyses.author_name, users.display_name)`
const hasWorm = sql<boolean>`(analyses.worm_amplitude_arcsec is not null)`

const sorts: Sorts<AnalysisQuery['sort']> = {
  name: naturally(sql.ref('analyses.name')),
  run: naturally(sql.ref('runs.name')),
  period: { expression: sql.ref('analyses.wormPeriodSeconds'), kind: 'number', isNullable: true },
  amplitude: { expression: sql.ref('analyses.wormAmplitudeArcsec'), kind: 'number', isNullable: true },
  peak: { expression: sql.ref('analyses.peakToPeakArcsec'), kind: 'number', isNullable: true },
  by: naturally(author),
  created: { expression: sql.ref('analyses.createdAt'), kind: 'instant' },
}

function matches(query: AnalysisQuery) {
  return allOf([
    holdsWords(query.q, [sql.ref('analyses.name'), sql.ref('runs.name'), author]),
    query.runId === undefined ? undefined : sql`analyses.run_id = ${query.runId}::uuid`,
    query.worm === undefined ? undefined : sql`${hasWorm} = ${query.worm === 'with'}`,
  ])
}

/** One page of a project's analyses without recipes and results, and counts of all of them. */
export async function listAnalyses(db: Kysely<Database>, access: ProjectAccess, query: AnalysisQuery) {
  const source = db
    .selectFrom('analyses')
    .innerJoin('runs', 'runs.id', 'analyses.runId')
    .innerJoin('users', 'users.id', 'analyses.createdBy')
    .where('analyses.projectId', '=', access.projectId)
  const isMatch = matches(query)
  const rows = source
    .where(isMatch)
    .select([
      'analyses.id',
      'analyses.projectId',
      'analyses.runId',
      'runs.name as runName',
      'analyses.name',
      'analyses.wormPeriodSeconds',
      'analyses.wormPeriodStderrSeconds',
      'analyses.wormAmplitudeArcsec',
      'analyses.wormAmplitudeStderrArcsec',
      'analyses.peakToPeakArcsec',
      'analyses.peakToPeakStderrArcsec',
      'analyses.createdAt',
      author.as('createdBy'),
    ])
  const {
    isBefore,
    rows: analyses,
    ...cursors
  } = await fetchPage(rows, {
    list: 'analyses',
    sorts,
    id: sql.ref('analyses.id'),
    query,
  })
  const { all, total, before, ...overview } = await source
    .select([
      sql<number>`count(*)::int`.as('all'),
      sql<number>`(count(*) filter (where ${isMatch}))::int`.as('total'),
      sql<number>`(count(*) filter (where ${isMatch} and ${isBefore}))::int`.as('before'),
      sql<number | null>`min(analyses.peak_to_peak_arcsec)`.as('leastPeakToPeakArcsec'),
      sql<number | null>`max(analyses.peak_to_peak_arcsec)`.as('mostPeakToPeakArcsec'),
      sql<string | null>`(select name from runs where project_id = ${access.projectId}
        and id = ${query.runId ?? null}::uuid)`.as('runName'),
    ])
    .executeTakeFirstOrThrow()
  return { analyses, ...cursors, all, total, before, overview }
}

/** The newest analysis of each run that has a figure for the worm, by the date of the run; the last LONGEST_HISTORY. */
export async function listHistory(db: Kysely<Database>, access: ProjectAccess) {
  const newest = db
    .selectFrom('analyses')
    .where('projectId', '=', access.projectId)
    .distinctOn('runId')
    .orderBy('runId')
    .orderBy('createdAt', 'desc')
    .orderBy('id', 'desc')
    .selectAll()
  const last = await db
    .selectFrom(newest.as('newest'))
    .innerJoin('runs', 'runs.id', 'newest.runId')
    .where('newest.wormAmplitudeArcsec', 'is not', null)
    .where('newest.peakToPeakArcsec', 'is not', null)
    .select([
      'newest.id as analysisId',
      'newest.runId',
      'runs.name as runName',
      'newest.name as analysisName',
      sql<Date>`coalesce(runs.started_at, runs.created_at)`.as('at'),
      sql<boolean>`runs.started_at is not null`.as('isRecordingTimeKnown'),
      'newest.wormAmplitudeArcsec',
      'newest.wormAmplitudeStderrArcsec',
      'newest.peakToPeakArcsec',
      'newest.peakToPeakStderrArcsec',
      'newest.wormPeriodSeconds',
      sql<number>`(count(*) over ())::int`.as('total'),
    ])
    .orderBy('at', 'desc')
    .orderBy('newest.id', 'desc')
    .limit(LONGEST_HISTORY)
    .execute()
  return { points: last.reverse(), total: last[0]?.total ?? 0 }
}

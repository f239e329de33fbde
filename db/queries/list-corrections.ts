import { sql, type Kysely } from 'kysely'
import type { CorrectionQuery } from '@/lib/schemas/lists'
import type { Database } from '../schema'
import type { ProjectAccess } from './access'
import { allOf, equals, holdsWords } from './filters'
import { fetchPage, naturally, type Sorts } from './keyset'

const author = sql<string>`coalesce(corrections.author_name, users.display_name)`

const sorts: Sorts<CorrectionQuery['sort']> = {
  name: naturally(sql.ref('corrections.name')),
  analysis: naturally(sql.ref('analyses.name')),
  kind: naturally(sql.ref('corrections.kind')),
  bins: { expression: sql`(corrections.settings ->> 'binCount')::int`, kind: 'number' },
  sense: naturally(sql.ref('corrections.senseBasis')),
  by: naturally(author),
  created: { expression: sql.ref('corrections.createdAt'), kind: 'instant' },
}

function matches(query: CorrectionQuery) {
  return allOf([
    holdsWords(query.q, [sql.ref('corrections.name'), sql.ref('analyses.name'), author]),
    equals(sql.ref('corrections.kind'), query.kind),
    equals(sql.ref('corrections.senseBasis'), query.sense),
  ])
}

/** One page of a project's correction tables without their bins, and counts of all of them. */
export async function listCorrections(db: Kysely<Database>, access: ProjectAccess, query: CorrectionQuery) {
  const source = db
    .selectFrom('corrections')
    .innerJoin('analyses', 'analyses.id', 'corrections.analysisId')
    .innerJoin('users', 'users.id', 'corrections.createdBy')
    .where('corrections.projectId', '=', access.projectId)
  const isMatch = matches(query)
  const rows = source
    .where(isMatch)
    .select([
      'corrections.id',
      'corrections.version',
      'corrections.projectId',
      'corrections.analysisId',
      'analyses.name as analysisName',
      'corrections.name',
      'corrections.kind',
      'corrections.settings',
      'corrections.senseBasis',
      'corrections.createdAt',
      author.as('createdBy'),
    ])
  const {
    isBefore,
    rows: corrections,
    ...cursors
  } = await fetchPage(rows, {
    list: 'corrections',
    sorts,
    id: sql.ref('corrections.id'),
    query,
  })
  const { all, total, before, ...overview } = await source
    .select([
      sql<number>`count(*)::int`.as('all'),
      sql<number>`(count(*) filter (where ${isMatch}))::int`.as('total'),
      sql<number>`(count(*) filter (where ${isMatch} and ${isBefore}))::int`.as('before'),
      sql<number>`(count(*) filter (where corrections.sense_basis = 'assumed'))::int`.as('assumedSense'),
    ])
    .executeTakeFirstOrThrow()
  return { corrections, ...cursors, all, total, before, overview }
}

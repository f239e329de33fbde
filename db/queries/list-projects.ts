import { sql, type Kysely } from 'kysely'
import type { ProjectQuery } from '@/lib/schemas/lists'
import type { Database } from '../schema'
import { allOf, equals, holdsWords } from './filters'
import { fetchPage, naturally, type Sorts } from './keyset'

const count = (table: 'runs' | 'analyses' | 'memberships') =>
  sql<number>`(select count(*)::int from ${sql.table(table)} where project_id = projects.id)`

const wheelTeeth = sql<number | null>`train.wheel_teeth`

const sorts: Sorts<ProjectQuery['sort']> = {
  name: naturally(sql.ref('projects.name')),
  // Fewer teeth, longer period: both columns of the list are sorted by the period itself.
  period: { expression: sql`(train.worm_starts / ${wheelTeeth}::double precision)`, kind: 'number', isNullable: true },
  runs: { expression: count('runs'), kind: 'number' },
  analyses: { expression: count('analyses'), kind: 'number' },
  people: { expression: count('memberships'), kind: 'number' },
  role: naturally(sql.ref('memberships.role')),
  changed: { expression: sql.ref('projects.updatedAt'), kind: 'instant' },
}

function matches(query: ProjectQuery) {
  const isArchived = sql`projects.archived_at is not null`
  return allOf([
    holdsWords(query.q, [sql.ref('projects.name')]),
    equals(sql.ref('memberships.role'), query.role),
    query.archived === 'too' ? undefined : sql`(${isArchived}) = ${query.archived === 'only'}`,
  ])
}

/** One page of the person's projects, and counts of all of them. */
export async function listProjects(db: Kysely<Database>, userId: string, query: ProjectQuery) {
  const source = db
    .selectFrom('memberships')
    .innerJoin('projects', 'projects.id', 'memberships.projectId')
    .where('memberships.userId', '=', userId)
  const isMatch = matches(query)
  const withTrain = source.innerJoinLateral(
    (eb) =>
      eb
        .selectFrom('driveTrains')
        .select(['wheelTeeth', 'wormStarts'])
        .whereRef('driveTrains.projectId', '=', 'projects.id')
        .orderBy('number', 'desc')
        .limit(1)
        .as('train'),
    (join) => join.onTrue(),
  )
  const rows = withTrain
    .where(isMatch)
    .select([
      'projects.id',
      'projects.name',
      'memberships.role',
      'train.wheelTeeth',
      'train.wormStarts',
      count('runs').as('runCount'),
      count('analyses').as('analysisCount'),
      count('memberships').as('memberCount'),
      'projects.archivedAt',
      'projects.updatedAt',
    ])
  const {
    isBefore,
    rows: projects,
    ...cursors
  } = await fetchPage(rows, {
    list: 'projects',
    sorts,
    id: sql.ref('projects.id'),
    query,
  })
  const { all, total, before, ...overview } = await withTrain
    .select([
      sql<number>`count(*)::int`.as('all'),
      sql<number>`(count(*) filter (where ${isMatch}))::int`.as('total'),
      sql<number>`(count(*) filter (where ${isMatch} and ${isBefore}))::int`.as('before'),
      sql<number>`(count(projects.archived_at))::int`.as('archived'),
      sql<string | null>`(array_agg(projects.name order by projects.updated_at desc, projects.id))[1]`.as(
        'lastChangedName',
      ),
    ])
    .executeTakeFirstOrThrow()
  return { projects, ...cursors, all, total, before, overview }
}

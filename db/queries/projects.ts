import { sql, type Kysely, type Transaction } from 'kysely'
import type { DriveTrain } from '@/lib/analysis/types'
import type { Database } from '../schema'
import type { LastImport } from '../tables/projects'
import { accessProject, type ProjectAccess } from './access'
import { insertDriveTrain } from './drive-trains'
import { changedMeanwhile } from './changed-meanwhile'
import { Refusal, unknownThing } from './refusal'
import { lockUser } from './users'

const count = (table: 'runs' | 'analyses' | 'memberships') =>
  sql<number>`(select count(*)::int from ${sql.table(table)} where project_id = projects.id)`

/** A project with its present drive train and counts, as the member of `memberships` sees it. */
function projectsOfMember(db: Kysely<Database>, userId: string) {
  return db
    .selectFrom('memberships')
    .innerJoin('projects', 'projects.id', 'memberships.projectId')
    .innerJoinLateral(
      (eb) =>
        eb
          .selectFrom('driveTrains')
          .select(['driveTrains.id', 'axisKind', 'wheelTeeth', 'wormStarts', 'stages'])
          .whereRef('driveTrains.projectId', '=', 'projects.id')
          .orderBy('number', 'desc')
          .limit(1)
          .as('train'),
      (join) => join.onTrue(),
    )
    .where('memberships.userId', '=', userId)
    .select([
      'projects.id',
      'projects.version',
      'projects.name',
      'memberships.role',
      'projects.lastImport',
      'projects.archivedAt',
      'projects.createdAt',
      'projects.updatedAt',
      'train.id as driveTrainId',
      'train.axisKind',
      'train.wheelTeeth',
      'train.wormStarts',
      'train.stages',
      count('runs').as('runCount'),
      count('analyses').as('analysisCount'),
      count('memberships').as('memberCount'),
    ])
}

type ProjectRow = Awaited<ReturnType<ReturnType<typeof projectsOfMember>['execute']>>[number]

function withDriveTrain({ axisKind, wheelTeeth, wormStarts, stages, ...project }: ProjectRow) {
  return { ...project, driveTrain: { axisKind, wheelTeeth, wormStarts, stages } }
}

export async function findProject(db: Kysely<Database>, access: ProjectAccess) {
  const row = await projectsOfMember(db, access.userId).where('projects.id', '=', access.projectId).executeTakeFirst()
  if (!row) throw unknownThing('project')
  return withDriveTrain(row)
}

export interface NewProject {
  name: string
  driveTrain: DriveTrain
}

/** Makes a project whose maker owns it; a transaction, since a project without an owner must never be seen. */
export async function insertProject(trx: Transaction<Database>, userId: string, { name, driveTrain }: NewProject) {
  if (!(await lockUser(trx, userId))) throw unknownThing('account')
  const { id: projectId } = await trx
    .insertInto('projects')
    .values({ name, createdBy: userId, updatedBy: userId })
    .returning('id')
    .executeTakeFirstOrThrow()
  await trx.insertInto('memberships').values({ projectId, userId, role: 'owner' }).execute()
  const access = await accessProject(trx, { userId, projectId, right: 'edit' })
  await insertDriveTrain(trx, access, driveTrain)
  return access
}

/** Takes the next version number, or refuses when another change came first. */
async function takeVersion(
  trx: Transaction<Database>,
  access: ProjectAccess,
  version: number,
  set: { name?: string; archivedAt?: Date | null; archivedBy?: string | null } = {},
) {
  const updated = await trx
    .updateTable('projects')
    .set({
      version: sql<number>`version + 1`,
      updatedAt: sql<Date>`now()`,
      updatedBy: access.userId,
      ...set,
    })
    .where('id', '=', access.projectId)
    .where('version', '=', version)
    .returning('id')
    .executeTakeFirst()
  if (updated) return
  const current = await findProject(trx, access)
  throw await changedMeanwhile(trx, { table: 'projects', id: access.projectId, what: 'project', current })
}

export async function updateProjectName(
  trx: Transaction<Database>,
  access: ProjectAccess<'manage'>,
  { version, name }: { version: number; name: string },
) {
  await takeVersion(trx, access, version, { name })
  const renamed = await findProject(trx, access)
  if (renamed.archivedAt) {
    throw new Refusal({ kind: 'archived' }, 'This project is archived: open it again before you rename it')
  }
  return renamed
}

export async function updateArchived(
  trx: Transaction<Database>,
  access: ProjectAccess<'manage'>,
  { version, isArchived }: { version: number; isArchived: boolean },
) {
  const set = isArchived
    ? { archivedAt: new Date(), archivedBy: access.userId }
    : { archivedAt: null, archivedBy: null }
  await takeVersion(trx, access, version, set)
  return findProject(trx, access)
}

/** The project and everything in it, for good. */
export async function deleteProject(trx: Transaction<Database>, access: ProjectAccess<'manage'>): Promise<void> {
  await trx.deleteFrom('projects').where('id', '=', access.projectId).execute()
}

/** What goes when the project is deleted. */
export function countContents(db: Kysely<Database>, access: ProjectAccess) {
  const { projectId } = access
  const of = (table: string, condition = sql`true`) =>
    sql<number>`(select count(*)::int from ${sql.table(table)} where project_id = ${projectId} and ${condition})`
  return db
    .selectNoFrom([
      of('runs').as('runCount'),
      sql<number>`(select coalesce(sum(byte_length), 0)::float8 from runs where project_id = ${projectId})`.as(
        'runBytes',
      ),
      of('analyses').as('analysisCount'),
      sql<number>`(select count(*)::int from notes
        join analyses on analyses.id = notes.analysis_id where analyses.project_id = ${projectId})`.as('noteCount'),
      of('corrections').as('correctionCount'),
      of('memberships').as('memberCount'),
      of('share_links', sql`revoked_at is null and (expires_at is null or expires_at > now())`).as('shareLinkCount'),
      of('invitations', sql`accepted_at is null and revoked_at is null and expires_at > now()`).as('invitationCount'),
    ])
    .executeTakeFirstOrThrow()
}

export async function replaceDriveTrain(
  trx: Transaction<Database>,
  access: ProjectAccess<'edit'>,
  { version, driveTrain }: { version: number; driveTrain: DriveTrain },
) {
  await takeVersion(trx, access, version)
  await insertDriveTrain(trx, access, driveTrain)
  return findProject(trx, access)
}

/** Remembers the choices of an import for the next one; no edit of the project, so its version stays. */
export async function updateLastImport(trx: Transaction<Database>, access: ProjectAccess<'edit'>, last: LastImport) {
  await trx
    .updateTable('projects')
    .set({ lastImport: JSON.stringify(last) })
    .where('id', '=', access.projectId)
    .execute()
}

/** Owners first, then by the day they joined. */
export function listMembers(db: Kysely<Database>, access: ProjectAccess) {
  return db
    .selectFrom('memberships')
    .innerJoin('users', 'users.id', 'memberships.userId')
    .select(['users.id as userId', 'users.displayName', 'memberships.role', 'memberships.joinedAt'])
    .where('memberships.projectId', '=', access.projectId)
    .orderBy(sql`array_position(array['owner', 'editor', 'viewer'], memberships.role)`)
    .orderBy('memberships.joinedAt')
    .orderBy('users.id')
    .execute()
}

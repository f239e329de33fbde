import { sql, type Kysely } from 'kysely'
import type { Database } from '../schema'
import type { ProjectAccess } from './access'

/*
 * Everything of a project in the order of its archive: by time, then by name, then by id. Bringing an archive in gives out
 * ids in the archive's order, so the order is the same again.
 */

const author = (table: 'runs' | 'analyses' | 'corrections' | 'drive_trains') =>
  sql<string>`coalesce(${sql.ref(`${table}.author_name`)}, users.display_name)`.as('author')
const byName = (table: 'runs' | 'analyses' | 'corrections') => sql`${sql.ref(`${table}.name`)} collate "C"`

export function findProjectContent(db: Kysely<Database>, access: ProjectAccess) {
  return db
    .selectFrom('projects')
    .select(['name', 'version', 'createdAt', 'updatedAt', 'lastImport'])
    .where('id', '=', access.projectId)
    .executeTakeFirstOrThrow()
}

export function listDriveTrains(db: Kysely<Database>, access: ProjectAccess) {
  return db
    .selectFrom('driveTrains')
    .innerJoin('users', 'users.id', 'driveTrains.createdBy')
    .select([
      'driveTrains.axisKind',
      'driveTrains.wheelTeeth',
      'driveTrains.wormStarts',
      'driveTrains.stages',
      'driveTrains.createdAt',
      author('drive_trains'),
    ])
    .where('driveTrains.projectId', '=', access.projectId)
    .orderBy('driveTrains.number')
    .execute()
}

export function listPresetContent(db: Kysely<Database>, access: ProjectAccess) {
  return db
    .selectFrom('opticsPresets')
    .select([
      'name',
      'version',
      'focalLengthMm',
      'pixelSizeUm',
      'binning',
      'imageScaleArcsecPerPx',
      'imageScaleUncertaintyPercent',
      'createdAt',
      'updatedAt',
    ])
    .where('projectId', '=', access.projectId)
    .orderBy('createdAt')
    .orderBy(sql`name collate "C"`)
    .orderBy('id')
    .execute()
}

export function listRunContent(db: Kysely<Database>, access: ProjectAccess) {
  return db
    .selectFrom('runs')
    .innerJoin('users', 'users.id', 'runs.createdBy')
    .select([
      'runs.id',
      'runs.name',
      'runs.version',
      'runs.fileName',
      'runs.byteLength',
      'runs.fileSha256',
      'runs.status',
      'runs.importSettings',
      'runs.conversion',
      'runs.facts',
      'runs.rowCount',
      'runs.samplesSha256',
      'runs.createdAt',
      'runs.updatedAt',
      author('runs'),
    ])
    .where('runs.projectId', '=', access.projectId)
    .orderBy('runs.createdAt')
    .orderBy(byName('runs'))
    .orderBy('runs.id')
    .execute()
}

/** Without what fills them: recipes and results are read one by one. */
export function listAnalysisContent(db: Kysely<Database>, access: ProjectAccess) {
  return db
    .selectFrom('analyses')
    .innerJoin('users', 'users.id', 'analyses.createdBy')
    .select([
      'analyses.id',
      'analyses.runId',
      'analyses.name',
      'analyses.version',
      'analyses.samplesSha256',
      'analyses.resultVersion',
      'analyses.createdAt',
      'analyses.updatedAt',
      author('analyses'),
    ])
    .where('analyses.projectId', '=', access.projectId)
    .orderBy('analyses.createdAt')
    .orderBy(byName('analyses'))
    .orderBy('analyses.id')
    .execute()
}

export function findAnalysisContent(db: Kysely<Database>, access: ProjectAccess, analysisId: string) {
  return db
    .selectFrom('analyses')
    .select(['recipe', 'result'])
    .where('projectId', '=', access.projectId)
    .where('id', '=', analysisId)
    .executeTakeFirstOrThrow()
}

export function listNoteContent(db: Kysely<Database>, access: ProjectAccess, analysisId: string) {
  return db
    .selectFrom('notes')
    .innerJoin('analyses', 'analyses.id', 'notes.analysisId')
    .innerJoin('users', 'users.id', 'notes.authorId')
    .innerJoin('users as updaters', 'updaters.id', 'notes.updatedBy')
    .leftJoin('users as resolvers', 'resolvers.id', 'notes.resolvedBy')
    .select([
      'notes.version',
      'notes.anchorKind',
      'notes.anchorValue',
      'notes.text',
      'notes.createdAt',
      'notes.updatedAt',
      'notes.resolvedAt',
      sql<string>`coalesce(notes.author_name, users.display_name)`.as('author'),
      sql<string>`coalesce(notes.updated_by_name, updaters.display_name)`.as('updatedByName'),
      sql<string | null>`coalesce(notes.resolved_by_name, resolvers.display_name)`.as('resolvedByName'),
    ])
    .where('analyses.projectId', '=', access.projectId)
    .where('notes.analysisId', '=', analysisId)
    .orderBy('notes.createdAt')
    .orderBy('notes.id')
    .execute()
}

/** Without the tables: they are read one by one. */
export function listCorrectionContent(db: Kysely<Database>, access: ProjectAccess) {
  return db
    .selectFrom('corrections')
    .innerJoin('analyses', 'analyses.id', 'corrections.analysisId')
    .innerJoin('runs', 'runs.id', 'analyses.runId')
    .innerJoin('users', 'users.id', 'corrections.createdBy')
    .select([
      'corrections.id',
      'corrections.analysisId',
      'corrections.name',
      'corrections.version',
      'corrections.kind',
      'corrections.senseBasis',
      'corrections.createdAt',
      'runs.name as runName',
      'analyses.engineVersion',
      'analyses.samplesSha256',
      author('corrections'),
    ])
    .where('corrections.projectId', '=', access.projectId)
    .orderBy('corrections.createdAt')
    .orderBy(byName('corrections'))
    .orderBy('corrections.id')
    .execute()
}

export function findTableContent(db: Kysely<Database>, access: ProjectAccess, correctionId: string) {
  return db
    .selectFrom('corrections')
    .select('tableResult')
    .where('projectId', '=', access.projectId)
    .where('id', '=', correctionId)
    .executeTakeFirstOrThrow()
}

/**
 * What was done to the project, oldest first. That it was brought in from an archive is left out: it tells of this server
 * and not of the mount, and a project that was brought in gives the same archive again.
 */
export function listTrailContent(db: Kysely<Database>, access: ProjectAccess) {
  return db
    .selectFrom('auditEvents')
    .select(['at', 'actorName', 'action', 'subject'])
    .where('projectId', '=', access.projectId)
    .where('action', '!=', 'project.import')
    .orderBy('at')
    .orderBy('id')
    .execute()
}

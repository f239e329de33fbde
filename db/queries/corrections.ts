import { sql, type Kysely } from 'kysely'
import type { z } from 'zod'
import type { TableResult } from '@/lib/analysis/types'
import type { newCorrectionSchema } from '@/lib/schemas/api'
import type { Database } from '../schema'
import type { ProjectAccess } from './access'
import { unknownThing } from './refusal'

function summariesOf(db: Kysely<Database>, access: ProjectAccess) {
  return db
    .selectFrom('corrections')
    .innerJoin('analyses', 'analyses.id', 'corrections.analysisId')
    .innerJoin('users', 'users.id', 'corrections.createdBy')
    .where('corrections.projectId', '=', access.projectId)
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
      sql<string>`coalesce(corrections.author_name, users.display_name)`.as('createdBy'),
    ])
}

export async function findCorrection(db: Kysely<Database>, access: ProjectAccess, correctionId: string) {
  const correction = await summariesOf(db, access)
    .select('corrections.tableResult as table')
    .where('corrections.id', '=', correctionId)
    .executeTakeFirst()
  if (!correction) throw unknownThing('correction table')
  return correction
}

/** What a written table says about where it comes from, beside the table itself. */
export async function findCorrectionSource(db: Kysely<Database>, access: ProjectAccess, correctionId: string) {
  const source = await db
    .selectFrom('corrections')
    .innerJoin('analyses', 'analyses.id', 'corrections.analysisId')
    .innerJoin('runs', 'runs.id', 'analyses.runId')
    .where('corrections.projectId', '=', access.projectId)
    .where('corrections.id', '=', correctionId)
    .select([
      'corrections.name',
      'corrections.kind',
      'corrections.senseBasis',
      'corrections.tableResult',
      'runs.name as runName',
      'analyses.engineVersion',
      'analyses.samplesSha256',
    ])
    .executeTakeFirst()
  if (!source) throw unknownThing('correction table')
  return source
}

export type NewCorrection = Omit<z.output<typeof newCorrectionSchema>, 'isAssumedSenseConfirmed'> & {
  /** As the saved analysis holds it. */
  table: TableResult
  senseBasis: 'proven' | 'assumed'
}

export async function insertCorrection(
  db: Kysely<Database>,
  access: ProjectAccess<'edit'>,
  { table, ...fields }: NewCorrection,
) {
  const { id } = await db
    .insertInto('corrections')
    .values({
      ...fields,
      projectId: access.projectId,
      settings: JSON.stringify(table.settings),
      tableResult: JSON.stringify(table),
      createdBy: access.userId,
    })
    .returning('id')
    .executeTakeFirstOrThrow()
  return findCorrection(db, access, id)
}

export async function deleteCorrection(db: Kysely<Database>, access: ProjectAccess<'edit'>, correctionId: string) {
  const deleted = await db
    .deleteFrom('corrections')
    .where('projectId', '=', access.projectId)
    .where('id', '=', correctionId)
    .returning('name')
    .executeTakeFirst()
  if (!deleted) throw unknownThing('correction table')
  return deleted
}

import { sql, type Kysely } from 'kysely'
import type { z } from 'zod'
import type { opticsFieldsSchema } from '@/lib/schemas/api'
import type { Database } from '../schema'
import type { ProjectAccess } from './access'
import { changedMeanwhile } from './changed-meanwhile'
import { unknownThing } from './refusal'

type OpticsFields = z.infer<typeof opticsFieldsSchema>

const COLUMNS = [
  'id',
  'version',
  'name',
  'focalLengthMm',
  'pixelSizeUm',
  'binning',
  'imageScaleArcsecPerPx',
  'imageScaleUncertaintyPercent',
] as const

export function listOpticsPresets(db: Kysely<Database>, access: ProjectAccess) {
  return db
    .selectFrom('opticsPresets')
    .select(COLUMNS)
    .where('projectId', '=', access.projectId)
    .orderBy('name')
    .orderBy('id')
    .execute()
}

export async function findOpticsPreset(db: Kysely<Database>, access: ProjectAccess, presetId: string) {
  const preset = await db
    .selectFrom('opticsPresets')
    .select(COLUMNS)
    .where('projectId', '=', access.projectId)
    .where('id', '=', presetId)
    .executeTakeFirst()
  if (!preset) throw unknownThing('optics preset')
  return preset
}

export function insertOpticsPreset(db: Kysely<Database>, access: ProjectAccess<'edit'>, fields: OpticsFields) {
  const { projectId, userId } = access
  return db
    .insertInto('opticsPresets')
    .values({ ...fields, projectId, createdBy: userId, updatedBy: userId })
    .returning(COLUMNS)
    .executeTakeFirstOrThrow()
}

export interface PresetChange {
  presetId: string
  version: number
  fields: OpticsFields
}

export async function updateOpticsPreset(
  db: Kysely<Database>,
  access: ProjectAccess<'edit'>,
  { presetId, version, fields }: PresetChange,
) {
  const updated = await db
    .updateTable('opticsPresets')
    .set({ ...fields, version: sql<number>`version + 1`, updatedAt: sql<Date>`now()`, updatedBy: access.userId })
    .where('projectId', '=', access.projectId)
    .where('id', '=', presetId)
    .where('version', '=', version)
    .returning(COLUMNS)
    .executeTakeFirst()
  if (updated) return updated
  const current = await findOpticsPreset(db, access, presetId)
  throw await changedMeanwhile(db, { table: 'opticsPresets', id: presetId, what: 'optics preset', current })
}

export async function deleteOpticsPreset(db: Kysely<Database>, access: ProjectAccess<'edit'>, presetId: string) {
  const deleted = await db
    .deleteFrom('opticsPresets')
    .where('projectId', '=', access.projectId)
    .where('id', '=', presetId)
    .returning('name')
    .executeTakeFirst()
  if (!deleted) throw unknownThing('optics preset')
  return deleted
}

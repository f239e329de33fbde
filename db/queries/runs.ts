import { sql, type Kysely, type Transaction } from 'kysely'
import type { Conversion } from '@/lib/analysis/types'
import type { ImportSettings } from '@/lib/formats/types'
import { unknownRunFacts, type RunFacts } from '@/lib/schemas/run-facts'
import type { Database } from '../schema'
import type { ProjectAccess } from './access'
import { changedMeanwhile } from './changed-meanwhile'
import { Refusal, unknownThing } from './refusal'
import type { StoredFile } from './run-files'

function runsOf(db: Kysely<Database>, access: ProjectAccess) {
  return db
    .selectFrom('runs')
    .innerJoin('users', 'users.id', 'runs.createdBy')
    .where('runs.projectId', '=', access.projectId)
    .select([
      'runs.id',
      'runs.version',
      'runs.projectId',
      'runs.name',
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
      sql<string>`coalesce(runs.author_name, users.display_name)`.as('createdBy'),
      sql<number>`(select count(*)::int from analyses where run_id = runs.id)`.as('analysisCount'),
    ])
}

export async function findRun(db: Kysely<Database>, access: ProjectAccess, runId: string) {
  const run = await runsOf(db, access).where('runs.id', '=', runId).executeTakeFirst()
  if (!run) throw unknownThing('run')
  return run
}

export interface NewRun {
  id: string
  name: string
  fileName: string
  file: StoredFile
}

/** Takes a transaction: the file's rows were written in it before. */
export async function insertRun(
  trx: Transaction<Database>,
  access: ProjectAccess<'edit'>,
  { id, name, fileName, file }: NewRun,
) {
  await trx
    .insertInto('runs')
    .values({
      id,
      projectId: access.projectId,
      name,
      fileName,
      byteLength: file.byteLength,
      fileSha256: file.sha256,
      status: 'uploaded',
      facts: JSON.stringify(unknownRunFacts()),
      createdBy: access.userId,
      updatedBy: access.userId,
    })
    .execute()
  return findRun(trx, access, id)
}

/**
 * A run that this person has stored from the very same file under the same names and that nobody has read or changed since:
 * what is there when the answer to an upload was lost and the file is sent again.
 */
export function findUnreadTwin(
  db: Kysely<Database>,
  access: ProjectAccess<'edit'>,
  { name, fileName, file }: Omit<NewRun, 'id'>,
) {
  return runsOf(db, access)
    .where('runs.createdBy', '=', access.userId)
    .where('runs.status', '=', 'uploaded')
    .where('runs.version', '=', 1)
    .where('runs.fileSha256', '=', file.sha256)
    .where('runs.name', '=', name)
    .where('runs.fileName', '=', fileName)
    .limit(1)
    .executeTakeFirst()
}

/** The run, if it still is at the version that a change was made from; else the refusal that tells of the other change. */
export async function findRunAtVersion(
  db: Kysely<Database>,
  access: ProjectAccess,
  { runId, version }: { runId: string; version: number },
) {
  const current = await findRun(db, access, runId)
  if (current.version === version) return current
  throw await changedMeanwhile(db, { table: 'runs', id: runId, what: 'run', current })
}

interface RunUpdate {
  name?: string
  conversion: string
  facts: string
  importSettings?: string
  status?: 'ready'
  rowCount?: number
  samplesSha256?: string
}

async function updateRunAtVersion(
  trx: Transaction<Database>,
  access: ProjectAccess<'edit'>,
  { runId, version, set }: { runId: string; version: number; set: RunUpdate },
) {
  const updated = await trx
    .updateTable('runs')
    .set({ ...set, version: sql<number>`version + 1`, updatedAt: sql<Date>`now()`, updatedBy: access.userId })
    .where('projectId', '=', access.projectId)
    .where('id', '=', runId)
    .where('version', '=', version)
    .returning('id')
    .executeTakeFirst()
  if (!updated) await findRunAtVersion(trx, access, { runId, version })
  return findRun(trx, access, runId)
}

export interface RunChange {
  runId: string
  version: number
  name: string
  conversion: Conversion
  facts: RunFacts
}

export function updateRun(
  trx: Transaction<Database>,
  access: ProjectAccess<'edit'>,
  { runId, version, name, conversion, facts }: RunChange,
) {
  const set = { name, conversion: JSON.stringify(conversion), facts: JSON.stringify(facts) }
  return updateRunAtVersion(trx, access, { runId, version, set })
}

export interface RunImport {
  runId: string
  version: number
  settings: ImportSettings
  conversion: Conversion
  facts: RunFacts
  rowCount: number
  samplesSha256: string
  /** Packed columns, compressed. */
  compressed: Buffer
}

/** Keeps the columns that were read and what they were read with; replaces those of an earlier reading. */
export async function updateRunColumns(trx: Transaction<Database>, access: ProjectAccess<'edit'>, read: RunImport) {
  const { runId, version, rowCount, samplesSha256 } = read
  const run = await updateRunAtVersion(trx, access, {
    runId,
    version,
    set: {
      status: 'ready',
      importSettings: JSON.stringify(read.settings),
      conversion: JSON.stringify(read.conversion),
      facts: JSON.stringify(read.facts),
      rowCount,
      samplesSha256,
    },
  })
  await trx
    .insertInto('runColumns')
    .values({ runId, encoding: 'gzip', bytes: read.compressed })
    .onConflict((conflict) => conflict.column('runId').doUpdateSet({ encoding: 'gzip', bytes: read.compressed }))
    .execute()
  return run
}

/** Deletes the run and its file. Refused while analyses are kept of it: they would lose what they speak of. */
export async function deleteRun(trx: Transaction<Database>, access: ProjectAccess<'edit'>, runId: string) {
  const { name } = await findRun(trx, access, runId)
  await trx.selectFrom('runs').select('id').where('id', '=', runId).forUpdate().execute()
  const { analysisCount } = await findRun(trx, access, runId)
  if (analysisCount > 0) {
    const analyses = analysisCount === 1 ? 'one saved analysis' : `${analysisCount} saved analyses`
    throw new Refusal({ kind: 'in-use' }, `“${name}” has ${analyses}. Delete them first, then the run.`)
  }
  await trx.deleteFrom('runs').where('projectId', '=', access.projectId).where('id', '=', runId).execute()
  return { name }
}

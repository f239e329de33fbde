import { createHash } from 'node:crypto'
import type { Kysely, Transaction } from 'kysely'
import type { Database } from '../schema'
import type { ProjectAccess } from './access'
import { unknownThing } from './refusal'

/** Size of the rows that hold a file. */
export const CHUNK_BYTES = 1024 * 1024

export interface StoredFile {
  byteLength: number
  sha256: string
}

/**
 * Writes a file's bytes into rows of 1 MB while they arrive; no more than one row of it is in memory. The run that they
 * belong to has to follow in the same transaction: whatever breaks off, nothing stays behind.
 */
export async function insertRunFile(
  trx: Transaction<Database>,
  runId: string,
  parts: AsyncIterable<Uint8Array>,
): Promise<StoredFile> {
  const hash = createHash('sha256')
  let chunk = Buffer.allocUnsafe(CHUNK_BYTES)
  let filled = 0
  let index = 0
  const flush = async () => {
    await trx
      .insertInto('runFileChunks')
      .values({ runId, index, bytes: chunk.subarray(0, filled) })
      .execute()
    index += 1
    filled = 0
    chunk = Buffer.allocUnsafe(CHUNK_BYTES)
  }
  let byteLength = 0
  for await (const part of parts) {
    hash.update(part)
    byteLength += part.byteLength
    for (let offset = 0; offset < part.byteLength;) {
      const taken = Math.min(part.byteLength - offset, CHUNK_BYTES - filled)
      chunk.set(part.subarray(offset, offset + taken), filled)
      filled += taken
      offset += taken
      if (filled === CHUNK_BYTES) await flush()
    }
  }
  if (filled > 0) await flush()
  return { byteLength, sha256: hash.digest('hex') }
}

/** Takes back what insertRunFile wrote in the same transaction. */
export async function deleteRunFile(trx: Transaction<Database>, runId: string): Promise<void> {
  await trx.deleteFrom('runFileChunks').where('runId', '=', runId).execute()
}

/** The original bytes, one row after the other. */
export async function* readRunFile(db: Kysely<Database>, access: ProjectAccess, runId: string): AsyncGenerator<Buffer> {
  for (let index = 0; ; index += 1) {
    const row = await db
      .selectFrom('runFileChunks')
      .innerJoin('runs', 'runs.id', 'runFileChunks.runId')
      .select('runFileChunks.bytes')
      .where('runs.projectId', '=', access.projectId)
      .where('runFileChunks.runId', '=', runId)
      .where('runFileChunks.index', '=', index)
      .executeTakeFirst()
    if (!row) return
    yield row.bytes
  }
}

/** The packed columns as they are stored, and the hash of what they unpack to. */
export async function findRunColumns(db: Kysely<Database>, access: ProjectAccess, runId: string) {
  const row = await db
    .selectFrom('runColumns')
    .innerJoin('runs', 'runs.id', 'runColumns.runId')
    .select(['runColumns.bytes', 'runColumns.encoding', 'runs.samplesSha256'])
    .where('runs.projectId', '=', access.projectId)
    .where('runs.id', '=', runId)
    .executeTakeFirst()
  if (!row) throw unknownThing('recording that has been read')
  return row
}

import 'server-only'
import type { z } from 'zod'
import { database } from '@/db'
import type { ProjectAccess } from '@/db/queries/access'
import { insertAuditEvent } from '@/db/queries/audit'
import { updateLastImport } from '@/db/queries/projects'
import { readRunFile } from '@/db/queries/run-files'
import { findRunAtVersion, updateRunColumns } from '@/db/queries/runs'
import { readColumns } from '@/db/read-columns'
import type { importRunSchema } from '@/lib/schemas/api'
import { unreadableFile } from './errors'
import { createGate } from './gate'

type RunImport = z.output<typeof importRunSchema>

/** A file, its columns and what they are packed into: some 250 MB for the largest. */
const gate = createGate(3, 'Several files are being read just now. Try again in a moment; yours is stored.')

/** Reads the stored file with the given settings; on a fault the run and its file stay as they were. */
export function importRun(access: ProjectAccess<'edit'>, runId: string, wanted: RunImport) {
  return gate(() => readAndKeep(access, runId, wanted))
}

async function readAndKeep(access: ProjectAccess<'edit'>, runId: string, wanted: RunImport) {
  const { version, settings, conversion } = wanted
  const { byteLength } = await findRunAtVersion(database(), access, { runId, version })
  const bytes = Buffer.alloc(byteLength)
  let filled = 0
  for await (const part of readRunFile(database(), access, runId)) filled += part.copy(bytes, filled)
  const outcome = await readColumns(bytes, settings)
  if (!outcome.ok) throw unreadableFile(outcome.fault)
  const { rowCount, samplesSha256, compressed, startedAtMs } = outcome
  const startedAt = wanted.facts.startedAt ?? (startedAtMs === null ? null : new Date(startedAtMs).toISOString())
  const facts = { ...wanted.facts, startedAt }
  return database()
    .transaction()
    .execute(async (trx) => {
      const read = { runId, version, settings, conversion, facts, rowCount, samplesSha256, compressed }
      const run = await updateRunColumns(trx, access, read)
      await updateLastImport(trx, access, { settings, conversion })
      await insertAuditEvent(trx, access, { action: 'run.import', subject: run.name })
      return run
    })
}

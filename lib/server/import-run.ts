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

type RunImport = z.output<typeof importRunSchema>

/** Reads the stored file with the given settings; on a fault the run and its file stay as they were. */
export async function importRun(access: ProjectAccess<'edit'>, runId: string, wanted: RunImport) {
  const { version, settings, conversion } = wanted
  await findRunAtVersion(database(), access, { runId, version })
  const parts: Buffer[] = []
  for await (const part of readRunFile(database(), access, runId)) parts.push(part)
  const outcome = await readColumns(Buffer.concat(parts), settings)
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

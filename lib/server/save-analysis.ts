import 'server-only'
import type { z } from 'zod'
import { database } from '@/db'
import type { ProjectAccess } from '@/db/queries/access'
import { insertAnalysis } from '@/db/queries/analyses'
import { insertAuditEvent } from '@/db/queries/audit'
import { findRun } from '@/db/queries/runs'
import { fullAnalysisResultSchema } from '@/lib/schemas/analysis-result'
import type { newAnalysisSchema } from '@/lib/schemas/api'
import { AppError } from './errors'

/** Keeps a recipe and its figures as they were shown; the samples' hash is the run's own, not the sender's word. */
export async function saveAnalysis(access: ProjectAccess<'edit'>, fields: z.output<typeof newAnalysisSchema>) {
  const checked = fullAnalysisResultSchema.safeParse(fields.result)
  if (!checked.success) {
    const faults = checked.error.issues.map(({ path, message }) => [['result', ...path].join('.'), message])
    throw new AppError('not-valid', 'These figures are not complete, so they can’t be kept. Analyse the run again.', {
      fields: Object.fromEntries(faults),
    })
  }
  return database()
    .transaction()
    .execute(async (trx) => {
      const run = await findRun(trx, access, fields.runId)
      if (run.status !== 'ready' || run.samplesSha256 === null) {
        const message = `“${run.name}” has not been read yet: choose its columns first, then save the analysis`
        throw new AppError('run-not-ready', message)
      }
      const { worm } = checked.data
      const analysis = await insertAnalysis(trx, access, { ...fields, samplesSha256: run.samplesSha256, worm })
      await insertAuditEvent(trx, access, { action: 'analysis.save', subject: analysis.name })
      return analysis
    })
}

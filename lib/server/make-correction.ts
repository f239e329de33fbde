import 'server-only'
import type { z } from 'zod'
import { database } from '@/db'
import type { ProjectAccess } from '@/db/queries/access'
import { findAnalysis } from '@/db/queries/analyses'
import { insertAuditEvent } from '@/db/queries/audit'
import { insertCorrection } from '@/db/queries/corrections'
import { findRun } from '@/db/queries/runs'
import { tableResultSchema } from '@/lib/schemas/analysis-result'
import type { newCorrectionSchema } from '@/lib/schemas/api'
import type { RunFacts } from '@/lib/schemas/run-facts'
import { AppError } from './errors'

type NewCorrection = z.output<typeof newCorrectionSchema>

/**
 * A run that was recorded while a correction played, or may have, shows what that correction left: its table can only be
 * added to the one that was in. A run recorded without gives a table of its own.
 */
function assertKindFits(kind: NewCorrection['kind'], mountCorrection: RunFacts['mountCorrection']): void {
  if (kind === 'stand-alone' && mountCorrection !== 'off') {
    const state =
      mountCorrection === 'on'
        ? 'was recorded while a correction was playing in the mount'
        : 'is not known to have been recorded without a correction in the mount'
    const message = `This run ${state}, so it can only give an addition to the table that was in`
    throw new AppError('correction-was-on', message)
  }
  if (kind === 'addition' && mountCorrection === 'off') {
    const message = 'This run was recorded without a correction in the mount: there is no table to add to'
    throw new AppError('not-valid', message, { fields: { kind: message } })
  }
}

/** Takes the table out of the saved analysis; nothing of it comes from the request. */
export async function makeCorrection(access: ProjectAccess<'edit'>, wanted: NewCorrection) {
  const { analysisId, name, kind, isAssumedSenseConfirmed } = wanted
  return database()
    .transaction()
    .execute(async (trx) => {
      const analysis = await findAnalysis(trx, access, analysisId)
      const run = await findRun(trx, access, analysis.runId)
      assertKindFits(kind, run.facts.mountCorrection)
      const { senseBasis } = analysis.recipe.conversion
      if (senseBasis === 'assumed' && !isAssumedSenseConfirmed) {
        const message =
          'The sense of this run is only assumed. With the wrong sense the table makes the error larger: confirm that you will check.'
        throw new AppError('sense-not-confirmed', message, { fields: { isAssumedSenseConfirmed: message } })
      }
      const table = tableResultSchema.safeParse(analysis.result.table)
      if (!table.success) {
        throw new AppError(
          'no-table',
          `“${analysis.name}” holds no correction table: it has no worm figure to make one of`,
        )
      }
      const correction = await insertCorrection(trx, access, { analysisId, name, kind, table: table.data, senseBasis })
      await insertAuditEvent(trx, access, { action: 'correction.create', subject: name })
      return correction
    })
}

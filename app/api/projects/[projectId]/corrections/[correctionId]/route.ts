import { database } from '@/db'
import { insertAuditEvent } from '@/db/queries/audit'
import { deleteCorrection } from '@/db/queries/corrections'
import { correctionSchema } from '@/lib/schemas/api'
import { loadCorrection } from '@/lib/server/load-analyses'
import { answer, answerNothing, respondInProject, type RouteContext } from '@/lib/server/respond'

type Context = RouteContext<'projectId' | 'correctionId'>

export function GET(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'read' }, async ({ access, params }) =>
    answer(correctionSchema, await loadCorrection(access, params.correctionId)),
  )
}

export function DELETE(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'edit' }, async ({ access, params }) => {
    await database()
      .transaction()
      .execute(async (trx) => {
        const { name } = await deleteCorrection(trx, access, params.correctionId)
        await insertAuditEvent(trx, access, { action: 'correction.delete', subject: name })
      })
    return answerNothing()
  })
}

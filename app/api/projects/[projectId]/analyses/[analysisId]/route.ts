import { database } from '@/db'
import { deleteAnalysis, updateAnalysisName } from '@/db/queries/analyses'
import { insertAuditEvent } from '@/db/queries/audit'
import { analysisChangeSchema, analysisSchema } from '@/lib/schemas/api'
import { loadAnalysis } from '@/lib/server/load-analyses'
import { answer, answerNothing, readJson, respondInProject, type RouteContext } from '@/lib/server/respond'

type Context = RouteContext<'projectId' | 'analysisId'>

export function GET(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'read' }, async ({ access, params }) =>
    answer(analysisSchema, await loadAnalysis(access, params.analysisId)),
  )
}

export function PATCH(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'edit' }, async ({ access, params }) => {
    const change = await readJson(request, analysisChangeSchema)
    const analysis = await database()
      .transaction()
      .execute(async (trx) => {
        const renamed = await updateAnalysisName(trx, access, { analysisId: params.analysisId, ...change })
        await insertAuditEvent(trx, access, { action: 'analysis.rename', subject: renamed.name })
        return renamed
      })
    return answer(analysisSchema, analysis)
  })
}

export function DELETE(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'edit' }, async ({ access, params }) => {
    await database()
      .transaction()
      .execute(async (trx) => {
        const { name } = await deleteAnalysis(trx, access, params.analysisId)
        await insertAuditEvent(trx, access, { action: 'analysis.delete', subject: name })
      })
    return answerNothing()
  })
}

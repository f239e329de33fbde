import { database } from '@/db'
import { insertAuditEvent } from '@/db/queries/audit'
import { deleteRun, updateRun } from '@/db/queries/runs'
import { runChangeSchema, runSchema } from '@/lib/schemas/api'
import { loadRun } from '@/lib/server/load-runs'
import { answer, answerNothing, readJson, respondInProject, type RouteContext } from '@/lib/server/respond'

type Context = RouteContext<'projectId' | 'runId'>

export function GET(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'read' }, async ({ access, params }) =>
    answer(runSchema, await loadRun(access, params.runId)),
  )
}

export function PATCH(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'edit' }, async ({ access, params }) => {
    const change = await readJson(request, runChangeSchema)
    const run = await database()
      .transaction()
      .execute(async (trx) => {
        const changed = await updateRun(trx, access, { runId: params.runId, ...change })
        await insertAuditEvent(trx, access, { action: 'run.change', subject: changed.name })
        return changed
      })
    return answer(runSchema, run)
  })
}

export function DELETE(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'edit' }, async ({ access, params }) => {
    await database()
      .transaction()
      .execute(async (trx) => {
        const { name } = await deleteRun(trx, access, params.runId)
        await insertAuditEvent(trx, access, { action: 'run.delete', subject: name })
      })
    return answerNothing()
  })
}

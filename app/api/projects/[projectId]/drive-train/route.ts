import { database } from '@/db'
import { insertAuditEvent } from '@/db/queries/audit'
import { replaceDriveTrain } from '@/db/queries/projects'
import { driveTrainChangeSchema, projectSchema } from '@/lib/schemas/api'
import { answer, readJson, respondInProject, type RouteContext } from '@/lib/server/respond'

export function PUT(request: Request, context: RouteContext<'projectId'>) {
  return respondInProject({ request, context, right: 'edit' }, async ({ access }) => {
    const change = await readJson(request, driveTrainChangeSchema)
    const project = await database()
      .transaction()
      .execute(async (trx) => {
        const changed = await replaceDriveTrain(trx, access, change)
        const { wheelTeeth, stages } = change.driveTrain
        const subject = `wheel of ${wheelTeeth ?? 'unknown'} teeth, ${stages.length} further stages`
        await insertAuditEvent(trx, access, { action: 'drive-train.change', subject })
        return changed
      })
    return answer(projectSchema, project)
  })
}

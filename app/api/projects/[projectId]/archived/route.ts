import { database } from '@/db'
import { insertAuditEvent } from '@/db/queries/audit'
import { updateArchived } from '@/db/queries/projects'
import { projectArchivedSchema, projectSchema } from '@/lib/schemas/api'
import { answer, readJson, respondInProject, type RouteContext } from '@/lib/server/respond'

export function PUT(request: Request, context: RouteContext<'projectId'>) {
  return respondInProject({ request, context, right: 'manage' }, async ({ access }) => {
    const change = await readJson(request, projectArchivedSchema)
    const project = await database()
      .transaction()
      .execute(async (trx) => {
        const changed = await updateArchived(trx, access, change)
        const action = change.isArchived ? 'project.archive' : 'project.reopen'
        await insertAuditEvent(trx, access, { action, subject: changed.name })
        return changed
      })
    return answer(projectSchema, project)
  })
}

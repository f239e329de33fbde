import { database } from '@/db'
import { insertAuditEvent } from '@/db/queries/audit'
import { updateProjectName } from '@/db/queries/projects'
import { projectChangeSchema, projectSchema } from '@/lib/schemas/api'
import { loadProject } from '@/lib/server/load-projects'
import { answer, readJson, respondInProject, type RouteContext } from '@/lib/server/respond'

type Context = RouteContext<'projectId'>

export function GET(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'read' }, async ({ access }) =>
    answer(projectSchema, await loadProject(access)),
  )
}

export function PATCH(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'manage' }, async ({ access }) => {
    const change = await readJson(request, projectChangeSchema)
    const project = await database()
      .transaction()
      .execute(async (trx) => {
        const renamed = await updateProjectName(trx, access, change)
        await insertAuditEvent(trx, access, { action: 'project.rename', subject: renamed.name })
        return renamed
      })
    return answer(projectSchema, project)
  })
}

import { database } from '@/db'
import { insertAccountEvent, insertAuditEvent } from '@/db/queries/audit'
import { accessProject } from '@/db/queries/access'
import { lockPeople } from '@/db/queries/memberships'
import { deleteProject, findProject, updateProjectName } from '@/db/queries/projects'
import { projectChangeSchema, projectDeletionSchema, projectSchema } from '@/lib/schemas/api'
import { AppError } from '@/lib/server/errors'
import { loadProject } from '@/lib/server/load-projects'
import { answer, answerNothing, readJson, respondInProject, type RouteContext } from '@/lib/server/respond'

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

/** The event stays in the account's own trail: the project's goes with it. */
export function DELETE(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'manage' }, async ({ access, user }) => {
    const typed = await readJson(request, projectDeletionSchema)
    await database()
      .transaction()
      .execute(async (trx) => {
        // Nothing can be got back, so the right is looked at once more when nobody can take it away any more.
        await lockPeople(trx, access.projectId)
        await accessProject(trx, { ...access, right: 'manage' })
        const { name } = await findProject(trx, access)
        if (typed.name.trim() !== name) {
          const message = `Type the name as it stands: “${name}”. Nothing was deleted.`
          throw new AppError('not-valid', message, { fields: { name: message } })
        }
        await deleteProject(trx, access)
        await insertAccountEvent(trx, user.id, { action: 'project.delete', subject: name })
      })
    return answerNothing()
  })
}

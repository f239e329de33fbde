import { database } from '@/db'
import { insertAuditEvent } from '@/db/queries/audit'
import { findProject, insertProject } from '@/db/queries/projects'
import { newProjectSchema, projectSchema } from '@/lib/schemas/api'
import { projectListSchema, projectQuerySchema } from '@/lib/schemas/lists'
import { requireUser } from '@/lib/server/auth'
import { loadProjects } from '@/lib/server/load-projects'
import { answer, queryOf, readJson, respond, respondToMutation } from '@/lib/server/respond'

export function GET(request: Request) {
  return respond(async () => {
    const user = await requireUser(request)
    return answer(projectListSchema, await loadProjects(user.id, queryOf(request, projectQuerySchema)))
  })
}

export function POST(request: Request) {
  return respondToMutation(request, async () => {
    const user = await requireUser(request)
    const fields = await readJson(request, newProjectSchema)
    const project = await database()
      .transaction()
      .execute(async (trx) => {
        const access = await insertProject(trx, user.id, fields)
        await insertAuditEvent(trx, access, { action: 'project.create', subject: fields.name })
        return findProject(trx, access)
      })
    return answer(projectSchema, project, 201)
  })
}

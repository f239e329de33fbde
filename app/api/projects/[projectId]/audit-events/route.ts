import { auditEventListSchema, auditQuerySchema } from '@/lib/schemas/lists'
import { loadAuditEvents } from '@/lib/server/load-projects'
import { answer, queryOf, respondInProject, type RouteContext } from '@/lib/server/respond'

export function GET(request: Request, context: RouteContext<'projectId'>) {
  return respondInProject({ request, context, right: 'read' }, async ({ access }) =>
    answer(auditEventListSchema, await loadAuditEvents(access, queryOf(request, auditQuerySchema))),
  )
}

import { auditEventListSchema } from '@/lib/schemas/api'
import { loadAuditEvents } from '@/lib/server/load-projects'
import { answer, pageOf, respondInProject, type RouteContext } from '@/lib/server/respond'

export function GET(request: Request, context: RouteContext<'projectId'>) {
  return respondInProject({ request, context, right: 'read' }, async ({ access }) =>
    answer(auditEventListSchema, await loadAuditEvents(access, pageOf(request))),
  )
}

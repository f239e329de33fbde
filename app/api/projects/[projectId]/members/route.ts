import { memberListSchema } from '@/lib/schemas/api'
import { loadMembers } from '@/lib/server/load-projects'
import { answer, respondInProject, type RouteContext } from '@/lib/server/respond'

export function GET(request: Request, context: RouteContext<'projectId'>) {
  return respondInProject({ request, context, right: 'read' }, async ({ access }) =>
    answer(memberListSchema, { members: await loadMembers(access) }),
  )
}

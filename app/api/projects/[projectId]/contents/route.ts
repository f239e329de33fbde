import { projectContentsSchema } from '@/lib/schemas/api'
import { loadContents } from '@/lib/server/load-projects'
import { answer, respondInProject, type RouteContext } from '@/lib/server/respond'

export function GET(request: Request, context: RouteContext<'projectId'>) {
  return respondInProject({ request, context, right: 'read' }, async ({ access }) =>
    answer(projectContentsSchema, await loadContents(access)),
  )
}

import { historySchema } from '@/lib/schemas/lists'
import { loadHistory } from '@/lib/server/load-analyses'
import { answer, respondInProject, type RouteContext } from '@/lib/server/respond'

export function GET(request: Request, context: RouteContext<'projectId'>) {
  return respondInProject({ request, context, right: 'read' }, async ({ access }) =>
    answer(historySchema, await loadHistory(access)),
  )
}

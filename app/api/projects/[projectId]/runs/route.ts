import { runSchema } from '@/lib/schemas/api'
import { runListSchema, runQuerySchema } from '@/lib/schemas/lists'
import { loadRuns } from '@/lib/server/load-runs'
import { answer, queryOf, respondInProject, type RouteContext } from '@/lib/server/respond'
import { uploadRun } from '@/lib/server/upload-run'

type Context = RouteContext<'projectId'>

export function GET(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'read' }, async ({ access }) =>
    answer(runListSchema, await loadRuns(access, queryOf(request, runQuerySchema))),
  )
}

export function POST(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'edit' }, async ({ access }) =>
    answer(runSchema, await uploadRun(request, access), 201),
  )
}

import { importRunSchema, runSchema } from '@/lib/schemas/api'
import { importRun } from '@/lib/server/import-run'
import { answer, readJson, respondInProject, type RouteContext } from '@/lib/server/respond'

export function PUT(request: Request, context: RouteContext<'projectId' | 'runId'>) {
  return respondInProject({ request, context, right: 'edit' }, async ({ access, params }) =>
    answer(runSchema, await importRun(access, params.runId, await readJson(request, importRunSchema))),
  )
}

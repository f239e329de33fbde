import { analysisSchema, newAnalysisSchema } from '@/lib/schemas/api'
import { analysisListSchema, analysisQuerySchema } from '@/lib/schemas/lists'
import { loadAnalyses } from '@/lib/server/load-analyses'
import { answer, queryOf, readJson, respondInProject, type RouteContext } from '@/lib/server/respond'
import { saveAnalysis } from '@/lib/server/save-analysis'

type Context = RouteContext<'projectId'>

export function GET(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'read' }, async ({ access }) =>
    answer(analysisListSchema, await loadAnalyses(access, queryOf(request, analysisQuerySchema))),
  )
}

export function POST(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'edit' }, async ({ access }) =>
    answer(analysisSchema, await saveAnalysis(access, await readJson(request, newAnalysisSchema)), 201),
  )
}

import { z } from 'zod'
import { analysisListSchema, analysisSchema, newAnalysisSchema } from '@/lib/schemas/api'
import { loadAnalyses } from '@/lib/server/load-analyses'
import { answer, pageOf, readJson, respondInProject, type RouteContext } from '@/lib/server/respond'
import { saveAnalysis } from '@/lib/server/save-analysis'

type Context = RouteContext<'projectId'>

const filterSchema = z.object({ runId: z.uuid().optional() })

export function GET(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'read' }, async ({ access }) => {
    const { runId } = filterSchema.parse(Object.fromEntries(new URL(request.url).searchParams))
    return answer(analysisListSchema, await loadAnalyses(access, { ...pageOf(request), runId }))
  })
}

export function POST(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'edit' }, async ({ access }) =>
    answer(analysisSchema, await saveAnalysis(access, await readJson(request, newAnalysisSchema)), 201),
  )
}

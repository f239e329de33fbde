import { correctionSchema, newCorrectionSchema } from '@/lib/schemas/api'
import { correctionListSchema, correctionQuerySchema } from '@/lib/schemas/lists'
import { loadCorrections } from '@/lib/server/load-analyses'
import { makeCorrection } from '@/lib/server/make-correction'
import { answer, queryOf, readJson, respondInProject, type RouteContext } from '@/lib/server/respond'

type Context = RouteContext<'projectId'>

export function GET(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'read' }, async ({ access }) =>
    answer(correctionListSchema, await loadCorrections(access, queryOf(request, correctionQuerySchema))),
  )
}

export function POST(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'edit' }, async ({ access }) =>
    answer(correctionSchema, await makeCorrection(access, await readJson(request, newCorrectionSchema)), 201),
  )
}

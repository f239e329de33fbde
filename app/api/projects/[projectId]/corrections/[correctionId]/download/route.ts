import { z } from 'zod'
import { database } from '@/db'
import { findCorrectionSource } from '@/db/queries/corrections'
import { writeCorrectionCsv } from '@/lib/formats/correction-csv'
import { writeCorrectionJson } from '@/lib/formats/correction-json'
import { tableResultSchema } from '@/lib/schemas/analysis-result'
import { attachment } from '@/lib/server/download'
import { respondInProject, type RouteContext } from '@/lib/server/respond'

const WRITERS = {
  csv: { write: writeCorrectionCsv, contentType: 'text/csv; charset=utf-8; header=present' },
  json: { write: writeCorrectionJson, contentType: 'application/json' },
}

const querySchema = z.object({ format: z.enum(['csv', 'json'], { error: 'Choose csv or json' }) })

export function GET(request: Request, context: RouteContext<'projectId' | 'correctionId'>) {
  return respondInProject({ request, context, right: 'read' }, async ({ access, params }) => {
    const { format } = querySchema.parse(Object.fromEntries(new URL(request.url).searchParams))
    const { tableResult, ...source } = await findCorrectionSource(database(), access, params.correctionId)
    const { write, contentType } = WRITERS[format]
    const text = write(tableResultSchema.parse(tableResult), source)
    return new Response(text, { headers: attachment({ fileName: `${source.name}.${format}`, contentType }) })
  })
}

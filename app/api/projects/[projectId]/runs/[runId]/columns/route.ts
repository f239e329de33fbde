import { database } from '@/db'
import { findRunColumns } from '@/db/queries/run-files'
import { respondInProject, type RouteContext } from '@/lib/server/respond'

/**
 * The packed columns as a gzip file, just as they are stored. Not as a content encoding: Next.js drops that header from
 * what handlers answer, and the asker would take compressed bytes for plain ones.
 */
export function GET(request: Request, context: RouteContext<'projectId' | 'runId'>) {
  return respondInProject({ request, context, right: 'read' }, async ({ access, params }) => {
    const { bytes, encoding, samplesSha256 } = await findRunColumns(database(), access, params.runId)
    const etag = `"${samplesSha256}"`
    const headers = new Headers({ 'cache-control': 'private, no-cache', etag, vary: 'cookie' })
    if (request.headers.get('if-none-match') === etag) return new Response(null, { status: 304, headers })
    headers.set('content-type', `application/${encoding}`)
    return new Response(new Uint8Array(bytes), { headers })
  })
}

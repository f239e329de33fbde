import { gunzipSync } from 'node:zlib'
import { database } from '@/db'
import { findRunColumns } from '@/db/queries/run-files'
import { respondInProject, type RouteContext } from '@/lib/server/respond'

/** The packed columns: compressed as they are stored, unless the asker can't take that. */
export function GET(request: Request, context: RouteContext<'projectId' | 'runId'>) {
  return respondInProject({ request, context, right: 'read' }, async ({ access, params }) => {
    const { bytes, encoding, samplesSha256 } = await findRunColumns(database(), access, params.runId)
    const etag = `"${samplesSha256}"`
    const headers = new Headers({ 'cache-control': 'private, no-cache', etag, vary: 'accept-encoding, cookie' })
    if (request.headers.get('if-none-match') === etag) return new Response(null, { status: 304, headers })
    headers.set('content-type', 'application/octet-stream')
    const isCompressionTaken = (request.headers.get('accept-encoding') ?? '').includes(encoding)
    if (isCompressionTaken) headers.set('content-encoding', encoding)
    return new Response(new Uint8Array(isCompressionTaken ? bytes : gunzipSync(bytes)), { headers })
  })
}

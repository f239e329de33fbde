import { database } from '@/db'
import { findSharedColumns, openShareLink } from '@/db/queries/shared-reports'
import { addressLimit, takeAttempt } from '@/lib/server/rate-limit'
import { respond, type RouteContext } from '@/lib/server/respond'

/** The packed columns as a gzip file, from which the report's pictures are drawn; see the run's own handler. */
export function GET(request: Request, context: RouteContext<'token'>) {
  return respond(async () => {
    await takeAttempt(addressLimit('share columns address', request))
    const access = await openShareLink(database(), (await context.params).token)
    const { bytes, encoding } = await findSharedColumns(database(), access)
    const headers = { 'cache-control': 'no-store', 'content-type': `application/${encoding}` }
    return new Response(new Uint8Array(bytes), { headers })
  })
}

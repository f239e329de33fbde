import { database } from '@/db'
import { openShareLink } from '@/db/queries/shared-reports'
import { shareReportSchema } from '@/lib/schemas/share'
import { addressLimit, takeAttempt } from '@/lib/server/rate-limit'
import { answer, respond, type RouteContext } from '@/lib/server/respond'
import { loadShareReport } from '@/lib/server/share'

/** What the report shows, for whoever holds the link. */
export function GET(request: Request, context: RouteContext<'token'>) {
  return respond(async () => {
    await takeAttempt(addressLimit('share address', request))
    const access = await openShareLink(database(), (await context.params).token)
    return answer(shareReportSchema, await loadShareReport(access))
  })
}

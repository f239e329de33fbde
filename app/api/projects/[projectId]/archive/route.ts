import { safeFileName } from '@/lib/formats/archive-names'
import { attachment } from '@/lib/server/download'
import { exportProject } from '@/lib/server/export-project'
import { loadProject } from '@/lib/server/load-projects'
import { accountLimit, addressLimit, takeAttempt } from '@/lib/server/rate-limit'
import { respondInProject, type RouteContext } from '@/lib/server/respond'

/** Everything of the project as a ZIP, made while it is sent. */
export function GET(request: Request, context: RouteContext<'projectId'>) {
  return respondInProject({ request, context, right: 'read' }, async ({ access }) => {
    await takeAttempt(accountLimit('archive download account', access.userId))
    await takeAttempt(addressLimit('archive download address', request))
    const { name } = await loadProject(access)
    const stream = await exportProject(access)
    return new Response(stream, {
      headers: attachment({ fileName: safeFileName(`${name}.zip`), contentType: 'application/zip' }),
    })
  })
}

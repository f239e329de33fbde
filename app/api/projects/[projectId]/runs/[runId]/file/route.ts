import { database } from '@/db'
import { readRunFile } from '@/db/queries/run-files'
import { attachment } from '@/lib/server/download'
import { loadRun } from '@/lib/server/load-runs'
import { respondInProject, type RouteContext } from '@/lib/server/respond'

/** The original bytes, sent while they are read. */
export function GET(request: Request, context: RouteContext<'projectId' | 'runId'>) {
  return respondInProject({ request, context, right: 'read' }, async ({ access, params }) => {
    const run = await loadRun(access, params.runId)
    const parts = readRunFile(database(), access, run.id)
    const stream = new ReadableStream<Uint8Array>({
      async pull(controller) {
        const { done, value } = await parts.next()
        if (done) controller.close()
        else controller.enqueue(value)
      },
      async cancel() {
        await parts.return(undefined)
      },
    })
    const headers = attachment({ fileName: run.fileName, contentType: 'application/octet-stream' })
    return new Response(stream, { headers })
  })
}

import { projectSchema } from '@/lib/schemas/api'
import { requireUser } from '@/lib/server/auth'
import { importProject } from '@/lib/server/import-project'
import { answer, respondToMutation } from '@/lib/server/respond'

/** An archive of …/archive as the body becomes a new project. Outside the proxy's matcher: see proxy.ts. */
export function POST(request: Request) {
  return respondToMutation(request, async () => {
    const user = await requireUser(request)
    return answer(projectSchema, await importProject(request, user.id), 201)
  })
}

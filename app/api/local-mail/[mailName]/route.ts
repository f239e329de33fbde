import { localMailSchema } from '@/lib/schemas/local-mail'
import { localMailFolder, readLocalMail } from '@/lib/server/local-mail'
import { answer, respond } from '@/lib/server/respond'

export function GET(request: Request, context: RouteContext<'/api/local-mail/[mailName]'>) {
  return respond(async () => {
    const { mailName } = await context.params
    return answer(localMailSchema, await readLocalMail(localMailFolder(request), mailName))
  })
}

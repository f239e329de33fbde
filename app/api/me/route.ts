import { meSchema } from '@/lib/schemas/api'
import { validateRequest } from '@/lib/server/auth'
import { answer, respond } from '@/lib/server/respond'

export function GET(request: Request) {
  return respond(async () => answer(meSchema, { user: await validateRequest(request) }))
}

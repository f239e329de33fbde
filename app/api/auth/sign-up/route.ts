import { meSchema, signUpSchema } from '@/lib/schemas/api'
import { closeSession, openSession } from '@/lib/server/auth'
import { answer, readJson, respondToMutation } from '@/lib/server/respond'
import { signUp } from '@/lib/server/sign-in'

export function POST(request: Request) {
  return respondToMutation(request, async () => {
    const user = await signUp(request, await readJson(request, signUpSchema))
    // As after signing in: a session that this browser had before is over.
    await closeSession(request)
    const response = answer(meSchema, { user }, 201)
    response.headers.append('set-cookie', await openSession(request, user.id))
    return response
  })
}

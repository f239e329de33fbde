import { meSchema, signUpSchema } from '@/lib/schemas/api'
import { openSession } from '@/lib/server/auth'
import { answer, readJson, respondToMutation } from '@/lib/server/respond'
import { signUp } from '@/lib/server/sign-in'

export function POST(request: Request) {
  return respondToMutation(request, async () => {
    const user = await signUp(request, await readJson(request, signUpSchema))
    const response = answer(meSchema, { user }, 201)
    response.headers.append('set-cookie', await openSession(request, user.id))
    return response
  })
}

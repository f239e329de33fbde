import { invitationSignUpSchema, joinedSchema } from '@/lib/schemas/people'
import { closeSession, openSession } from '@/lib/server/auth'
import { signUpWithLink } from '@/lib/server/join'
import { answer, readJson, respondToMutation } from '@/lib/server/respond'

export function POST(request: Request) {
  return respondToMutation(request, async () => {
    const { userId, ...joined } = await signUpWithLink(request, await readJson(request, invitationSignUpSchema))
    // As after signing in: a session that this browser had before is over.
    await closeSession(request)
    const response = answer(joinedSchema, joined, 201)
    response.headers.append('set-cookie', await openSession(request, userId))
    return response
  })
}

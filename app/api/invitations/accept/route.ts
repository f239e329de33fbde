import { acceptInvitationSchema, joinedSchema } from '@/lib/schemas/people'
import { requireUser } from '@/lib/server/auth'
import { joinWithLink } from '@/lib/server/join'
import { answer, readJson, respondToMutation } from '@/lib/server/respond'

export function POST(request: Request) {
  return respondToMutation(request, async () => {
    const user = await requireUser(request)
    const { token } = await readJson(request, acceptInvitationSchema)
    return answer(joinedSchema, await joinWithLink(request, user.id, token))
  })
}

import { passwordChangeSchema } from '@/lib/schemas/accounts'
import { changePassword } from '@/lib/server/account'
import { requireUser } from '@/lib/server/auth'
import { answerNothing, readJson, respondToMutation } from '@/lib/server/respond'

export function POST(request: Request) {
  return respondToMutation(request, async () => {
    const user = await requireUser(request)
    await changePassword(request, user, await readJson(request, passwordChangeSchema))
    return answerNothing()
  })
}

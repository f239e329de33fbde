import { resetPasswordSchema } from '@/lib/schemas/accounts'
import { closeSession, openSession } from '@/lib/server/auth'
import { resetPassword } from '@/lib/server/reset-password'
import { answerNothing, readJson, respondToMutation } from '@/lib/server/respond'

export function POST(request: Request) {
  return respondToMutation(request, async () => {
    const userId = await resetPassword(request, await readJson(request, resetPasswordSchema))
    // This browser may have been signed in as somebody else.
    await closeSession(request)
    const response = answerNothing()
    response.headers.append('set-cookie', await openSession(request, userId))
    return response
  })
}

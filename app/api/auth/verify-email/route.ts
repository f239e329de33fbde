import { verifiedSchema, verifyEmailSchema } from '@/lib/schemas/accounts'
import { closeSession, openSession } from '@/lib/server/auth'
import { followVerifyLink } from '@/lib/server/mail-links'
import { answer, readJson, respondToMutation } from '@/lib/server/respond'
import { removeBrowserSecret } from '@/lib/server/sign-up'

export function POST(request: Request) {
  return respondToMutation(request, async () => {
    const followed = await followVerifyLink(request, await readJson(request, verifyEmailSchema))
    const response = answer(verifiedSchema, followed)
    if (followed.outcome === 'account-made') {
      // A session that this browser had before is over; its cookie is replaced by the new one.
      await closeSession(request)
      response.headers.append('set-cookie', await openSession(request, followed.userId))
      response.headers.append('set-cookie', removeBrowserSecret())
    }
    return response
  })
}

import { meSchema, signInSchema } from '@/lib/schemas/api'
import { closeSession, openSession } from '@/lib/server/auth'
import { answer, readJson, respondToMutation } from '@/lib/server/respond'
import { signIn } from '@/lib/server/sign-in'
import { themeCookie } from '@/lib/server/theme-cookie'

export function POST(request: Request) {
  return respondToMutation(request, async () => {
    const { user, provenHash } = await signIn(request, await readJson(request, signInSchema))
    // A session that this browser had before is over; its cookie is replaced by the new one.
    await closeSession(request)
    const response = answer(meSchema, { user })
    response.headers.append('set-cookie', await openSession(request, user.id, provenHash))
    const theme = themeCookie(user.preferences.theme)
    if (theme) response.headers.append('set-cookie', theme)
    return response
  })
}

import { localPath } from '@/lib/client/local-path'
import { MAIL_ON_ITS_WAY, mailOnItsWaySchema, signUpRequestSchema } from '@/lib/schemas/accounts'
import { answer, readJson, respondToMutation } from '@/lib/server/respond'
import { requestSignUp } from '@/lib/server/sign-up'

/** As long as sign_ups.next_path takes. */
const LONGEST_PATH = 2000

/** An address that is too long to be kept leads to its page without the settings. */
function keptPath(next: string | undefined): string {
  const path = localPath(next)
  return path.length > LONGEST_PATH ? localPath(path.split(/[?#]/)[0].slice(0, LONGEST_PATH)) : path
}

export function POST(request: Request) {
  return respondToMutation(request, async () => {
    const { next, ...form } = await readJson(request, signUpRequestSchema)
    const cookie = await requestSignUp(request, { ...form, nextPath: keptPath(next) })
    const response = answer(mailOnItsWaySchema, MAIL_ON_ITS_WAY, 202)
    response.headers.append('set-cookie', cookie)
    return response
  })
}

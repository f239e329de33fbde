import { emailChangeSchema, MAIL_ON_ITS_WAY, mailOnItsWaySchema } from '@/lib/schemas/accounts'
import { askEmailChange } from '@/lib/server/account'
import { requireUser } from '@/lib/server/auth'
import { answer, readJson, respondToMutation } from '@/lib/server/respond'

export function POST(request: Request) {
  return respondToMutation(request, async () => {
    const user = await requireUser(request)
    await askEmailChange(request, user, await readJson(request, emailChangeSchema))
    return answer(mailOnItsWaySchema, MAIL_ON_ITS_WAY, 202)
  })
}

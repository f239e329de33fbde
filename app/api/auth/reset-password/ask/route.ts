import { askResetSchema, MAIL_ON_ITS_WAY, mailOnItsWaySchema } from '@/lib/schemas/accounts'
import { askReset } from '@/lib/server/reset-password'
import { answer, readJson, respondToMutation } from '@/lib/server/respond'

export function POST(request: Request) {
  return respondToMutation(request, async () => {
    await askReset(request, await readJson(request, askResetSchema))
    return answer(mailOnItsWaySchema, MAIL_ON_ITS_WAY, 202)
  })
}

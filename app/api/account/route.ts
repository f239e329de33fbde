import { deleteAccountSchema, nameChangeSchema } from '@/lib/schemas/accounts'
import { meSchema } from '@/lib/schemas/api'
import { changeName } from '@/lib/server/account'
import { closeSession, requireUser } from '@/lib/server/auth'
import { removeAccount } from '@/lib/server/delete-account'
import { answer, answerNothing, readJson, respondToMutation } from '@/lib/server/respond'

export function PATCH(request: Request) {
  return respondToMutation(request, async () => {
    const user = await requireUser(request)
    return answer(meSchema, { user: await changeName(user, await readJson(request, nameChangeSchema)) })
  })
}

export function DELETE(request: Request) {
  return respondToMutation(request, async () => {
    const user = await requireUser(request)
    await removeAccount(user, await readJson(request, deleteAccountSchema))
    const response = answerNothing()
    response.headers.append('set-cookie', await closeSession(request))
    return response
  })
}

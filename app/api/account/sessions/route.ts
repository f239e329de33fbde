import { database } from '@/db'
import { deleteSessions } from '@/db/queries/sessions'
import { sessionListSchema } from '@/lib/schemas/accounts'
import { sessionsOf } from '@/lib/server/account'
import { requireUser, sessionIdOf } from '@/lib/server/auth'
import { answer, answerNothing, respond, respondToMutation } from '@/lib/server/respond'

export function GET(request: Request) {
  return respond(async () => {
    const user = await requireUser(request)
    return answer(sessionListSchema, { sessions: await sessionsOf(request, user.id) })
  })
}

/** Ends all but the one that asks. */
export function DELETE(request: Request) {
  return respondToMutation(request, async () => {
    const user = await requireUser(request)
    await deleteSessions(database(), { userId: user.id, keep: sessionIdOf(request) })
    return answerNothing()
  })
}

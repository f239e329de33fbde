import { z } from 'zod'
import { database } from '@/db'
import { deleteSession } from '@/db/queries/sessions'
import { requireUser } from '@/lib/server/auth'
import { AppError } from '@/lib/server/errors'
import { answerNothing, respondToMutation, type RouteContext } from '@/lib/server/respond'

export function DELETE(request: Request, { params }: RouteContext<'sessionId'>) {
  return respondToMutation(request, async () => {
    const user = await requireUser(request)
    const { sessionId } = await params
    const isId = z.uuid().safeParse(sessionId).success
    if (!isId || !(await deleteSession(database(), { userId: user.id, publicId: sessionId }))) {
      throw new AppError('not-found', 'This session has ended already')
    }
    return answerNothing()
  })
}

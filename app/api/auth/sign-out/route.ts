import { closeSession } from '@/lib/server/auth'
import { answerNothing, respondToMutation } from '@/lib/server/respond'

export function POST(request: Request) {
  return respondToMutation(request, async () => {
    const response = answerNothing()
    response.headers.append('set-cookie', await closeSession(request))
    return response
  })
}

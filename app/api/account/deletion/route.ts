import { database } from '@/db'
import { planDeletion } from '@/db/queries/account-deletion'
import { deletionSchema } from '@/lib/schemas/accounts'
import { requireUser } from '@/lib/server/auth'
import { answer, respond } from '@/lib/server/respond'

export function GET(request: Request) {
  return respond(async () => {
    const user = await requireUser(request)
    return answer(deletionSchema, await planDeletion(database(), user.id))
  })
}

import { preferencesChangeSchema, preferencesSchema } from '@/lib/schemas/preferences'
import { requireUser } from '@/lib/server/auth'
import { answer, readJson, respondToMutation } from '@/lib/server/respond'
import { changePreferences } from '@/lib/server/change-preferences'

export function PATCH(request: Request) {
  return respondToMutation(request, async () => {
    const user = await requireUser(request)
    const change = await readJson(request, preferencesChangeSchema)
    return answer(preferencesSchema, await changePreferences(user, change))
  })
}

import { setLocalMailRefusing } from '@/db/mail/local-mail-folder'
import { localMailRefusingSchema } from '@/lib/schemas/local-mail'
import { localMailFolder } from '@/lib/server/local-mail'
import { answer, readJson, respondToMutation } from '@/lib/server/respond'

export function PUT(request: Request) {
  return respondToMutation(request, async () => {
    const folder = localMailFolder(request)
    const { isRefusing } = await readJson(request, localMailRefusingSchema)
    await setLocalMailRefusing(folder, isRefusing)
    return answer(localMailRefusingSchema, { isRefusing })
  })
}

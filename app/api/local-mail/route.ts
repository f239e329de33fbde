import { deleteLocalMails, isLocalMailRefusing } from '@/db/mail/local-mail-folder'
import { localMailListSchema } from '@/lib/schemas/local-mail'
import { localMailFolder, readLocalMails } from '@/lib/server/local-mail'
import { answer, answerNothing, respond, respondToMutation } from '@/lib/server/respond'

export const dynamic = 'force-dynamic'

export function GET(request: Request) {
  return respond(async () => {
    const folder = localMailFolder(request)
    return answer(localMailListSchema, {
      isRefusing: isLocalMailRefusing(folder),
      mails: await readLocalMails(folder),
    })
  })
}

export function DELETE(request: Request) {
  return respondToMutation(request, async () => {
    await deleteLocalMails(localMailFolder(request))
    return answerNothing()
  })
}

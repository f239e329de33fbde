import { database } from '@/db'
import { insertAuditEvent } from '@/db/queries/audit'
import { resolveNote } from '@/db/queries/notes'
import { noteResolutionSchema, noteSchema } from '@/lib/schemas/api'
import { answer, readJson, respondInProject, type RouteContext } from '@/lib/server/respond'

type Context = RouteContext<'projectId' | 'noteId'>

export function PUT(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'edit' }, async ({ access, params }) => {
    const resolution = await readJson(request, noteResolutionSchema)
    const settled = await database()
      .transaction()
      .execute(async (trx) => {
        const { note, isChanged } = await resolveNote(trx, access, { noteId: params.noteId, ...resolution })
        const action = resolution.isResolved ? 'note.resolve' : 'note.reopen'
        if (isChanged) await insertAuditEvent(trx, access, { action, subject: note.text.slice(0, 80) })
        return note
      })
    return answer(noteSchema, settled)
  })
}

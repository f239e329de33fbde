import { database } from '@/db'
import { insertAuditEvent } from '@/db/queries/audit'
import { deleteNote, updateNote } from '@/db/queries/notes'
import { noteChangeSchema, noteSchema } from '@/lib/schemas/api'
import { answer, answerNothing, readJson, respondInProject, type RouteContext } from '@/lib/server/respond'

type Context = RouteContext<'projectId' | 'noteId'>

export function PATCH(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'edit' }, async ({ access, params }) => {
    const { version, ...note } = await readJson(request, noteChangeSchema)
    const changed = await database()
      .transaction()
      .execute(async (trx) => {
        const updated = await updateNote(trx, access, { noteId: params.noteId, version, note })
        await insertAuditEvent(trx, access, { action: 'note.change', subject: note.text.slice(0, 80) })
        return updated
      })
    return answer(noteSchema, changed)
  })
}

export function DELETE(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'edit' }, async ({ access, params }) => {
    await database()
      .transaction()
      .execute(async (trx) => {
        const { text } = await deleteNote(trx, access, params.noteId)
        await insertAuditEvent(trx, access, { action: 'note.delete', subject: text.slice(0, 80) })
      })
    return answerNothing()
  })
}

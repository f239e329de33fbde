import { database } from '@/db'
import { insertAuditEvent } from '@/db/queries/audit'
import { insertNote } from '@/db/queries/notes'
import { newNoteSchema, noteListSchema, noteSchema } from '@/lib/schemas/api'
import { loadNotes } from '@/lib/server/load-analyses'
import { answer, readJson, respondInProject, type RouteContext } from '@/lib/server/respond'

type Context = RouteContext<'projectId' | 'analysisId'>

export function GET(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'read' }, async ({ access, params }) =>
    answer(noteListSchema, { notes: await loadNotes(access, params.analysisId) }),
  )
}

export function POST(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'edit' }, async ({ access, params }) => {
    const note = await readJson(request, newNoteSchema)
    const written = await database()
      .transaction()
      .execute(async (trx) => {
        const inserted = await insertNote(trx, access, { analysisId: params.analysisId, note })
        await insertAuditEvent(trx, access, { action: 'note.write', subject: note.text.slice(0, 80) })
        return inserted
      })
    return answer(noteSchema, written, 201)
  })
}

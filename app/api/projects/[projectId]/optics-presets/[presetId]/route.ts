import { database } from '@/db'
import { insertAuditEvent } from '@/db/queries/audit'
import { deleteOpticsPreset, updateOpticsPreset } from '@/db/queries/optics-presets'
import { opticsChangeSchema, opticsPresetSchema } from '@/lib/schemas/api'
import { answer, answerNothing, readJson, respondInProject, type RouteContext } from '@/lib/server/respond'

type Context = RouteContext<'projectId' | 'presetId'>

export function PATCH(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'edit' }, async ({ access, params }) => {
    const { version, ...fields } = await readJson(request, opticsChangeSchema)
    const preset = await database()
      .transaction()
      .execute(async (trx) => {
        const changed = await updateOpticsPreset(trx, access, { presetId: params.presetId, version, fields })
        await insertAuditEvent(trx, access, { action: 'optics-preset.change', subject: fields.name })
        return changed
      })
    return answer(opticsPresetSchema, preset)
  })
}

export function DELETE(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'edit' }, async ({ access, params }) => {
    await database()
      .transaction()
      .execute(async (trx) => {
        const { name } = await deleteOpticsPreset(trx, access, params.presetId)
        await insertAuditEvent(trx, access, { action: 'optics-preset.delete', subject: name })
      })
    return answerNothing()
  })
}

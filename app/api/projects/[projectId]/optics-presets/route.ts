import { database } from '@/db'
import { insertAuditEvent } from '@/db/queries/audit'
import { insertOpticsPreset } from '@/db/queries/optics-presets'
import { opticsFieldsSchema, opticsPresetListSchema, opticsPresetSchema } from '@/lib/schemas/api'
import { loadOpticsPresets } from '@/lib/server/load-projects'
import { answer, readJson, respondInProject, type RouteContext } from '@/lib/server/respond'

type Context = RouteContext<'projectId'>

export function GET(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'read' }, async ({ access }) =>
    answer(opticsPresetListSchema, { presets: await loadOpticsPresets(access) }),
  )
}

export function POST(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'edit' }, async ({ access }) => {
    const fields = await readJson(request, opticsFieldsSchema)
    const preset = await database()
      .transaction()
      .execute(async (trx) => {
        await insertAuditEvent(trx, access, { action: 'optics-preset.create', subject: fields.name })
        return insertOpticsPreset(trx, access, fields)
      })
    return answer(opticsPresetSchema, preset, 201)
  })
}

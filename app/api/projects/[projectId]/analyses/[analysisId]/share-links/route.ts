import { database } from '@/db'
import { insertAuditEvent } from '@/db/queries/audit'
import { insertShareLink, listShareLinks } from '@/db/queries/share-links'
import { shareLinkFieldsSchema, shareLinkListSchema, shareLinkSchema } from '@/lib/schemas/share'
import { answer, readJson, respondInProject, type RouteContext } from '@/lib/server/respond'
import { assertLaterThanNow } from '@/lib/server/share'

type Context = RouteContext<'projectId' | 'analysisId'>

export function GET(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'unshare' }, async ({ access, params }) =>
    answer(shareLinkListSchema, { links: await listShareLinks(database(), access, params.analysisId) }),
  )
}

export function POST(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'edit' }, async ({ access, params }) => {
    const fields = await readJson(request, shareLinkFieldsSchema)
    assertLaterThanNow(fields.expiresAt)
    const made = await database()
      .transaction()
      .execute(async (trx) => {
        const { link, analysisName } = await insertShareLink(trx, access, { analysisId: params.analysisId, fields })
        await insertAuditEvent(trx, access, { action: 'share-link.create', subject: analysisName })
        return link
      })
    return answer(shareLinkSchema, made, 201)
  })
}

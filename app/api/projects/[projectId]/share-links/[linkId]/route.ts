import { database } from '@/db'
import { insertAuditEvent } from '@/db/queries/audit'
import { revokeShareLink, updateShareLink } from '@/db/queries/share-links'
import { shareLinkChangeSchema, shareLinkSchema } from '@/lib/schemas/share'
import { answer, answerNothing, readJson, respondInProject, type RouteContext } from '@/lib/server/respond'
import { assertLaterThanNow } from '@/lib/server/share'

type Context = RouteContext<'projectId' | 'linkId'>

export function PATCH(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'edit' }, async ({ access, params }) => {
    const change = await readJson(request, shareLinkChangeSchema)
    assertLaterThanNow(change.expiresAt)
    const changed = await database()
      .transaction()
      .execute(async (trx) => {
        const { link, analysisName } = await updateShareLink(trx, access, { linkId: params.linkId, ...change })
        await insertAuditEvent(trx, access, { action: 'share-link.change', subject: analysisName })
        return link
      })
    return answer(shareLinkSchema, changed)
  })
}

/** Revokes it, in an archived project too. It stays in the list, so that whoever opens it learns that it has ended. */
export function DELETE(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'unshare' }, async ({ access, params }) => {
    await database()
      .transaction()
      .execute(async (trx) => {
        const { analysisName, isChanged } = await revokeShareLink(trx, access, params.linkId)
        if (isChanged) await insertAuditEvent(trx, access, { action: 'share-link.revoke', subject: analysisName })
      })
    return answerNothing()
  })
}

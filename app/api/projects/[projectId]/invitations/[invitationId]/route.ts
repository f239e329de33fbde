import { database } from '@/db'
import { insertAuditEvent } from '@/db/queries/audit'
import { revokeInvitation } from '@/db/queries/invitations'
import { aRole } from '@/lib/schemas/rights'
import { answerNothing, respondInProject, type RouteContext } from '@/lib/server/respond'

export function DELETE(request: Request, context: RouteContext<'projectId' | 'invitationId'>) {
  return respondInProject({ request, context, right: 'manage' }, async ({ access, params }) => {
    await database()
      .transaction()
      .execute(async (trx) => {
        const { role } = await revokeInvitation(trx, access, params.invitationId)
        await insertAuditEvent(trx, access, { action: 'invitation.revoke', subject: `as ${aRole(role)}` })
      })
    return answerNothing()
  })
}

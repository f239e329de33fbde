import { database } from '@/db'
import { insertAuditEvent } from '@/db/queries/audit'
import { resendInvitation } from '@/db/queries/invitations'
import { invitationSchema } from '@/lib/schemas/people'
import { aRole } from '@/lib/schemas/rights'
import { takeInvitationAttempt } from '@/lib/server/invite'
import { answer, respondInProject, type RouteContext } from '@/lib/server/respond'

export function POST(request: Request, context: RouteContext<'projectId' | 'invitationId'>) {
  return respondInProject({ request, context, right: 'manage' }, async ({ access, params }) => {
    await takeInvitationAttempt(request, access)
    const invitation = await database()
      .transaction()
      .execute(async (trx) => {
        const sent = await resendInvitation(trx, access, params.invitationId)
        await insertAuditEvent(trx, access, { action: 'invitation.resend', subject: `as ${aRole(sent.role)}` })
        return sent
      })
    return answer(invitationSchema, invitation)
  })
}

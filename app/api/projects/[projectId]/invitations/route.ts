import { database } from '@/db'
import { insertAuditEvent } from '@/db/queries/audit'
import { insertInvitation } from '@/db/queries/invitations'
import { invitationListSchema, invitationSchema, newInvitationSchema } from '@/lib/schemas/people'
import { aRole } from '@/lib/schemas/rights'
import { takeInvitationAttempt } from '@/lib/server/invite'
import { loadInvitations } from '@/lib/server/load-people'
import { answer, readJson, respondInProject, type RouteContext } from '@/lib/server/respond'

type Context = RouteContext<'projectId'>

export function GET(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'manage' }, async ({ access }) =>
    answer(invitationListSchema, { invitations: await loadInvitations(access) }),
  )
}

export function POST(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'manage' }, async ({ access }) => {
    const wanted = await readJson(request, newInvitationSchema)
    await takeInvitationAttempt(request, access)
    const invitation = await database()
      .transaction()
      .execute(async (trx) => {
        const made = await insertInvitation(trx, access, wanted)
        // Everyone in the project reads its history, but only owners see addresses.
        await insertAuditEvent(trx, access, { action: 'invitation.create', subject: `as ${aRole(made.role)}` })
        return made
      })
    return answer(invitationSchema, invitation, 201)
  })
}

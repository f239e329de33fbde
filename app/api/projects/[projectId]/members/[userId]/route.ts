import { database } from '@/db'
import { insertAuditEvent } from '@/db/queries/audit'
import { deleteMembership, updateRole } from '@/db/queries/memberships'
import { membershipSchema, roleChangeSchema } from '@/lib/schemas/people'
import { aRole } from '@/lib/schemas/rights'
import { answer, answerNothing, readJson, respondInProject, type RouteContext } from '@/lib/server/respond'

type Context = RouteContext<'projectId' | 'userId'>

export function PATCH(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'manage' }, async ({ access, params }) => {
    const change = await readJson(request, roleChangeSchema)
    const member = await database()
      .transaction()
      .execute(async (trx) => {
        const changed = await updateRole(trx, access, { userId: params.userId, ...change })
        const subject = `${changed.displayName}, from ${change.from} to ${change.role}`
        await insertAuditEvent(trx, access, { action: 'member.change', subject })
        return changed
      })
    return answer(membershipSchema, member)
  })
}

/** Everyone may leave; deleteMembership asks for the right to remove others. */
export function DELETE(request: Request, context: Context) {
  return respondInProject({ request, context, right: 'read' }, async ({ access, params, user }) => {
    await database()
      .transaction()
      .execute(async (trx) => {
        const { displayName, role } = await deleteMembership(trx, access, params.userId)
        await insertAuditEvent(
          trx,
          access,
          params.userId === user.id
            ? { action: 'member.leave', subject: aRole(role) }
            : { action: 'member.remove', subject: `${displayName}, ${aRole(role)}` },
        )
      })
    return answerNothing()
  })
}

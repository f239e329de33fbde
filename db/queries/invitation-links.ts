import { sql, type Kysely, type Transaction } from 'kysely'
import { linkEndWords, type LinkEnd } from '@/lib/findings/invitation-words'
import { aRole, isHigherRole } from '@/lib/schemas/rights'
import type { Database } from '../schema'
import { accessProject } from './access'
import { insertAuditEvent } from './audit'
import { findMembership, lockPeople } from './memberships'
import { Refusal } from './refusal'

function linkedInvitations(db: Kysely<Database>) {
  return db
    .selectFrom('invitations')
    .innerJoin('projects', 'projects.id', 'invitations.projectId')
    .innerJoin('users as inviters', 'inviters.id', 'invitations.invitedBy')
    .select((eb) => [
      'invitations.id',
      'invitations.projectId',
      'projects.name as projectName',
      'invitations.email',
      'invitations.role',
      'inviters.displayName as invitedBy',
      'invitations.expiresAt',
      'invitations.acceptedAt',
      'invitations.acceptedBy',
      'invitations.revokedAt',
      'projects.archivedAt',
      sql<boolean>`invitations.expires_at <= now()`.as('isExpired'),
      eb
        .exists(
          eb
            .selectFrom('users')
            .select('users.id')
            .where(sql<string>`lower(users.email)`, '=', sql<string>`lower(invitations.email)`),
        )
        .as('hasAccount'),
    ])
}

type LinkedInvitation = Awaited<ReturnType<ReturnType<typeof linkedInvitations>['execute']>>[number]

export interface InvitationLink {
  /** Null: it can be followed. */
  end: LinkEnd | null
  /** Null where it, or its project, is gone. */
  invitation: LinkedInvitation | null
}

function endOf(invitation: LinkedInvitation, isReplaced: boolean): LinkEnd | null {
  if (invitation.acceptedAt) return 'used'
  if (invitation.revokedAt) return 'revoked'
  if (isReplaced) return 'replaced'
  if (invitation.isExpired) return 'expired'
  return invitation.archivedAt ? 'archived' : null
}

/** What the link with this token stands for; changes nothing. */
export async function findInvitationLink(db: Kysely<Database>, tokenSha256: string): Promise<InvitationLink> {
  const present = await linkedInvitations(db).where('invitations.tokenSha256', '=', tokenSha256).executeTakeFirst()
  if (present) return { end: endOf(present, false), invitation: present }
  const past = await db
    .selectFrom('pastInvitationLinks')
    .select('invitationId')
    .where('tokenSha256', '=', tokenSha256)
    .executeTakeFirst()
  if (!past) return { end: 'unknown', invitation: null }
  const invitation = await linkedInvitations(db).where('invitations.id', '=', past.invitationId).executeTakeFirst()
  return invitation ? { end: endOf(invitation, true), invitation } : { end: 'deleted', invitation: null }
}

/** @throws {Refusal} 'link-ended', 'archived', or 'unknown' for what was never a link of ours */
export function openInvitation({ end, invitation }: InvitationLink): LinkedInvitation {
  if (end === null && invitation) return invitation
  const { title, remedy } = linkEndWords(end ?? 'unknown', invitation)
  const kind = end === 'archived' || end === 'unknown' ? end : 'link-ended'
  throw new Refusal({ kind }, `${title}. ${remedy}`)
}

/** The invitation, which nobody else can use, replace or revoke until the transaction ends. */
export async function lockInvitation(trx: Transaction<Database>, tokenSha256: string): Promise<LinkedInvitation> {
  const { projectId } = openInvitation(await findInvitationLink(trx, tokenSha256))
  await lockPeople(trx, projectId)
  await trx.selectFrom('invitations').select('id').where('tokenSha256', '=', tokenSha256).forUpdate().execute()
  return openInvitation(await findInvitationLink(trx, tokenSha256))
}

/**
 * Uses up a locked invitation. Whoever is a member already gets the higher one of both roles; an invitation that would not
 * raise it stays for the person it was meant for.
 *
 * @throws {Refusal} 'already-member'
 */
export async function acceptInvitation(trx: Transaction<Database>, invitation: LinkedInvitation, userId: string) {
  const { id, projectId, role, invitedBy, projectName } = invitation
  const member = await findMembership(trx, { projectId, userId })
  if (member && !isHigherRole(role, member.role)) {
    const message = `You are in “${projectName}” already, as ${member.role}; this invitation would not change that.`
    throw new Refusal({ kind: 'already-member' }, message)
  }
  await trx
    .insertInto('memberships')
    .values({ projectId, userId, role })
    .onConflict((conflict) => conflict.columns(['projectId', 'userId']).doUpdateSet({ role }))
    .execute()
  await trx
    .updateTable('invitations')
    .set({ acceptedAt: sql<Date>`now()`, acceptedBy: userId })
    .where('id', '=', id)
    .execute()
  const access = await accessProject(trx, { userId, projectId, right: 'read' })
  await insertAuditEvent(trx, access, {
    action: member ? 'member.raise' : 'member.join',
    subject: `as ${aRole(role)}, invited by ${invitedBy}`,
  })
  return { projectId, role }
}

import 'server-only'
import { database } from '@/db'
import { hasRight, type ProjectAccess } from '@/db/queries/access'
import { findInvitationLink } from '@/db/queries/invitation-links'
import { listInvitations } from '@/db/queries/invitations'
import { findMembership } from '@/db/queries/memberships'
import { sha256Of } from '@/db/tokens'
import { invitationLinkSchema, invitationListSchema, type InvitationLink } from '@/lib/schemas/people'
import { plain } from './plain'

export async function loadInvitations(access: ProjectAccess<'manage'>) {
  return plain(invitationListSchema.shape.invitations, await listInvitations(database(), access))
}

/** For a page that may be looked at by any member: the invitations hold addresses, which only owners see. */
export function isManaging(access: ProjectAccess): access is ProjectAccess<'manage'> {
  return hasRight(access, 'manage')
}

/** What the link with this token stands for, to this visitor; changes nothing. */
export async function loadInvitationLink(token: string, userId: string | null): Promise<InvitationLink> {
  const link = await findInvitationLink(database(), sha256Of(token))
  const projectId = link.invitation?.projectId
  const member = projectId && userId ? await findMembership(database(), { projectId, userId }) : undefined
  return plain(invitationLinkSchema, { ...link, memberRole: member?.role ?? null })
}

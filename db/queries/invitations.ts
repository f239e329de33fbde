import { sql, type Kysely, type Transaction } from 'kysely'
import type { Role } from '@/lib/schemas/api'
import type { Invitation } from '@/lib/schemas/people'
import type { Database } from '../schema'
import { accessProject, type ProjectAccess } from './access'
import { enqueueMail } from './mail-jobs'
import { findMemberByEmail, lockPeople } from './memberships'
import { Refusal } from './refusal'

const inTwoWeeks = sql<Date>`now() + interval '14 days'`

/** Whoever joined or was turned away is no longer listed; what has expired is, since it can be sent again. */
function pendingInvitations(db: Kysely<Database>, access: ProjectAccess<'manage'>) {
  return db
    .selectFrom('invitations')
    .innerJoin('users', 'users.id', 'invitations.invitedBy')
    .select([
      'invitations.id',
      'invitations.email',
      'invitations.role',
      'users.displayName as invitedBy',
      'invitations.createdAt',
      'invitations.expiresAt',
      sql<boolean>`invitations.expires_at <= now()`.as('isExpired'),
      sql<Invitation['mail']>`case when invitations.sent_at is not null then 'sent'
        when invitations.send_fault is not null then 'failing' else 'on-its-way' end`.as('mail'),
      'invitations.sentAt',
      'invitations.sendFault as mailFault',
    ])
    .where('invitations.projectId', '=', access.projectId)
    .where('invitations.acceptedAt', 'is', null)
    .where('invitations.revokedAt', 'is', null)
}

export function listInvitations(db: Kysely<Database>, access: ProjectAccess<'manage'>) {
  return pendingInvitations(db, access)
    .orderBy('invitations.createdAt', 'desc')
    .orderBy('invitations.id', 'desc')
    .execute()
}

async function findInvitation(db: Kysely<Database>, access: ProjectAccess<'manage'>, invitationId: string) {
  const row = await pendingInvitations(db, access).where('invitations.id', '=', invitationId).executeTakeFirst()
  if (row) return row
  throw new Refusal({ kind: 'unknown' }, 'This invitation no longer waits: it was accepted or taken back')
}

/** Whoever is an owner no more once it is their turn invites nobody, least of all another owner. */
async function lockAsOwner(trx: Transaction<Database>, { projectId, userId }: ProjectAccess<'manage'>) {
  const project = await lockPeople(trx, projectId)
  await accessProject(trx, { userId, projectId, right: 'manage' })
  return project
}

async function assertInUse(trx: Transaction<Database>, access: ProjectAccess<'manage'>): Promise<void> {
  const project = await lockAsOwner(trx, access)
  if (!project?.archivedAt) return
  throw new Refusal({ kind: 'archived' }, 'This project is archived: open it again before you invite anyone')
}

async function assertNoMember(trx: Transaction<Database>, access: ProjectAccess, email: string): Promise<void> {
  const member = await findMemberByEmail(trx, access.projectId, email)
  if (!member) return
  const message =
    member.userId === access.userId
      ? 'This is your own address, and you are here already'
      : `${member.displayName} has this address and is here already, as ${member.role}. You can change the role in the list.`
  throw new Refusal({ kind: 'already-member' }, message)
}

export interface NewInvitation {
  email: string
  role: Role
}

/** @throws {Refusal} 'already-member', 'already-invited' (one that has expired is made anew instead), 'archived' */
export async function insertInvitation(
  trx: Transaction<Database>,
  access: ProjectAccess<'manage'>,
  { email, role }: NewInvitation,
) {
  await assertInUse(trx, access)
  await assertNoMember(trx, access, email)
  const earlier = await pendingInvitations(trx, access)
    .where(sql<string>`lower(invitations.email)`, '=', email.toLowerCase())
    .executeTakeFirst()
  if (earlier && !earlier.isExpired) {
    const message = `${earlier.email} was invited already, as ${earlier.role}. You can send that mail again.`
    throw new Refusal({ kind: 'already-invited', current: earlier }, message)
  }
  const fields = { email, role, invitedBy: access.userId, expiresAt: inTwoWeeks }
  const { id } = earlier
    ? await trx
        .updateTable('invitations')
        .set({ ...fields, createdAt: sql<Date>`now()`, sentAt: null, sendFault: null, tokenSha256: null })
        .where('id', '=', earlier.id)
        .returning('id')
        .executeTakeFirstOrThrow()
    : await trx
        .insertInto('invitations')
        .values({ ...fields, projectId: access.projectId })
        .returning('id')
        .executeTakeFirstOrThrow()
  await enqueueMail(trx, { kind: 'invitation', invitationId: id })
  return findInvitation(trx, access, id)
}

/** Sends it once more, for two weeks from now; the link of the mail before works until the new one is written. */
export async function resendInvitation(
  trx: Transaction<Database>,
  access: ProjectAccess<'manage'>,
  invitationId: string,
) {
  await assertInUse(trx, access)
  const { email } = await findInvitation(trx, access, invitationId)
  await assertNoMember(trx, access, email)
  await trx
    .updateTable('invitations')
    .set({ expiresAt: inTwoWeeks, sentAt: null, sendFault: null })
    .where('id', '=', invitationId)
    .execute()
  await enqueueMail(trx, { kind: 'invitation', invitationId })
  return findInvitation(trx, access, invitationId)
}

export async function revokeInvitation(
  trx: Transaction<Database>,
  access: ProjectAccess<'manage'>,
  invitationId: string,
) {
  await lockAsOwner(trx, access)
  const invitation = await findInvitation(trx, access, invitationId)
  await trx
    .updateTable('invitations')
    .set({ revokedAt: sql<Date>`now()`, revokedBy: access.userId })
    .where('id', '=', invitationId)
    .execute()
  return invitation
}

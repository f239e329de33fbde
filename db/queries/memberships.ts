import { sql, type Kysely, type Transaction } from 'kysely'
import type { Role } from '@/lib/schemas/api'
import type { Database } from '../schema'
import { accessProject, type ProjectAccess, type Right } from './access'
import { Refusal, unknownThing } from './refusal'

/**
 * Lets changes of a project's people happen one after another until the transaction ends; without it two owners could take
 * each other's role at once and leave the project without one. Comes before every other lock.
 *
 * @returns undefined when there is no such project
 */
export function lockPeople(trx: Transaction<Database>, projectId: string) {
  return trx
    .selectFrom('projects')
    .select(['name', 'archivedAt'])
    .where('id', '=', projectId)
    .forNoKeyUpdate()
    .executeTakeFirst()
}

export function findMembership(db: Kysely<Database>, { projectId, userId }: { projectId: string; userId: string }) {
  return db
    .selectFrom('memberships')
    .innerJoin('users', 'users.id', 'memberships.userId')
    .select(['users.id as userId', 'users.displayName', 'memberships.role', 'memberships.joinedAt'])
    .where('memberships.projectId', '=', projectId)
    .where('memberships.userId', '=', userId)
    .executeTakeFirst()
}

/** Call it within lockPeople. @throws {Refusal} 'last-owner' when nobody else owns the project */
async function assertAnotherOwner(trx: Transaction<Database>, projectId: string, userId: string): Promise<void> {
  const other = await trx
    .selectFrom('memberships')
    .select('userId')
    .where('projectId', '=', projectId)
    .where('userId', '<>', userId)
    .where('role', '=', 'owner')
    .limit(1)
    .executeTakeFirst()
  if (other) return
  throw new Refusal(
    { kind: 'last-owner' },
    'A project needs an owner, and this is the only one. Make somebody else an owner first.',
  )
}

/** The member, once nobody else can change the project's people; the asker's own right may have gone while we waited. */
async function lockMember(
  trx: Transaction<Database>,
  { projectId, userId: askerId }: ProjectAccess,
  { userId, right }: { userId: string; right: Right },
) {
  await lockPeople(trx, projectId)
  await accessProject(trx, { userId: askerId, projectId, right })
  const member = await findMembership(trx, { projectId, userId })
  if (!member) throw unknownThing('member')
  return member
}

export async function updateRole(
  trx: Transaction<Database>,
  access: ProjectAccess<'manage'>,
  { userId, from, role }: { userId: string; from: Role; role: Role },
) {
  const member = await lockMember(trx, access, { userId, right: 'manage' })
  if (member.role !== from) {
    throw new Refusal(
      { kind: 'changed', change: null, current: member },
      `${member.displayName} is ${member.role} by now, not ${from}: somebody else changed that meanwhile. Nothing was changed; look again before you decide.`,
    )
  }
  if (from === 'owner' && role !== 'owner') await assertAnotherOwner(trx, access.projectId, userId)
  await trx
    .updateTable('memberships')
    .set({ role })
    .where('projectId', '=', access.projectId)
    .where('userId', '=', userId)
    .execute()
  return { ...member, role }
}

/** Removes somebody else, which only an owner may, or oneself. What the person made stays. */
export async function deleteMembership(trx: Transaction<Database>, access: ProjectAccess, userId: string) {
  const member = await lockMember(trx, access, { userId, right: userId === access.userId ? 'read' : 'manage' })
  if (member.role === 'owner') await assertAnotherOwner(trx, access.projectId, userId)
  await trx.deleteFrom('memberships').where('projectId', '=', access.projectId).where('userId', '=', userId).execute()
  return member
}

/** Whether a member signs in with this address, in whatever case. */
export function findMemberByEmail(db: Kysely<Database>, projectId: string, email: string) {
  return db
    .selectFrom('memberships')
    .innerJoin('users', 'users.id', 'memberships.userId')
    .select(['users.id as userId', 'users.displayName', 'memberships.role'])
    .where('memberships.projectId', '=', projectId)
    .where(sql<string>`lower(users.email)`, '=', email.toLowerCase())
    .executeTakeFirst()
}

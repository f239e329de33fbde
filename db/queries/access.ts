import type { Kysely } from 'kysely'
import type { Role } from '@/lib/schemas/api'
import { RIGHTS, type Right } from '@/lib/schemas/rights'
import type { Database } from '../schema'
import { Refusal, unknownThing } from './refusal'

export type { Right } from '@/lib/schemas/rights'

declare const granted: unique symbol

/**
 * Proof that this person was found to have this right in this project. Only accessProject makes one, and every query
 * below a project asks for one, so no query can be reached without the check.
 */
export interface ProjectAccess<R extends Right = Right> {
  readonly projectId: string
  readonly userId: string
  readonly role: Role
  readonly [granted]: R
}

export interface AccessRequest<R extends Right> {
  userId: string
  projectId: string
  right: R
}

/**
 * @throws {Refusal} 'unknown' to everyone who is no member, 'forbidden' to a member without the right, 'archived' to whoever
 *   may edit but not in a project that is put away
 */
export async function accessProject<R extends Right>(
  db: Kysely<Database>,
  { userId, projectId, right }: AccessRequest<R>,
): Promise<ProjectAccess<R>> {
  const membership = await db
    .selectFrom('memberships')
    .innerJoin('projects', 'projects.id', 'memberships.projectId')
    .select(['role', 'archivedAt'])
    .where('projectId', '=', projectId)
    .where('userId', '=', userId)
    .executeTakeFirst()
  if (!membership) throw unknownThing('project')
  const { role, archivedAt } = membership
  if (!RIGHTS[role][right]) {
    throw new Refusal({ kind: 'forbidden' }, `As ${role} of this project you may look but not do this`)
  }
  if (archivedAt && right === 'edit') {
    throw new Refusal(
      { kind: 'archived' },
      'This project is archived: nothing in it can be changed until an owner opens it again',
    )
  }
  return { projectId, userId, role } as ProjectAccess<R>
}

export function hasRight(access: ProjectAccess, right: Right): boolean {
  return RIGHTS[access.role][right]
}

import { sql, type Kysely, type Transaction } from 'kysely'
import type { Deletion } from '@/lib/schemas/accounts'
import type { Database } from '../schema'
import { deleteEmailTokens } from './email-tokens'
import { deleteSessions } from './sessions'
import { deleteSignUpsOf } from './sign-ups'

const FORMER_MEMBER = 'Former member'

const countIn = (table: 'runs' | 'analyses' | 'corrections') =>
  sql<number>`(select count(*)::int from ${sql.table(table)} where project_id = projects.id)`

const existsOther = (userId: string, role: 'owner' | null) => sql<boolean>`exists (
  select from memberships as others
  where others.project_id = projects.id and others.user_id <> ${userId} ${role ? sql`and others.role = ${role}` : sql``})`

/** What deleting this account would take along, what would go on without it, and what is in the way. */
export async function planDeletion(db: Kysely<Database>, userId: string): Promise<Deletion> {
  const projects = await db
    .selectFrom('memberships')
    .innerJoin('projects', 'projects.id', 'memberships.projectId')
    .where('memberships.userId', '=', userId)
    .select([
      'projects.id',
      'projects.name',
      'memberships.role',
      countIn('runs').as('runCount'),
      countIn('analyses').as('analysisCount'),
      countIn('corrections').as('correctionCount'),
      existsOther(userId, null).as('hasOthers'),
      existsOther(userId, 'owner').as('hasOtherOwner'),
    ])
    .orderBy('projects.name')
    .orderBy('projects.id')
    .execute()
  const shared = projects.filter(({ hasOthers }) => hasOthers)
  const isBlocking = ({ role, hasOtherOwner }: (typeof projects)[number]) => role === 'owner' && !hasOtherOwner
  return {
    blocking: shared.filter(isBlocking),
    lost: projects.filter(({ hasOthers }) => !hasOthers),
    left: shared.filter((project) => !isBlocking(project)),
  }
}

/**
 * Empties an account: projects of which it is the only member go, its name is taken off what it made elsewhere, and nothing
 * opens it any more. Changes of people in its projects wait until the transaction ends. The account is locked already, so that it
 * joins nothing meanwhile (`lockUser`).
 *
 * @returns what was in the way, in which case nothing was changed
 */
export async function deleteAccount(
  trx: Transaction<Database>,
  user: { id: string; email: string },
): Promise<Deletion['blocking']> {
  await trx
    .selectFrom('projects')
    .select('id')
    .where('id', 'in', (eb) => eb.selectFrom('memberships').select('projectId').where('userId', '=', user.id))
    .orderBy('id')
    .forNoKeyUpdate()
    .execute()
  const { blocking, lost } = await planDeletion(trx, user.id)
  if (blocking.length > 0) return blocking

  if (lost.length > 0) {
    const ids = lost.map(({ id }) => id)
    await trx.deleteFrom('projects').where('id', 'in', ids).execute()
  }
  await trx.deleteFrom('memberships').where('userId', '=', user.id).execute()
  await trx
    .updateTable('invitations')
    .set({ revokedAt: sql<Date>`now()`, revokedBy: user.id })
    .where('invitedBy', '=', user.id)
    .where('acceptedAt', 'is', null)
    .where('revokedAt', 'is', null)
    .execute()
  await deleteSessions(trx, { userId: user.id, keep: null })
  await deleteEmailTokens(trx, user.id)
  await deleteSignUpsOf(trx, user.email)
  // The log of projects keeps the name as it was written; what concerned the account alone holds its address.
  await trx.deleteFrom('auditEvents').where('actorId', '=', user.id).where('projectId', 'is', null).execute()
  await trx
    .updateTable('users')
    .set({
      displayName: FORMER_MEMBER,
      email: null,
      emailVerifiedAt: null,
      passwordHash: null,
      deletedAt: sql<Date>`now()`,
      theme: null,
      timeZone: null,
    })
    .where('id', '=', user.id)
    .execute()
  return []
}

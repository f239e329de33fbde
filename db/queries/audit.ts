import { sql, type Kysely } from 'kysely'
import type { AuditAction } from '@/lib/findings/audit-words'
import type { Database } from '../schema'
import type { ProjectAccess } from './access'

export interface AuditEntry {
  /** `run.delete` and the like: what, then what was done to it. */
  action: AuditAction
  /** Which one, by the name that people know it by. */
  subject: string
}

/** Written in the transaction of the change it tells of. */
export async function insertAuditEvent(db: Kysely<Database>, access: ProjectAccess, entry: AuditEntry): Promise<void> {
  await insertEvent(db, { projectId: access.projectId, userId: access.userId }, entry)
}

/** For what concerns an account alone: signing up, in and out. */
export async function insertAccountEvent(db: Kysely<Database>, userId: string, entry: AuditEntry): Promise<void> {
  await insertEvent(db, { projectId: null, userId }, entry)
}

async function insertEvent(
  db: Kysely<Database>,
  { projectId, userId }: { projectId: string | null; userId: string },
  { action, subject }: AuditEntry,
): Promise<void> {
  await db
    .insertInto('auditEvents')
    .columns(['projectId', 'actorId', 'actorName', 'action', 'subject'])
    .expression((eb) =>
      eb
        .selectFrom('users')
        .where('users.id', '=', userId)
        .select([
          sql<string | null>`${projectId}::uuid`.as('projectId'),
          'users.id',
          'users.displayName',
          sql<string>`${action}`.as('action'),
          sql<string>`${subject}`.as('subject'),
        ]),
    )
    .execute()
}

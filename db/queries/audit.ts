import { sql, type Kysely } from 'kysely'
import type { Database } from '../schema'
import type { ProjectAccess } from './access'
import { decodeCursor, pageSize, toPage, type PageRequest } from './page'

export interface AuditEntry {
  /** `run.delete` and the like: what, then what was done to it. */
  action: `${string}.${string}`
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

/** Newest first. */
export async function listAuditEvents(db: Kysely<Database>, access: ProjectAccess, page: PageRequest) {
  const size = pageSize(page.limit)
  const place = page.cursor ? decodeCursor(page.cursor) : null
  let query = db
    .selectFrom('auditEvents')
    .select(['id', 'actorName', 'action', 'subject', 'at'])
    .where('projectId', '=', access.projectId)
    .orderBy('at', 'desc')
    .orderBy('id', 'desc')
    .limit(size + 1)
  if (place) query = query.where((eb) => eb(eb.refTuple('at', 'id'), '<', eb.tuple(place.at, place.id)))
  const { rows, nextCursor } = toPage(await query.execute(), size, ({ at, id }) => ({ at, id }))
  return { events: rows, nextCursor }
}

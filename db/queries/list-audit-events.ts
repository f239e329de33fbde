import { sql, type Kysely } from 'kysely'
import type { AuditQuery } from '@/lib/schemas/lists'
import type { Database } from '../schema'
import type { ProjectAccess } from './access'
import { allOf, holdsWords, withinDays } from './filters'
import { fetchPage, naturally, type Sorts } from './keyset'

const sorts: Sorts<AuditQuery['sort']> = {
  at: { expression: sql.ref('auditEvents.at'), kind: 'instant' },
  person: naturally(sql.ref('auditEvents.actorName')),
  action: naturally(sql.ref('auditEvents.action')),
  subject: naturally(sql.ref('auditEvents.subject')),
}

function matches(query: AuditQuery) {
  return allOf([
    holdsWords(query.q, [sql.ref('auditEvents.actorName'), sql.ref('auditEvents.subject')]),
    query.person === undefined ? undefined : sql`audit_events.actor_id = ${query.person}::uuid`,
    query.thing === undefined ? undefined : sql`split_part(audit_events.action, '.', 1) = ${query.thing}`,
    withinDays(sql.ref('auditEvents.at'), query),
  ])
}

/** One page of what was done in a project, and counts of all of it. */
export async function listAuditEvents(db: Kysely<Database>, access: ProjectAccess, query: AuditQuery) {
  const source = db.selectFrom('auditEvents').where('auditEvents.projectId', '=', access.projectId)
  const isMatch = matches(query)
  const rows = source
    .where(isMatch)
    .select(['auditEvents.id', 'auditEvents.actorName', 'auditEvents.action', 'auditEvents.subject', 'auditEvents.at'])
  const {
    isBefore,
    rows: events,
    ...cursors
  } = await fetchPage(rows, {
    list: 'audit-events',
    sorts,
    id: sql.ref('auditEvents.id'),
    query,
  })
  const counts = await source
    .select([
      sql<number>`count(*)::int`.as('all'),
      sql<number>`(count(*) filter (where ${isMatch}))::int`.as('total'),
      sql<number>`(count(*) filter (where ${isMatch} and ${isBefore}))::int`.as('before'),
    ])
    .executeTakeFirstOrThrow()
  return { events, ...cursors, ...counts }
}

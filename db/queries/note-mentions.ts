import type { Kysely } from 'kysely'
import type { Database } from '../schema'
import type { ProjectAccess } from './access'
import { enqueueMail } from './mail-jobs'
import { Refusal } from './refusal'

interface Mentions {
  noteId: string
  userIds: readonly string[]
}

/**
 * Keeps whom the note names now. Everybody whom the note did not name until now gets a mail, with the transaction; who
 * names themselves gets none. A name that was taken out and is put in again is a new call, with a new mail: whoever was
 * let go by mistake is told after all. Somebody who was named and has left the project since may stay named, or the note could no longer
 * be changed.
 *
 * @throws {Refusal} 'not-valid' where somebody is named who is no member
 */
export async function replaceMentions(
  db: Kysely<Database>,
  access: ProjectAccess<'edit'>,
  { noteId, userIds }: Mentions,
): Promise<void> {
  const named = [...new Set(userIds)]
  const before = new Set(await namedBefore(db, noteId))
  const added = named.filter((userId) => !before.has(userId))
  await assertMembers(db, access, added)
  await db
    .deleteFrom('noteMentions')
    .where('noteId', '=', noteId)
    .$if(named.length > 0, (query) => query.where('userId', 'not in', named))
    .execute()
  if (added.length === 0) return
  await db
    .insertInto('noteMentions')
    .values(added.map((userId) => ({ noteId, userId })))
    .execute()
  for (const userId of added) {
    if (userId !== access.userId) await enqueueMail(db, { kind: 'mention', noteId, userId, actorId: access.userId })
  }
}

async function namedBefore(db: Kysely<Database>, noteId: string): Promise<string[]> {
  const rows = await db.selectFrom('noteMentions').select('userId').where('noteId', '=', noteId).execute()
  return rows.map(({ userId }) => userId)
}

async function assertMembers(db: Kysely<Database>, access: ProjectAccess, userIds: string[]): Promise<void> {
  if (userIds.length === 0) return
  const members = await db
    .selectFrom('memberships')
    .select('userId')
    .where('projectId', '=', access.projectId)
    .where('userId', 'in', userIds)
    .execute()
  if (members.length === userIds.length) return
  const message = 'Somebody named here is no member of this project, or no longer. Take the name out or choose another.'
  throw new Refusal({ kind: 'not-valid', fields: { mentions: message } }, message)
}

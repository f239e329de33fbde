import { randomUUID } from 'node:crypto'
import type { createDatabase } from '@/db/create-db'
import { newToken, sha256Of } from '@/db/tokens'
import type { Role } from '@/lib/schemas/api'
import type { TestProject } from './test-project'

type Db = ReturnType<typeof createDatabase>['db']

/** An address that nobody has used yet. */
export function newAddress(): string {
  return `${randomUUID()}@example.org`
}

interface Wanted {
  email?: string
  role?: Role
}

/** An invitation by the project's owner as it stands once its mail is written, with the token that the mail carries. */
export async function insertPendingInvitation(
  db: Db,
  { id: projectId, people }: TestProject,
  { email = newAddress(), role = 'viewer' }: Wanted = {},
) {
  const token = newToken()
  const expiresAt = new Date(Date.now() + 14 * 24 * 3600 * 1000)
  const { id } = await db
    .insertInto('invitations')
    .values({
      projectId,
      email,
      role,
      tokenSha256: sha256Of(token),
      invitedBy: people.owner.id,
      expiresAt,
      sentAt: new Date(),
    })
    .returning('id')
    .executeTakeFirstOrThrow()
  return { id, email, role, token }
}

/** What the mail worker does when it writes the mail: a fresh token, whose hash takes the place of the one before. */
export async function writeMail(db: Db, invitationId: string): Promise<string> {
  const token = newToken()
  await db
    .updateTable('invitations')
    .set({ tokenSha256: sha256Of(token), sentAt: new Date(), sendFault: null })
    .where('id', '=', invitationId)
    .execute()
  return token
}

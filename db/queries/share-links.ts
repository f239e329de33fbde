import { sql, type Kysely, type Transaction } from 'kysely'
import type { ShareLinkChange, ShareLinkFields } from '@/lib/schemas/share'
import type { Database } from '../schema'
import { newToken } from '../tokens'
import type { ProjectAccess } from './access'
import { findAnalysis } from './analyses'
import { Refusal, unknownThing } from './refusal'

function linksOf(db: Kysely<Database>, access: ProjectAccess<'edit' | 'unshare'>) {
  return db
    .selectFrom('shareLinks')
    .innerJoin('users', 'users.id', 'shareLinks.createdBy')
    .where('shareLinks.projectId', '=', access.projectId)
    .select([
      'shareLinks.id',
      'shareLinks.version',
      'shareLinks.analysisId',
      'shareLinks.token',
      'shareLinks.preface',
      'shareLinks.createdAt',
      'users.displayName as createdBy',
      'shareLinks.expiresAt',
      'shareLinks.revokedAt',
      'shareLinks.openedCount',
      'shareLinks.lastOpenedAt',
      // As an array: json_agg would name the column as the database does.
      sql<string[]>`array(
        select note_id from share_link_notes where share_link_id = share_links.id order by note_id
      )`.as('noteIds'),
    ])
}

/** Newest first, ended ones too. */
export async function listShareLinks(db: Kysely<Database>, access: ProjectAccess<'unshare'>, analysisId: string) {
  await findAnalysis(db, access, analysisId)
  return linksOf(db, access)
    .where('shareLinks.analysisId', '=', analysisId)
    .orderBy('shareLinks.createdAt', 'desc')
    .orderBy('shareLinks.id')
    .execute()
}

async function findShareLink(db: Kysely<Database>, access: ProjectAccess<'edit' | 'unshare'>, linkId: string) {
  const row = await linksOf(db, access).where('shareLinks.id', '=', linkId).executeTakeFirst()
  if (!row) throw unknownThing('share link')
  return row
}

export async function insertShareLink(
  trx: Transaction<Database>,
  access: ProjectAccess<'edit'>,
  { analysisId, fields }: { analysisId: string; fields: ShareLinkFields },
) {
  const { name } = await findAnalysis(trx, access, analysisId)
  const { id } = await trx
    .insertInto('shareLinks')
    .values({
      projectId: access.projectId,
      analysisId,
      token: newToken(),
      preface: fields.preface,
      expiresAt: fields.expiresAt === null ? null : new Date(fields.expiresAt),
      createdBy: access.userId,
    })
    .returning('id')
    .executeTakeFirstOrThrow()
  await replaceNotes(trx, { linkId: id, analysisId, noteIds: fields.noteIds })
  return { link: await findShareLink(trx, access, id), analysisName: name }
}

/** @throws {Refusal} 'changed' where it was changed from the same version meanwhile, 'link-ended' once it was revoked */
export async function updateShareLink(
  trx: Transaction<Database>,
  access: ProjectAccess<'edit'>,
  { linkId, version, preface, expiresAt, noteIds }: ShareLinkChange & { linkId: string },
) {
  const { analysisId } = await findShareLink(trx, access, linkId)
  const changed = await trx
    .updateTable('shareLinks')
    .set({
      preface,
      expiresAt: expiresAt === null ? null : new Date(expiresAt),
      version: sql<number>`version + 1`,
    })
    .where('id', '=', linkId)
    .where('version', '=', version)
    .where('revokedAt', 'is', null)
    .returning('id')
    .executeTakeFirst()
  if (!changed) throw overtaken(await findShareLink(trx, access, linkId))
  await replaceNotes(trx, { linkId, analysisId, noteIds })
  const { name } = await findAnalysis(trx, access, analysisId)
  return { link: await findShareLink(trx, access, linkId), analysisName: name }
}

function overtaken(current: Awaited<ReturnType<typeof findShareLink>>): Refusal {
  if (current.revokedAt) return new Refusal({ kind: 'link-ended' }, 'This link was revoked. Make a new one instead.')
  return new Refusal(
    { kind: 'changed', change: null, current },
    'This link was changed by somebody else meanwhile. Your version is still in the form; look at theirs before you save again.',
  )
}

/** Ends the link for good; one that was revoked before stays as it is. */
export async function revokeShareLink(trx: Transaction<Database>, access: ProjectAccess<'unshare'>, linkId: string) {
  const { analysisId } = await findShareLink(trx, access, linkId)
  const revoked = await trx
    .updateTable('shareLinks')
    .set({ revokedAt: sql<Date>`now()`, revokedBy: access.userId })
    .where('id', '=', linkId)
    .where('revokedAt', 'is', null)
    .returning('id')
    .executeTakeFirst()
  const { name } = await findAnalysis(trx, access, analysisId)
  return { analysisName: name, isChanged: revoked !== undefined }
}

interface ChosenNotes {
  linkId: string
  analysisId: string
  noteIds: readonly string[]
}

/** Only notes of the same analysis can be shown with it. */
async function replaceNotes(trx: Transaction<Database>, { linkId, analysisId, noteIds }: ChosenNotes): Promise<void> {
  const wanted = [...new Set(noteIds)]
  await trx.deleteFrom('shareLinkNotes').where('shareLinkId', '=', linkId).execute()
  if (wanted.length === 0) return
  const own = await trx
    .selectFrom('notes')
    .select('id')
    .where('analysisId', '=', analysisId)
    .where('id', 'in', wanted)
    .execute()
  if (own.length < wanted.length) {
    throw new Refusal({ kind: 'unknown' }, 'A chosen note is no longer there. Choose the notes again.')
  }
  await trx
    .insertInto('shareLinkNotes')
    .values(wanted.map((noteId) => ({ shareLinkId: linkId, noteId })))
    .execute()
}

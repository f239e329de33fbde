import { sql, type Kysely } from 'kysely'
import type { Database } from '../schema'
import { anchorOf } from './notes'
import { Refusal, unknownThing } from './refusal'

declare const opened: unique symbol

/**
 * Proof that somebody holds a link that opens this analysis. Only openShareLink makes one, and every query behind a link
 * asks for one.
 */
export interface ShareAccess {
  readonly linkId: string
  readonly analysisId: string
  readonly [opened]: true
}

const TOKEN = /^[A-Za-z0-9_-]{43}$/

/** @throws {Refusal} 'unknown' for what is no link, 'link-ended' once it has expired or was revoked */
export async function openShareLink(db: Kysely<Database>, token: string): Promise<ShareAccess> {
  const link = TOKEN.test(token)
    ? await db
        .selectFrom('shareLinks')
        .select([
          'id',
          'analysisId',
          sql<boolean>`revoked_at is not null or coalesce(expires_at <= now(), false)`.as('isEnded'),
        ])
        .where('token', '=', token)
        .executeTakeFirst()
    : undefined
  if (!link) throw unknownThing('report')
  if (link.isEnded) {
    throw new Refusal({ kind: 'link-ended' }, 'This link has ended. Ask whoever gave it to you for a new one.')
  }
  return { linkId: link.id, analysisId: link.analysisId } as ShareAccess
}

/** Everything that the report shows; the schema of the answer leaves out what it does not. */
export async function findSharedReport(db: Kysely<Database>, { linkId, analysisId }: ShareAccess) {
  const row = await db
    .selectFrom('shareLinks')
    .innerJoin('users', 'users.id', 'shareLinks.createdBy')
    .innerJoin('projects', 'projects.id', 'shareLinks.projectId')
    .innerJoin('analyses', 'analyses.id', 'shareLinks.analysisId')
    .innerJoin('runs', 'runs.id', 'analyses.runId')
    .select([
      'projects.name as mountName',
      'users.displayName as sharedBy',
      'shareLinks.createdAt as sharedAt',
      'shareLinks.expiresAt',
      'shareLinks.preface',
      'analyses.name',
      'analyses.createdAt as savedAt',
      'analyses.engineVersion',
      'analyses.samplesSha256',
      'analyses.recipe',
      'analyses.result',
      'runs.name as runName',
      'runs.fileSha256',
      'runs.rowCount',
      'runs.facts',
      sql<boolean>`coalesce(runs.samples_sha256 = analyses.samples_sha256, false)`.as('hasSameSamples'),
    ])
    .where('shareLinks.id', '=', linkId)
    .executeTakeFirst()
  if (!row) throw unknownThing('report')
  const notes = await db
    .selectFrom('shareLinkNotes')
    .innerJoin('notes', 'notes.id', 'shareLinkNotes.noteId')
    .innerJoin('users', 'users.id', 'notes.authorId')
    .select([
      'notes.anchorKind',
      'notes.anchorValue',
      'notes.text',
      sql<string>`coalesce(notes.author_name, users.display_name)`.as('authorName'),
      'notes.createdAt',
      sql<boolean>`notes.resolved_at is not null`.as('isSettled'),
    ])
    .where('shareLinkNotes.shareLinkId', '=', linkId)
    .where('notes.analysisId', '=', analysisId)
    .orderBy('notes.createdAt')
    .orderBy('notes.id')
    .execute()
  const { mountName, sharedBy, sharedAt, expiresAt, preface, runName, fileSha256, rowCount, facts, ...rest } = row
  const { hasSameSamples, ...analysis } = rest
  return {
    mountName,
    sharedBy,
    sharedAt,
    expiresAt,
    preface,
    subject: {
      kind: 'analysis' as const,
      ...analysis,
      run: { name: runName, fileSha256, rowCount, facts, hasSameSamples },
      notes: notes.map(({ anchorKind, anchorValue, ...note }) => ({
        ...note,
        anchor: anchorOf(anchorKind, anchorValue),
      })),
    },
  }
}

/** The packed columns, while they are still those that the analysis was made from. */
export async function findSharedColumns(db: Kysely<Database>, { analysisId }: ShareAccess) {
  const row = await db
    .selectFrom('analyses')
    .innerJoin('runs', 'runs.id', 'analyses.runId')
    .innerJoin('runColumns', 'runColumns.runId', 'runs.id')
    .select(['runColumns.bytes', 'runColumns.encoding'])
    .where('analyses.id', '=', analysisId)
    .whereRef('runs.samplesSha256', '=', 'analyses.samplesSha256')
    .executeTakeFirst()
  if (!row) throw unknownThing('recording behind this report')
  return row
}

export async function countOpening(db: Kysely<Database>, { linkId }: ShareAccess): Promise<void> {
  await db
    .updateTable('shareLinks')
    .set({ openedCount: sql<number>`opened_count + 1`, lastOpenedAt: sql<Date>`now()` })
    .where('id', '=', linkId)
    .execute()
}

import { sql, type Kysely } from 'kysely'
import type { z } from 'zod'
import type { newNoteSchema, Note } from '@/lib/schemas/api'
import type { Database } from '../schema'
import { hasRight, type ProjectAccess } from './access'
import { findAnalysis } from './analyses'
import { changedMeanwhile } from './changed-meanwhile'
import { replaceMentions } from './note-mentions'
import { Refusal, unknownThing } from './refusal'

type NewNote = z.output<typeof newNoteSchema>
type Anchor = NewNote['anchor']

export function anchorColumns(anchor: Anchor) {
  switch (anchor.kind) {
    case 'whole':
      return { anchorKind: anchor.kind, anchorValue: null }
    case 'time':
      return { anchorKind: anchor.kind, anchorValue: anchor.timeSeconds }
    case 'period':
      return { anchorKind: anchor.kind, anchorValue: anchor.periodSeconds }
    case 'worm-angle':
      return { anchorKind: anchor.kind, anchorValue: anchor.angleDegrees }
  }
}

export function anchorOf(kind: Anchor['kind'], value: number | null): Anchor {
  if (kind === 'whole' || value === null) return { kind: 'whole' }
  if (kind === 'time') return { kind, timeSeconds: value }
  return kind === 'period' ? { kind, periodSeconds: value } : { kind, angleDegrees: value }
}

function notesOf(db: Kysely<Database>, access: ProjectAccess) {
  return db
    .selectFrom('notes')
    .innerJoin('analyses', 'analyses.id', 'notes.analysisId')
    .innerJoin('users', 'users.id', 'notes.authorId')
    .innerJoin('users as updaters', 'updaters.id', 'notes.updatedBy')
    .leftJoin('users as resolvers', 'resolvers.id', 'notes.resolvedBy')
    .where('analyses.projectId', '=', access.projectId)
    .select((eb) => [
      'notes.id',
      'notes.version',
      'notes.analysisId',
      'notes.anchorKind',
      'notes.anchorValue',
      'notes.text',
      'notes.authorId',
      sql<string>`coalesce(notes.author_name, users.display_name)`.as('authorName'),
      'notes.createdAt',
      'notes.updatedAt',
      sql<string>`coalesce(notes.updated_by_name, updaters.display_name)`.as('updatedByName'),
      'notes.resolvedAt',
      sql<string | null>`coalesce(notes.resolved_by_name, resolvers.display_name)`.as('resolvedByName'),
      eb
        .selectFrom('noteMentions')
        .innerJoin('users as named', 'named.id', 'noteMentions.userId')
        .whereRef('noteMentions.noteId', '=', 'notes.id')
        // Keys within JSON are not translated to ours, so they are named here.
        .select(
          sql<Note['mentions']>`coalesce(
            json_agg(json_build_object('userId', named.id, 'displayName', named.display_name)
              order by named.display_name, named.id), '[]')`.as('mentions'),
        )
        .$asScalar()
        .$notNull()
        .as('mentions'),
    ])
}

type NoteRow = Awaited<ReturnType<ReturnType<typeof notesOf>['execute']>>[number]

function withAnchor({ anchorKind, anchorValue, ...note }: NoteRow) {
  return { ...note, anchor: anchorOf(anchorKind, anchorValue) }
}

/** Oldest first, as they were written. */
export async function listNotes(db: Kysely<Database>, access: ProjectAccess, analysisId: string) {
  await findAnalysis(db, access, analysisId)
  const rows = await notesOf(db, access)
    .where('notes.analysisId', '=', analysisId)
    .orderBy('notes.createdAt')
    .orderBy('notes.id')
    .execute()
  return rows.map(withAnchor)
}

export async function findNote(db: Kysely<Database>, access: ProjectAccess, noteId: string) {
  const row = await notesOf(db, access).where('notes.id', '=', noteId).executeTakeFirst()
  if (!row) throw unknownThing('note')
  return withAnchor(row)
}

export async function insertNote(
  db: Kysely<Database>,
  access: ProjectAccess<'edit'>,
  { analysisId, note }: { analysisId: string; note: NewNote },
) {
  await findAnalysis(db, access, analysisId)
  const { userId } = access
  const { id } = await db
    .insertInto('notes')
    .values({ analysisId, text: note.text, ...anchorColumns(note.anchor), authorId: userId, updatedBy: userId })
    .returning('id')
    .executeTakeFirstOrThrow()
  await replaceMentions(db, access, { noteId: id, userIds: note.mentions })
  return findNote(db, access, id)
}

/** Its author, or who manages the project. */
async function findChangeableNote(db: Kysely<Database>, access: ProjectAccess<'edit'>, noteId: string) {
  const note = await findNote(db, access, noteId)
  if (note.authorId === access.userId || hasRight(access, 'manage')) return note
  throw new Refusal({ kind: 'forbidden' }, `This note is ${note.authorName}’s; only they or an owner may change it`)
}

export interface NoteChange {
  noteId: string
  version: number
  note: NewNote
}

export async function updateNote(
  db: Kysely<Database>,
  access: ProjectAccess<'edit'>,
  { noteId, version, note }: NoteChange,
) {
  await findChangeableNote(db, access, noteId)
  const updated = await db
    .updateTable('notes')
    .set({
      text: note.text,
      ...anchorColumns(note.anchor),
      version: sql<number>`version + 1`,
      updatedAt: sql<Date>`now()`,
      updatedBy: access.userId,
    })
    .where('id', '=', noteId)
    .where('version', '=', version)
    .returning('id')
    .executeTakeFirst()
  if (updated) await replaceMentions(db, access, { noteId, userIds: note.mentions })
  const current = await findNote(db, access, noteId)
  if (updated) return current
  throw await changedMeanwhile(db, { table: 'notes', id: noteId, what: 'note', current })
}

export interface NoteResolution {
  noteId: string
  version: number
  isResolved: boolean
}

/**
 * Settles a note or takes it up again; only from the text that the person has read. The version stays as it is: whoever
 * is changing the text meanwhile loses nothing by it. `isChanged` is false where it was so already.
 */
export async function resolveNote(
  db: Kysely<Database>,
  access: ProjectAccess<'edit'>,
  { noteId, version, isResolved }: NoteResolution,
) {
  await findNote(db, access, noteId)
  const { numUpdatedRows } = await db
    .updateTable('notes')
    .set(
      isResolved ? { resolvedAt: sql<Date>`now()`, resolvedBy: access.userId } : { resolvedAt: null, resolvedBy: null },
    )
    .where('id', '=', noteId)
    .where('version', '=', version)
    .where('resolvedAt', isResolved ? 'is' : 'is not', null)
    .executeTakeFirstOrThrow()
  const note = await findNote(db, access, noteId)
  if (note.version === version) return { note, isChanged: numUpdatedRows > 0 }
  throw await changedMeanwhile(db, { table: 'notes', id: noteId, what: 'note', current: note })
}

export async function deleteNote(db: Kysely<Database>, access: ProjectAccess<'edit'>, noteId: string) {
  const note = await findChangeableNote(db, access, noteId)
  await db.deleteFrom('notes').where('id', '=', noteId).execute()
  return note
}

import type { NamedPerson } from '@/lib/findings/mention-text'
import type { Note } from '@/lib/schemas/api'
import { formatDuration, formatNumber, formatPeriod } from '@/lib/units'

export type NoteAnchor = Note['anchor']

/** What a person makes of a note: its place, its text, and whom it names. */
export interface WrittenNote {
  anchor: NoteAnchor
  text: string
  mentions: string[]
}

export interface NoteActions {
  onAdd?: (written: WrittenNote) => void | Promise<void>
  /** From this version of the note; rejects with a RequestError when it is no longer the newest. */
  onChange?: (note: Pick<Note, 'id' | 'version'>, written: WrittenNote) => void | Promise<void>
  onDelete?: (note: Note) => void | Promise<void>
  onResolve?: (note: Note, isResolved: boolean) => void | Promise<void>
  /** Whether this person may change and remove this note; everybody who may write may settle it. */
  canChange?: (note: Note) => boolean
  /** Who can be named in a note. */
  people?: readonly NamedPerson[]
  /** Every note of the analysis, once they are known: what is being changed and is not among them was deleted. */
  presentIds?: readonly string[]
  /** Which analysis drafts are kept for. */
  draftScope?: string
}

export interface NumberedNote {
  number: number
  note: Note
}

/** Notes numbered in the order they were written; those on the whole analysis have no place and no number. */
export function numberNotes(notes: readonly Note[]): NumberedNote[] {
  return notes.filter(({ anchor }) => anchor.kind !== 'whole').map((note, index) => ({ number: index + 1, note }))
}

export function anchorText(anchor: NoteAnchor): string {
  if (anchor.kind === 'time') return `at ${formatDuration(anchor.timeSeconds)}`
  if (anchor.kind === 'period') return `at ${formatPeriod(anchor.periodSeconds)}`
  if (anchor.kind === 'worm-angle') return `at ${formatNumber(anchor.angleDegrees, 0)}°`
  return 'on the whole analysis'
}

export interface NotePlace {
  label: string
  value: number
  unit: string
  min?: number
  max?: number
}

/** The place as it is typed; null for the whole analysis, which has none. */
export function placeOf(anchor: NoteAnchor): NotePlace | null {
  if (anchor.kind === 'time') {
    return { label: 'Time into the run', value: round(anchor.timeSeconds / 60, 3), unit: 'min' }
  }
  if (anchor.kind === 'period') return { label: 'Period', value: round(anchor.periodSeconds, 2), unit: 's', min: 0.01 }
  if (anchor.kind === 'worm-angle') {
    return { label: 'Worm angle', value: round(anchor.angleDegrees, 1) % 360, unit: '°', min: 0, max: 359.9 }
  }
  return null
}

export function anchorAt(anchor: NoteAnchor, value: number): NoteAnchor {
  if (anchor.kind === 'time') return { kind: 'time', timeSeconds: 60 * value }
  if (anchor.kind === 'period') return { kind: 'period', periodSeconds: value }
  if (anchor.kind === 'worm-angle') return { kind: 'worm-angle', angleDegrees: value }
  return anchor
}

function round(value: number, decimals: number): number {
  return Number(value.toFixed(decimals))
}

/** Where keyboard and screen reader find a note, and its number on a picture. */
export function noteElementId(noteId: string): string {
  return `note-${noteId}`
}

/** Puts the focus there once React has drawn what was just changed. */
export function focusSoon(elementId: string): void {
  requestAnimationFrame(() => document.getElementById(elementId)?.focus())
}

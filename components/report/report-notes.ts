import { anchorText } from '@/components/notes/note-types'
import type { SharedNote } from '@/lib/schemas/share'

export interface ReportNote {
  /** Null: on the whole analysis, with no place in a picture. */
  number: number | null
  note: SharedNote
}

/** Numbered in the order they were written, as on the bench. */
export function numberReportNotes(notes: readonly SharedNote[]): ReportNote[] {
  const placed = notes.filter(({ anchor }) => anchor.kind !== 'whole')
  return notes.map((note) => ({ number: note.anchor.kind === 'whole' ? null : placed.indexOf(note) + 1, note }))
}

/** The marks that the pictures draw. */
export function noteMarks(notes: readonly ReportNote[]) {
  const times: { number: number; timeSeconds: number; isSettled: boolean }[] = []
  const periods: { number: number; periodSeconds: number; isSettled: boolean }[] = []
  const angles: { id: string; label: string; number: number; angleDegrees: number; isSettled: boolean }[] = []
  for (const { number, note } of notes) {
    if (number === null) continue
    const { anchor, isSettled } = note
    if (anchor.kind === 'time') times.push({ number, timeSeconds: anchor.timeSeconds, isSettled })
    if (anchor.kind === 'period') periods.push({ number, periodSeconds: anchor.periodSeconds, isSettled })
    if (anchor.kind === 'worm-angle') {
      const label = `Note ${number}, ${anchorText(anchor)}`
      angles.push({ id: `note-${number}`, label, number, angleDegrees: anchor.angleDegrees, isSettled })
    }
  }
  return { times, periods, angles }
}

export type NoteMarks = ReturnType<typeof noteMarks>

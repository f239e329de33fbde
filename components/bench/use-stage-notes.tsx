'use client'

import { useMemo, useState, type ReactNode } from 'react'
import type { MarkLink } from '@/components/charts/mark-buttons'
import { useNoteLink } from '@/components/notes/note-link'
import { NoteList } from '@/components/notes/note-list'
import {
  anchorText,
  noteElementId,
  type NoteActions,
  type NoteAnchor,
  type NumberedNote,
} from '@/components/notes/note-types'
import { useNewNote } from '@/components/notes/use-new-note'
import { Button } from '@/components/ui/button'

interface StageNotesOptions {
  kind: 'time' | 'period' | 'worm-angle'
  notes: readonly NumberedNote[]
  actions: NoteActions
  /** Where a note goes that was not begun by a click. */
  startAt: NoteAnchor | null
  /** What the whole picture shows, in the anchor’s unit; null while there is none. */
  extent?: readonly [number, number] | null
}

/** A note as the pictures mark it: `value` is its place in seconds or degrees. */
export interface NoteMarkPlace {
  id: string
  number: number
  value: number
  isSettled: boolean
  label: string
}

export interface StageNotes {
  /** What the pictures mark; the same array as long as nothing in it changes. */
  marks: NoteMarkPlace[]
  link: MarkLink
  /** A place in a picture was clicked. */
  pick: ((anchor: NoteAnchor) => void) | undefined
  /** Stands below the picture after a click. */
  pickBar: ReactNode
  /** The list, and the way to a new note. */
  aside: ReactNode
}

/** The notes of one stage: their marks, their list, and a new one where a picture was clicked. */
export function useStageNotes({ kind, notes, actions, startAt, extent = null }: StageNotesOptions): StageNotes {
  const [picked, setPicked] = useState<NoteAnchor | null>(null)
  const newNote = useNewNote(kind, actions)
  const { marks, link } = useNoteMarks(notes, kind)
  const own = notes.filter(({ note }) => note.anchor.kind === kind)
  const isOutside = (value: number) => extent !== null && (value < extent[0] || value > extent[1])

  return {
    marks,
    link,
    pick: actions.onAdd ? setPicked : undefined,
    pickBar:
      actions.onAdd && picked ? (
        <PictureBar label={anchorText(picked)} onClose={() => setPicked(null)}>
          <Button
            size="small"
            onClick={() => {
              newNote.openAt(picked)
              setPicked(null)
            }}
          >
            {newNote.isOpen ? 'Move the new note here' : 'Note here'}
          </Button>
        </PictureBar>
      ) : null,
    aside: (
      <>
        <NoteList
          listId={`notes-${kind}`}
          kind={kind}
          notes={own.map((each) => ({ ...each, isOutside: isOutside(placeValue(each.note.anchor)) }))}
          actions={actions}
        />
        {startAt ? newNote.element(startAt) : null}
      </>
    ),
  }
}

/** What pictures mark of the notes of one kind, and how the marks are tied to the list. */
export function useNoteMarks(notes: readonly NumberedNote[], kind: StageNotesOptions['kind']) {
  const { activeId, setActive, areSettledMarked } = useNoteLink()
  const found = notes.flatMap(({ number, note }): NoteMarkPlace[] => {
    const isSettled = note.resolvedAt !== null
    if (note.anchor.kind !== kind || (isSettled && !areSettledMarked)) return []
    const label = `Note ${number}, ${anchorText(note.anchor)}${isSettled ? ', settled' : ''}`
    return [{ id: note.id, number, value: placeValue(note.anchor), isSettled, label }]
  })
  const key = JSON.stringify(found)
  const marks = useMemo((): NoteMarkPlace[] => JSON.parse(key), [key])
  const link: MarkLink = {
    activeId,
    onPoint: setActive,
    onFollow: (id) => {
      setActive(id)
      // A settled note is unfolded by being active; only then it is there.
      requestAnimationFrame(() => {
        const element = document.getElementById(noteElementId(id))
        element?.scrollIntoView({ block: 'nearest' })
        element?.focus({ preventScroll: true })
      })
    },
  }
  return { marks, link }
}

function placeValue(anchor: NoteAnchor): number {
  switch (anchor.kind) {
    case 'time':
      return anchor.timeSeconds
    case 'period':
      return anchor.periodSeconds
    case 'worm-angle':
      return anchor.angleDegrees
    case 'whole':
      return 0
  }
}

/** What can be done with the place or the stretch that was chosen in a picture. */
export function PictureBar({ label, children, onClose }: { label: string; children: ReactNode; onClose: () => void }) {
  return (
    <div
      role="group"
      aria-label={label}
      className="mt-2 flex flex-wrap items-center gap-2 rounded-control bg-faint px-3 py-1.5"
    >
      <span className="figures mr-1 text-sm" role="status">
        {label}
      </span>
      {children}
      <Button variant="quiet" size="small" onClick={onClose}>
        Cancel
      </Button>
    </div>
  )
}

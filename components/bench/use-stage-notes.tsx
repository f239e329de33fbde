'use client'

import { useState, type ReactNode } from 'react'
import { Button } from '@/components/ui/button'
import { AddNote, anchorText, NoteList, type NoteActions, type NoteAnchor, type NumberedNote } from './notes'

interface StageNotesOptions {
  kind: 'time' | 'period' | 'worm-angle'
  notes: readonly NumberedNote[]
  actions: NoteActions
  /** Where a note goes that was not begun by a click. */
  startAt: NoteAnchor | null
}

export interface StageNotes {
  /** Notes of this stage, with the numbers they bear in the pictures. */
  own: NumberedNote[]
  /** A place in a picture was clicked. */
  pick: ((anchor: NoteAnchor) => void) | undefined
  /** Stands below the picture after a click. */
  pickBar: ReactNode
  /** The list, and the way to a new note. */
  aside: ReactNode
}

/** The notes of one stage: their marks, their list, and a new one where a picture was clicked. */
export function useStageNotes({ kind, notes, actions, startAt }: StageNotesOptions): StageNotes {
  const [picked, setPicked] = useState<NoteAnchor | null>(null)
  const [isOpen, setOpen] = useState(false)
  const own = notes.filter(({ note }) => note.anchor.kind === kind)
  const { onAdd } = actions
  const anchor = picked ?? startAt

  function close() {
    setOpen(false)
    setPicked(null)
  }

  return {
    own,
    pick: onAdd
      ? (place) => {
          setPicked(place)
          setOpen(false)
        }
      : undefined,
    pickBar:
      onAdd && picked && !isOpen ? (
        <PictureBar label={anchorText(picked)} onClose={() => setPicked(null)}>
          <Button size="small" onClick={() => setOpen(true)}>
            Note here
          </Button>
        </PictureBar>
      ) : null,
    aside: (
      <>
        <NoteList notes={own} actions={actions} />
        {onAdd && anchor ? (
          <AddNote anchor={anchor} onAdd={onAdd} isOpen={isOpen} onOpen={() => setOpen(true)} onClose={close} />
        ) : null}
      </>
    ),
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

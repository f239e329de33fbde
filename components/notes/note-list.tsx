'use client'

import { useState } from 'react'
import { useDraftsOfGone } from '@/lib/client/note-drafts'
import type { Note } from '@/lib/schemas/api'
import { countWord } from '@/lib/findings/words'
import { NoteItem } from './note-item'
import { useNoteLink } from './note-link'
import type { NoteActions } from './note-types'
import { TextButton } from './text-button'

export interface ListedNote {
  number: number | null
  note: Note
  isOutside?: boolean
}

interface NoteListProps {
  listId: string
  kind: Note['anchor']['kind']
  notes: readonly ListedNote[]
  actions: NoteActions
}

/** Open notes, then one quiet line for those that are settled. */
export function NoteList({ listId, kind, notes, actions }: NoteListProps) {
  const [isShown, setShown] = useState(false)
  const { areSettledMarked, setSettledMarked, activeId } = useNoteLink()
  const gone = useDraftsOfGone(actions.draftScope ?? '', actions.presentIds).filter(
    ({ base }) => base?.anchor.kind === kind,
  )
  const open = notes.filter(({ note }) => note.resolvedAt === null)
  const settled = notes.filter(({ note }) => note.resolvedAt !== null)
  // A settled note that is pointed at on a picture is shown, or its mark would lead nowhere.
  const isUnfolded = isShown || settled.some(({ note }) => note.id === activeId)
  if (notes.length === 0 && gone.length === 0) return <div id={listId} tabIndex={-1} />
  const item = ({ number, note, isOutside }: ListedNote) => (
    <NoteItem key={note.id} {...{ number, note, isOutside, actions, listId }} />
  )
  return (
    <div id={listId} tabIndex={-1} className="flex flex-col gap-3">
      {open.length + gone.length > 0 ? (
        <ul aria-label="Notes" className="flex flex-col gap-3">
          {open.map(item)}
          {actions.onChange
            ? gone.map(({ base }) =>
                base ? (
                  <NoteItem key={base.id} number={null} note={base} actions={actions} listId={listId} isGone />
                ) : null,
              )
            : null}
        </ul>
      ) : null}
      {settled.length > 0 ? (
        <div className="text-sm text-soft">
          <p className="no-print flex flex-wrap items-center gap-x-3">
            <span>
              {settled.length === 1 ? 'One settled note' : `${capital(countWord(settled.length))} settled notes`}
            </span>
            <TextButton isExpanded={isUnfolded} onClick={() => setShown(!isUnfolded)}>
              {isUnfolded ? 'fold' : 'show'}
            </TextButton>
            {kind === 'whole' ? null : (
              <label className="inline-flex cursor-pointer items-center gap-1.5 pointer-coarse:min-h-11">
                <input
                  type="checkbox"
                  checked={areSettledMarked}
                  onChange={(event) => setSettledMarked(event.target.checked)}
                />
                on the pictures
              </label>
            )}
          </p>
          {isUnfolded ? (
            <ul aria-label="Settled notes" className="mt-2 flex flex-col gap-3">
              {settled.map(item)}
            </ul>
          ) : null}
        </div>
      ) : null}
    </div>
  )
}

function capital(word: string): string {
  return word.charAt(0).toUpperCase() + word.slice(1)
}

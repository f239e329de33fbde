'use client'

import { useState, type ReactNode } from 'react'
import { draftKey, keepDraft, useNoteDraft } from '@/lib/client/note-drafts'
import { NoteEditor } from './note-editor'
import { focusSoon, type NoteActions, type NoteAnchor } from './note-types'
import { TextButton } from './text-button'

interface NewNote {
  isOpen: boolean
  /** Opens the editor at this place; while it is open, moves the note that is being written there. */
  openAt: (anchor: NoteAnchor) => void
  /** “Add a note”, or the editor. */
  element: (startAt: NoteAnchor) => ReactNode
}

/** A new note pinned to one kind of place; the place can be typed, so that no pointer is needed. */
export function useNewNote(kind: NoteAnchor['kind'], actions: NoteActions): NewNote {
  const { onAdd, people = [], draftScope = '' } = actions
  const key = draftKey(draftScope, `new-${kind}`)
  const draft = useNoteDraft(key)
  const [isFresh, setFresh] = useState(false)
  const buttonId = `add-note-${kind}`

  function openAt(anchor: NoteAnchor) {
    setFresh(true)
    keepDraft(key, draft ? { ...draft, anchor } : { anchor, text: '', chosenIds: [], base: null })
  }

  return {
    isOpen: draft !== null,
    openAt,
    element: (startAt) => {
      if (!onAdd) return null
      if (!draft) {
        return (
          <p className="no-print text-sm">
            <TextButton id={buttonId} onClick={() => openAt(startAt)}>
              Add a note
            </TextButton>
          </p>
        )
      }
      return (
        <div className="border-l-3 border-plum pl-3">
          <NoteEditor
            draftKey={key}
            draft={draft}
            people={people}
            saveLabel="Add note"
            isFresh={isFresh}
            onSave={(written) => onAdd(written)}
            onClose={() => {
              setFresh(false)
              focusSoon(buttonId)
            }}
          />
        </div>
      )
    },
  }
}

'use client'

import { useId, useRef, useState } from 'react'
import { Button } from '@/components/ui/button'
import { NumberInput } from '@/components/ui/number-input'
import { dropDraft, keepDraft, type NoteDraft } from '@/lib/client/note-drafts'
import { mentionedIn, type NamedPerson } from '@/lib/findings/mention-text'
import type { Note } from '@/lib/schemas/api'
import { MentionArea } from './mention-area'
import { NoteTroubles } from './note-troubles'
import { anchorAt, placeOf, type WrittenNote } from './note-types'
import { useNoteSaving } from './use-note-saving'

interface NoteEditorProps {
  draftKey: string
  draft: NoteDraft
  people: readonly NamedPerson[]
  saveLabel: string
  /** Sends a new note (`from` null), or a change of a note made from this version of it. */
  onSave: (written: WrittenNote, from: Pick<Note, 'id' | 'version'> | null) => void | Promise<void>
  /** Whether the note that is being changed is no longer there. */
  isGone?: boolean
  /** The editor was opened by the person just now, not found open after a reload. */
  isFresh: boolean
  /** Called when the draft is done with, saved or not. */
  onClose: () => void
}

/** The text and the place of one note. All that is typed is the draft’s, so nothing is lost until the person says so. */
export function NoteEditor(props: NoteEditorProps) {
  const { draftKey, draft, people, saveLabel, onSave, isGone = false, isFresh, onClose } = props
  const { anchor, text, base } = draft
  const [isRestored, setRestored] = useState(!isFresh)
  const { save, isBusy, trouble, setTrouble } = useNoteSaving(base === null)
  const form = useRef<HTMLFormElement>(null)
  const faultId = useId()
  const placeId = useId()
  const place = placeOf(anchor)
  const candidates = withNamed(people, base)
  const shown = isGone ? ({ kind: 'deleted' } as const) : trouble

  const change = (part: Partial<NoteDraft>) => keepDraft(draftKey, { ...draft, ...part })

  function close() {
    dropDraft(draftKey)
    onClose()
  }

  async function send(from: Pick<Note, 'id' | 'version'> | null) {
    if (text.trim() === '') return setTrouble({ kind: 'fault', message: 'Write something first' })
    if (form.current?.querySelector('input:invalid')) {
      return setTrouble({ kind: 'fault', message: 'The place can’t be read. Correct it above.' })
    }
    setRestored(false)
    const mentions = mentionedIn(text, { people: candidates, chosenIds: draft.chosenIds })
    if (await save(() => onSave({ anchor, text: text.trim(), mentions }, from))) close()
  }

  return (
    <form
      ref={form}
      noValidate
      aria-label={base ? 'Change the note' : 'New note'}
      className="flex flex-col gap-2"
      onSubmit={(event) => {
        event.preventDefault()
        void send(base)
      }}
      onKeyDown={(event) => {
        if (event.key === 'Enter' && (event.ctrlKey || event.metaKey)) void send(base)
      }}
    >
      {isRestored ? (
        <p role="status" className="text-xs text-soft">
          What you were writing here before is back; it is not saved yet.
        </p>
      ) : null}
      {place === null ? null : (
        <p className="flex items-center gap-2 text-sm">
          <label htmlFor={placeId} className="shrink-0">
            {place.label}
          </label>
          <NumberInput
            id={placeId}
            className="setting-control"
            value={place.value}
            unit={place.unit}
            min={place.min}
            max={place.max}
            isRequired
            onValue={(value) => value !== null && change({ anchor: anchorAt(anchor, value) })}
          />
        </p>
      )}
      <div>
        <MentionArea
          label="Note"
          value={text}
          people={candidates}
          isFocusedFirst={isFresh}
          faultId={shown?.kind === 'fault' ? faultId : undefined}
          onValue={(typed, chosen) =>
            change({ text: typed, ...(chosen ? { chosenIds: [...draft.chosenIds, chosen.userId] } : {}) })
          }
        />
        {candidates.length > 0 ? <p className="text-xs text-soft">@ names a member, who gets a mail.</p> : null}
      </div>
      {shown ? (
        <NoteTroubles
          trouble={shown}
          faultId={faultId}
          onKeepMine={(theirs) => void send(theirs)}
          onTakeTheirs={close}
          onAddAnew={() => void send(null)}
          onLetGo={close}
        />
      ) : null}
      {shown?.kind === 'changed' || shown?.kind === 'deleted' ? null : (
        <div className="flex gap-2">
          <Button type="submit" variant="primary" size="small" disabled={isBusy}>
            {saveLabel}
          </Button>
          <Button size="small" onClick={close}>
            Cancel
          </Button>
        </div>
      )}
    </form>
  )
}

/** Members, and whoever is named in the note already though they have left. */
function withNamed(people: readonly NamedPerson[], base: Note | null): NamedPerson[] {
  const known = new Set(people.map(({ userId }) => userId))
  return [...people, ...(base?.mentions ?? []).filter(({ userId }) => !known.has(userId))]
}

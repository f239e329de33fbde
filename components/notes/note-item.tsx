'use client'

import { useState, type ReactNode } from 'react'
import { Button } from '@/components/ui/button'
import { classNames } from '@/components/ui/class-names'
import { Actions, Dialog } from '@/components/ui/dialog'
import { Notice } from '@/components/ui/notice'
import { useDates } from '@/lib/client/display'
import { draftKey, keepDraft, useNoteDraft } from '@/lib/client/note-drafts'
import type { Note } from '@/lib/schemas/api'
import { NoteEditor } from './note-editor'
import { useNoteLink } from './note-link'
import { anchorText, focusSoon, noteElementId, type NoteActions } from './note-types'
import { NoteWords } from './note-words'
import { TextButton } from './text-button'

interface NoteItemProps {
  number: number | null
  note: Note
  actions: NoteActions
  /** Its place lies beyond what the picture shows. */
  isOutside?: boolean
  /** Somebody deleted it while it was being changed here. */
  isGone?: boolean
  /** Where the focus goes when the note is removed. */
  listId: string
}

/** One note: its number, its text, who wrote it and where it belongs, its state, and what can be done with it. */
export function NoteItem({ number, note, actions, isOutside = false, isGone = false, listId }: NoteItemProps) {
  const { activeId, setActive } = useNoteLink()
  const [fault, setFault] = useState<string | null>(null)
  const [isRemoving, setRemoving] = useState(false)
  const [isFresh, setFresh] = useState(false)
  const key = draftKey(actions.draftScope ?? '', note.id)
  const draft = useNoteDraft(key)
  const { onChange, onAdd, onDelete, onResolve, canChange = () => true } = actions
  const mayChange = canChange(note)
  const isSettled = note.resolvedAt !== null
  const elementId = noteElementId(note.id)

  async function attempt(work: () => void | Promise<void>) {
    setFault(null)
    try {
      await work()
      return true
    } catch (error) {
      setFault(error instanceof Error ? error.message : 'That could not be done. Try again in a moment.')
      return false
    }
  }

  return (
    <li
      id={elementId}
      tabIndex={-1}
      aria-current={activeId === note.id ? true : undefined}
      className={classNames(
        'scroll-mt-4 border-l-3 py-0.5 pl-3',
        isSettled ? 'border-dashed border-steel' : 'border-plum',
        activeId === note.id && 'bg-faint',
      )}
      onPointerEnter={() => setActive(note.id)}
      onPointerLeave={() => setActive(null)}
      onFocus={() => setActive(note.id)}
      onBlur={() => setActive(null)}
    >
      {draft && onChange ? (
        <NoteEditor
          draftKey={key}
          draft={draft}
          people={actions.people ?? []}
          saveLabel="Save"
          isGone={isGone}
          isFresh={isFresh}
          onSave={(written, from) => (from ? onChange(from, written) : onAdd?.(written))}
          onClose={() => focusSoon(isGone ? listId : elementId)}
        />
      ) : (
        <>
          <p className="text-sm whitespace-pre-wrap wrap-anywhere">
            <NoteNumber number={number} isSettled={isSettled} />
            <NoteWords text={note.text} mentions={note.mentions} />
          </p>
          <NoteFacts note={note} isOutside={isOutside} />
          {fault ? (
            <p role="alert" className="text-xs text-oxide">
              {fault}
            </p>
          ) : null}
          <p className="no-print flex flex-wrap gap-x-3 text-xs">
            {onResolve ? (
              <TextButton
                onClick={() => void attempt(() => onResolve(note, !isSettled)).then(() => focusSoon(elementId))}
              >
                {isSettled ? 'Take up again' : 'Settle'}
              </TextButton>
            ) : null}
            {onChange && mayChange ? (
              <TextButton
                onClick={() => {
                  setFresh(true)
                  keepDraft(key, {
                    anchor: note.anchor,
                    text: note.text,
                    chosenIds: note.mentions.map(({ userId }) => userId),
                    base: note,
                  })
                }}
              >
                Change
              </TextButton>
            ) : null}
            {onDelete && mayChange ? <TextButton onClick={() => setRemoving(true)}>Remove</TextButton> : null}
          </p>
        </>
      )}
      {onDelete ? (
        <Dialog isOpen={isRemoving} onClose={() => setRemoving(false)} title="Remove this note?">
          <blockquote className="max-h-40 overflow-y-auto border-l-3 border-plum pl-3 whitespace-pre-wrap wrap-anywhere">
            {note.text}
          </blockquote>
          <p className="mt-3">
            It is gone for everyone then, from the pictures as well. To keep it but put it aside, settle it.
          </p>
          {fault ? (
            <Notice tone="error" isLive className="mt-3">
              {fault}
            </Notice>
          ) : null}
          <Actions>
            <Button onClick={() => setRemoving(false)}>Keep it</Button>
            <Button
              variant="danger"
              onClick={async () => {
                if (!(await attempt(() => onDelete(note)))) return
                setRemoving(false)
                focusSoon(listId)
              }}
            >
              Remove
            </Button>
          </Actions>
        </Dialog>
      ) : null}
    </li>
  )
}

/** The number that the mark on the picture bears: in a box, a dashed one once the note is settled. */
function NoteNumber({ number, isSettled }: { number: number | null; isSettled: boolean }) {
  if (number === null) return null
  return (
    <span
      className={classNames(
        'figures mr-1.5 inline-block rounded-[3px] border px-1.5 text-xs leading-4 text-ink',
        isSettled ? 'border-dashed border-soft' : 'border-plum',
      )}
    >
      {number}
    </span>
  )
}

function NoteFacts({ note, isOutside }: { note: Note; isOutside: boolean }) {
  const dates = useDates()
  const lines: ReactNode[] = [
    `${note.authorName}, ${dates.minute(note.createdAt)}, ${anchorText(note.anchor)}${isOutside ? ' (outside the picture)' : ''}`,
    note.updatedAt > note.createdAt ? `changed ${dates.minute(note.updatedAt)} by ${note.updatedByName}` : null,
    note.resolvedAt ? `settled ${dates.minute(note.resolvedAt)} by ${note.resolvedByName}` : null,
  ]
  return lines.map((line, index) =>
    line === null ? null : (
      <p key={index} className="text-xs text-soft">
        {line}
      </p>
    ),
  )
}

'use client'

import { useId, useState } from 'react'
import { Button } from '@/components/ui/button'
import { NumberInput } from '@/components/ui/number-input'
import { TextArea } from '@/components/ui/text-input'
import type { Note } from '@/lib/schemas/api'
import { formatDuration, formatNumber, formatPeriod } from '@/lib/units'

export type NoteAnchor = Note['anchor']

export interface NoteActions {
  onAdd?: (anchor: NoteAnchor, text: string) => void | Promise<void>
  onChange?: (note: Note, text: string) => void | Promise<void>
  onDelete?: (note: Note) => void | Promise<void>
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

export function NoteList({
  notes,
  actions,
}: {
  notes: readonly { number: number | null; note: Note }[]
  actions: NoteActions
}) {
  if (notes.length === 0) return null
  return (
    <ul aria-label="Notes" className="flex flex-col gap-3">
      {notes.map(({ number, note }) => (
        <NoteItem key={note.id} number={number} note={note} actions={actions} />
      ))}
    </ul>
  )
}

function NoteItem({ number, note, actions }: { number: number | null; note: Note; actions: NoteActions }) {
  const [isEditing, setEditing] = useState(false)
  const { onChange, onDelete } = actions
  return (
    <li className="border-l-3 border-plum py-0.5 pl-3">
      {isEditing && onChange ? (
        <NoteText
          label="Note"
          initial={note.text}
          saveLabel="Save"
          onCancel={() => setEditing(false)}
          onSave={async (text) => {
            await onChange(note, text)
            setEditing(false)
          }}
        />
      ) : (
        <>
          <p className="text-sm whitespace-pre-wrap">
            {number === null ? null : (
              <span className="figures mr-1.5 inline-block rounded-[3px] border border-plum px-1.5 text-xs leading-4 text-ink">
                {number}
              </span>
            )}
            {note.text}
          </p>
          <p className="text-xs text-soft">
            {note.authorName}, {anchorText(note.anchor)}
          </p>
          <p className="no-print flex gap-3 text-xs">
            {onChange ? <TextButton onClick={() => setEditing(true)}>Change</TextButton> : null}
            {onDelete ? <TextButton onClick={() => void onDelete(note)}>Remove</TextButton> : null}
          </p>
        </>
      )}
    </li>
  )
}

export function TextButton({ onClick, children, label }: { onClick: () => void; children: string; label?: string }) {
  return (
    <button
      type="button"
      aria-label={label}
      onClick={onClick}
      className="text-soft underline decoration-rule underline-offset-2 hover:text-ink pointer-coarse:min-h-11"
    >
      {children}
    </button>
  )
}

interface AddNoteProps {
  /** Where the note will be pinned, as far as it is known: from a click on a picture, or the start of its axis. */
  anchor: NoteAnchor
  onAdd: (anchor: NoteAnchor, text: string) => void | Promise<void>
  isOpen: boolean
  onOpen: () => void
  onClose: () => void
}

/** “Add a note”, and its form; the place can be typed, so that no pointer is needed. */
export function AddNote({ anchor, onAdd, isOpen, onOpen, onClose }: AddNoteProps) {
  if (!isOpen) {
    return (
      <p className="no-print text-sm">
        <TextButton onClick={onOpen}>Add a note</TextButton>
      </p>
    )
  }
  return <AddNoteForm key={JSON.stringify(anchor)} anchor={anchor} onAdd={onAdd} onClose={onClose} />
}

function AddNoteForm({ anchor, onAdd, onClose }: Pick<AddNoteProps, 'anchor' | 'onAdd' | 'onClose'>) {
  const placeId = useId()
  const [place, setPlace] = useState(placeOf(anchor))
  return (
    <div className="border-l-3 border-plum pl-3">
      {place === null ? null : (
        <p className="mb-2 flex items-center gap-2 text-sm">
          <label htmlFor={placeId} className="shrink-0">
            {PLACE_LABELS[anchor.kind]}
          </label>
          <NumberInput
            id={placeId}
            className="setting-control"
            value={place.value}
            unit={place.unit}
            min={place.min}
            max={place.max}
            isRequired
            onValue={(value) => value !== null && setPlace({ ...place, value })}
          />
        </p>
      )}
      <NoteText
        label="Note"
        initial=""
        saveLabel="Add note"
        onCancel={onClose}
        onSave={async (text) => {
          await onAdd(place === null ? anchor : anchorAt(anchor, place.value), text)
          onClose()
        }}
      />
    </div>
  )
}

const PLACE_LABELS: Record<NoteAnchor['kind'], string> = {
  time: 'Time into the run',
  period: 'Period',
  'worm-angle': 'Worm angle',
  whole: '',
}

interface Place {
  value: number
  unit: string
  min?: number
  max?: number
}

function placeOf(anchor: NoteAnchor): Place | null {
  if (anchor.kind === 'time') return { value: round(anchor.timeSeconds / 60, 3), unit: 'min' }
  if (anchor.kind === 'period') return { value: round(anchor.periodSeconds, 2), unit: 's', min: 0.01 }
  if (anchor.kind === 'worm-angle') return { value: round(anchor.angleDegrees, 1) % 360, unit: '°', min: 0, max: 359.9 }
  return null
}

function anchorAt(anchor: NoteAnchor, value: number): NoteAnchor {
  if (anchor.kind === 'time') return { kind: 'time', timeSeconds: 60 * value }
  if (anchor.kind === 'period') return { kind: 'period', periodSeconds: value }
  if (anchor.kind === 'worm-angle') return { kind: 'worm-angle', angleDegrees: value }
  return anchor
}

function round(value: number, decimals: number): number {
  return Number(value.toFixed(decimals))
}

interface NoteTextProps {
  label: string
  initial: string
  saveLabel: string
  onSave: (text: string) => Promise<void>
  onCancel: () => void
}

function NoteText({ label, initial, saveLabel, onSave, onCancel }: NoteTextProps) {
  const [text, setText] = useState(initial)
  const [fault, setFault] = useState<string | null>(null)
  const [isBusy, setBusy] = useState(false)
  const faultId = useId()

  async function save() {
    if (text.trim() === '') {
      setFault('Write something first')
      return
    }
    setBusy(true)
    setFault(null)
    try {
      await onSave(text.trim())
    } catch (error) {
      setFault(error instanceof Error ? error.message : 'The note could not be saved. Try again.')
      setBusy(false)
    }
  }

  return (
    <div>
      <TextArea
        aria-label={label}
        aria-describedby={fault ? faultId : undefined}
        aria-invalid={fault ? true : undefined}
        autoFocus
        rows={3}
        maxLength={4000}
        className="resize-none text-sm"
        value={text}
        onChange={(event) => setText(event.target.value)}
      />
      {fault ? (
        <p id={faultId} role="alert" className="text-xs text-oxide">
          {fault}
        </p>
      ) : null}
      <div className="mt-1.5 flex gap-2">
        <Button variant="primary" size="small" disabled={isBusy} onClick={() => void save()}>
          {saveLabel}
        </Button>
        <Button size="small" onClick={onCancel}>
          Cancel
        </Button>
      </div>
    </div>
  )
}

'use client'

import { useState } from 'react'
import { anchorText } from '@/components/notes/note-types'
import { Button } from '@/components/ui/button'
import { ConflictNotice } from '@/components/ui/conflict-notice'
import { Checkbox } from '@/components/ui/checkbox'
import { Actions } from '@/components/ui/dialog'
import { Field, FieldGroup } from '@/components/ui/field'
import { Notice } from '@/components/ui/notice'
import { Select } from '@/components/ui/select'
import { TextArea } from '@/components/ui/text-input'
import type { Dates } from '@/lib/client/dates'
import { useDates } from '@/lib/client/display'
import { RequestError } from '@/lib/client/fetcher'
import type { Note } from '@/lib/schemas/api'
import { PREFACE_MAX, shareLinkSchema, type ShareLink, type ShareLinkFields } from '@/lib/schemas/share'

const DURATIONS = { week: 7, month: 30, year: 365 } as const
type Expiry = keyof typeof DURATIONS | 'never' | 'as-it-is'

const EXPIRY_OPTIONS: { value: Expiry; label: string }[] = [
  { value: 'week', label: 'a week' },
  { value: 'month', label: 'a month' },
  { value: 'year', label: 'a year' },
  { value: 'never', label: 'until it is revoked' },
]

function inDays(days: number): string {
  return new Date(Date.now() + days * 86_400_000).toISOString()
}

interface ShareLinkFormProps {
  /** The link to change; null: a new one. */
  link: ShareLink | null
  notes: readonly Note[]
  /** `version`: the one of the link that the change is made from. */
  onSend: (fields: ShareLinkFields, version: number) => Promise<void>
  /** Somebody else changed the link meanwhile: goes on from what they made of it. */
  onTakeTheirs?: (link: ShareLink) => void
  onCancel: () => void
}

/** How long a link lasts, what its reader is told first, and which notes are shown. */
export function ShareLinkForm({ link, notes, onSend, onTakeTheirs, onCancel }: ShareLinkFormProps) {
  const dates = useDates()
  const kept = link?.expiresAt ?? null
  const [expiry, setExpiry] = useState<Expiry>(link === null ? 'month' : kept === null ? 'never' : 'as-it-is')
  const [preface, setPreface] = useState(link?.preface ?? '')
  const [noteIds, setNoteIds] = useState<readonly string[]>(link?.noteIds ?? [])
  const [isBusy, setBusy] = useState(false)
  const [fault, setFault] = useState<RequestError | Error | null>(null)
  const fields = fault instanceof RequestError ? fault.fields : {}
  const theirs =
    fault instanceof RequestError && fault.isConflict ? shareLinkSchema.safeParse(fault.current).data : null
  const isElsewhere = fault !== null && !theirs && Object.keys(fields).length === 0

  function expiresAt(): string | null {
    if (expiry === 'never') return null
    if (expiry === 'as-it-is') return kept
    return inDays(DURATIONS[expiry])
  }

  async function send(version = link?.version ?? 1) {
    setBusy(true)
    setFault(null)
    try {
      const known = new Set(notes.map(({ id }) => id))
      await onSend({ preface, expiresAt: expiresAt(), noteIds: noteIds.filter((id) => known.has(id)) }, version)
    } catch (error) {
      setFault(error instanceof Error ? error : new Error('The link could not be saved. Try again.'))
      setBusy(false)
    }
  }

  return (
    <form
      noValidate
      className="flex flex-col gap-4"
      onSubmit={(event) => {
        event.preventDefault()
        void send()
      }}
    >
      <Field label="How long it lasts" error={fields.expiresAt}>
        {(control) => (
          <Select
            {...control}
            className="max-w-72"
            options={
              kept === null
                ? EXPIRY_OPTIONS
                : [{ value: 'as-it-is', label: `as it is: until ${dates.day(kept)}` }, ...EXPIRY_OPTIONS.map(fromNow)]
            }
            value={expiry}
            onChange={(event) => setExpiry(event.target.value as Expiry)}
          />
        )}
      </Field>
      <Field label="Words to the reader" hint="They stand above the figures. May be left empty." error={fields.preface}>
        {(control) => (
          <TextArea
            {...control}
            rows={3}
            maxLength={PREFACE_MAX}
            value={preface}
            onChange={(event) => setPreface(event.target.value)}
          />
        )}
      </Field>
      {notes.length > 0 ? (
        <FieldGroup legend="Notes to show" hint="What is not ticked stays among the members.">
          <div className="flex max-h-56 flex-col gap-2 overflow-y-auto">
            {notes.map(({ id, text, authorName, anchor }) => (
              <Checkbox
                key={id}
                label={
                  <>
                    <span className="line-clamp-2">{text}</span>
                    <span className="text-sm text-soft">
                      {authorName}, {anchorText(anchor)}
                    </span>
                  </>
                }
                checked={noteIds.includes(id)}
                onChange={(event) =>
                  setNoteIds(event.target.checked ? [...noteIds, id] : noteIds.filter((each) => each !== id))
                }
              />
            ))}
          </div>
        </FieldGroup>
      ) : null}
      {theirs ? (
        <ConflictNotice
          thing="this link"
          onKeepMine={() => void send(theirs.version)}
          onTakeTheirs={() => onTakeTheirs?.(theirs)}
        >
          <p>{theirsInWords(theirs, notes, dates)}</p>
        </ConflictNotice>
      ) : null}
      {isElsewhere ? (
        <Notice tone="error" isLive>
          {fault.message}
        </Notice>
      ) : null}
      <Actions className="mt-0">
        <Button onClick={onCancel}>Not now</Button>
        <Button type="submit" variant="primary" disabled={isBusy}>
          {link ? 'Save' : 'Make the link'}
        </Button>
      </Actions>
    </form>
  )
}

function fromNow(option: (typeof EXPIRY_OPTIONS)[number]) {
  return option.value === 'never' ? option : { ...option, label: `${option.label} from now` }
}

function theirsInWords({ expiresAt, preface, noteIds }: ShareLink, notes: readonly Note[], dates: Dates): string {
  const until = expiresAt === null ? 'until it is revoked' : `until ${dates.minute(expiresAt)}`
  const shown = notes.filter(({ id }) => noteIds.includes(id)).map(({ text }) => `“${text.slice(0, 60)}”`)
  const withNotes = shown.length === 0 ? 'no notes' : shown.join(', ')
  return `Now it lasts ${until}, shows ${withNotes}, and ${preface === null ? 'says nothing first' : `says first: “${preface.slice(0, 200)}”`}.`
}

'use client'

import { useEffect, useRef, useState, type ReactNode } from 'react'
import { Button } from '@/components/ui/button'
import { Actions } from '@/components/ui/dialog'
import { focusFirstInvalid } from '@/components/ui/focus-first-invalid'
import { Notice } from '@/components/ui/notice'
import type { ImportFault, TablePreview, TextLayout } from '@/lib/formats/types'
import { formatBytes, formatCount } from '@/lib/units'
import { choicesOf, setColumns, type ImportChoices, type ImportDraft } from './import-draft'
import { importFieldFaults } from './import-faults'
import { LayoutFields } from './layout-fields'
import { NightFields } from './night-fields'
import { PreviewGrid } from './preview-grid'
import { RecordingFields } from './recording-fields'
import { ScaleFields, type KnownOptics } from './scale-fields'
import { SenseFields } from './sense-fields'

interface ColumnMapperProps {
  fileName: string
  preview: TablePreview
  draft: ImportDraft
  onDraft: (draft: ImportDraft) => void
  /** What the user corrected about the layout; answer with a new preview (and withPreview on the draft). */
  onLayout: (changes: Partial<TextLayout>) => void
  onSubmit: (choices: ImportChoices) => void
  onCancel?: () => void
  /** Why the file could not be read with these choices. */
  fault: ImportFault | null
  knownOptics?: readonly KnownOptics[]
  submitLabel?: string
  isBusy?: boolean
  /** Further fields or progress, above the buttons. */
  children?: ReactNode
}

/** What the file holds, column by column, and what is known of the recording: one form from a file to a run. */
export function ColumnMapper(props: ColumnMapperProps) {
  const { fileName, preview, draft, onDraft, onLayout, onSubmit, onCancel, fault } = props
  const { knownOptics = [], submitLabel = 'Read the file', isBusy = false, children } = props
  const [isTried, setTried] = useState(false)
  const faultPlace = useRef<HTMLDivElement>(null)
  // The button stands below a long form, what went wrong above it.
  useEffect(() => {
    if (fault) faultPlace.current?.scrollIntoView({ block: 'center' })
  }, [fault])
  const faults = isTried ? importFieldFaults(draft) : {}
  const columnFaults = [faults.time, faults.displacement].filter((text) => text !== undefined)

  function submit(form: HTMLFormElement) {
    setTried(true)
    const choices = choicesOf(draft, preview)
    const open = importFieldFaults(draft)
    if (choices && Object.keys(open).length === 0 && !focusFirstInvalid(form)) onSubmit(choices)
    else if (Object.keys(open).length > 0) focusOnceDrawn(form)
  }

  return (
    <form
      noValidate
      aria-label={`How to read ${fileName}`}
      className="flex flex-col gap-5"
      onSubmit={(event) => {
        event.preventDefault()
        submit(event.currentTarget)
      }}
    >
      <div className="flex flex-col gap-2">
        <p>
          <span className="font-semibold break-all">{fileName}</span>{' '}
          <span className="figures text-sm text-soft">
            {formatBytes(preview.byteLength)}, about {formatCount(preview.estimatedRowCount)} rows
          </span>
        </p>
        {preview.suggested === null ? (
          <Notice tone="warning">
            The columns could not be guessed. Say below which one is time and which one the displacement in right
            ascension.
          </Notice>
        ) : null}
        <div ref={faultPlace} className="empty:hidden">
          {fault ? (
            <Notice tone="error" title="The file could not be read" isLive>
              {fault.message}
            </Notice>
          ) : null}
        </div>
        <PreviewGrid
          preview={preview}
          columns={draft.columns}
          onColumns={(columns) => onDraft(setColumns(draft, columns))}
          fault={fault}
        />
        {columnFaults.map((text) => (
          <p key={text} role="alert" className="text-sm text-oxide">
            <span aria-hidden="true">▲ </span>
            {text}
          </p>
        ))}
        <Preamble lines={preview.preamble} />
        <LayoutFields layout={preview.layout} onLayout={onLayout} isOpen={preview.suggested === null} />
      </div>
      <div className="grid grid-cols-2 gap-6 max-md:grid-cols-1">
        <div className="flex flex-col gap-6">
          <ScaleFields draft={draft} onDraft={onDraft} faults={faults} knownOptics={knownOptics} />
        </div>
        <div className="flex flex-col gap-6">
          <SenseFields draft={draft} onDraft={onDraft} faults={faults} />
          <RecordingFields draft={draft} onDraft={onDraft} />
          <NightFields facts={draft.facts} onFacts={(facts) => onDraft({ ...draft, facts })} />
        </div>
      </div>
      {children}
      <Actions className="mt-0">
        {onCancel ? <Button onClick={onCancel}>Choose another file</Button> : null}
        <Button type="submit" variant="primary" disabled={isBusy}>
          {submitLabel}
        </Button>
      </Actions>
    </form>
  )
}

function Preamble({ lines }: { lines: string[] }) {
  if (lines.length === 0) return null
  return (
    <details className="text-sm">
      <summary className="text-soft">
        {lines.length === 1 ? '1 line stands' : `${lines.length} lines stand`} above the table
      </summary>
      <pre
        className="mt-1 max-h-40 overflow-auto rounded-control border border-rule p-2 font-mono whitespace-pre-wrap"
        tabIndex={0}
      >
        {lines.join('\n')}
      </pre>
    </details>
  )
}

/** Once the faults are drawn, the focus goes to the first field that has one, or to the first column's meaning. */
function focusOnceDrawn(form: HTMLFormElement) {
  requestAnimationFrame(() => {
    const field =
      form.querySelector<HTMLElement>('[aria-invalid="true"]') ?? form.querySelector<HTMLElement>('thead select')
    field?.focus()
  })
}

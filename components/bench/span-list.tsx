'use client'

import { useState } from 'react'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { NumberInput } from '@/components/ui/number-input'
import type { ExcludedSpan } from '@/lib/analysis/types'
import { formatNumber } from '@/lib/units'
import { AsideGroup } from './aside'
import { TextButton } from '@/components/notes/text-button'

interface SpanListProps {
  spans: readonly ExcludedSpan[]
  isLocked: boolean
  onRemove: (index: number) => void
}

/** The spans left out by hand, each with the way to take it back in. */
export function SpanList({ spans, isLocked, onRemove }: SpanListProps) {
  if (spans.length === 0) return null
  return (
    <AsideGroup title="Left out by hand">
      <ul>
        {spans.map((span, index) => {
          const text = `${formatNumber(span.startSeconds / 60, 2)} – ${formatNumber(span.endSeconds / 60, 2, { unit: 'min' })}`
          return (
            <li
              key={`${span.startSeconds} ${span.endSeconds}`}
              className="flex justify-between gap-3 border-b border-rule py-1 text-sm"
            >
              <span className="figures">{text}</span>
              {isLocked ? null : (
                <TextButton label={`Use ${text} again`} onClick={() => onRemove(index)}>
                  use again
                </TextButton>
              )}
            </li>
          )
        })}
      </ul>
    </AsideGroup>
  )
}

/** Leaving out a span by typing, for those who can't drag or want it exact. */
export function ExcludeForm({ onLeaveOut }: { onLeaveOut: (span: ExcludedSpan) => void }) {
  const [from, setFrom] = useState<number | null>(null)
  const [to, setTo] = useState<number | null>(null)
  const [fault, setFault] = useState<string | null>(null)

  function leaveOut() {
    if (from === null || to === null) return setFault('Give both ends in minutes into the run')
    if (to <= from) return setFault('The end must come after the start')
    setFault(null)
    setFrom(null)
    setTo(null)
    onLeaveOut({ startSeconds: 60 * from, endSeconds: 60 * to })
  }

  return (
    <details className="no-print text-sm">
      <summary className="py-0.5 text-soft pointer-coarse:py-3.5">Leave out a span</summary>
      <form
        className="mt-2 flex flex-col gap-2"
        noValidate
        onSubmit={(event) => {
          event.preventDefault()
          leaveOut()
        }}
      >
        <div className="grid grid-cols-2 gap-2">
          <Field label="From">
            {(control) => <NumberInput {...control} unit="min" value={from} onValue={setFrom} />}
          </Field>
          <Field label="To">{(control) => <NumberInput {...control} unit="min" value={to} onValue={setTo} />}</Field>
        </div>
        {fault ? (
          <p role="alert" className="text-oxide">
            {fault}
          </p>
        ) : null}
        <Button type="submit" className="self-start">
          Leave out
        </Button>
      </form>
    </details>
  )
}

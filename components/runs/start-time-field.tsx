'use client'

import { useState } from 'react'
import { Field } from '@/components/ui/field'
import { Segmented } from '@/components/ui/segmented'
import { TextInput } from '@/components/ui/text-input'
import { shortZone } from '@/lib/client/dates'
import { useDates } from '@/lib/client/display'
import { readWallTime, wallTimeOf } from '@/lib/wall-time'

interface StartTimeFieldProps {
  /** ISO 8601, or null where it is not known. */
  value: string | null
  onValue: (iso: string | null) => void
  /** What holds while it is empty. */
  emptyHint?: string
}

interface Typed {
  /** The value that the text stands for; another one from outside replaces the text. */
  value: string | null
  timeZone: string
  text: string
}

/** When a run was begun, typed as the clocks of the person’s time zone show it and kept in UTC. */
export function StartTimeField({ value, onValue, emptyHint }: StartTimeFieldProps) {
  const { timeZone, zoneName } = useDates()
  const fresh = (): Typed => ({ value, timeZone, text: value === null ? '' : wallTimeOf(value, timeZone) })
  const [typed, setTyped] = useState(fresh)
  if (typed.value !== value || typed.timeZone !== timeZone) setTyped(fresh())
  const { text } = typed
  const read = readWallTime(text, timeZone)
  const fault = faultOf({ text, read, value, timeZone })

  function type(next: string) {
    const wall = readWallTime(next, timeZone)
    const iso = wall?.kind === 'once' ? wall.readings[0].iso : null
    setTyped({ value: iso, timeZone, text: next })
    onValue(iso)
  }

  function chooseReading(iso: string) {
    setTyped({ value: iso, timeZone, text })
    onValue(iso)
  }

  return (
    <div className="flex flex-col gap-2">
      <Field
        label={`Recording began, ${zoneName}`}
        hint={`Year-month-day hour:minute, as 2026-11-14 21:40.${emptyHint ? ` ${emptyHint}` : ''}`}
        error={fault}
      >
        {(control) => (
          <TextInput
            {...control}
            // So that a form is not sent while the time can’t be meant (focusFirstInvalid).
            ref={(input) => input?.setCustomValidity(fault ?? '')}
            autoComplete="off"
            className="figures"
            value={text}
            onChange={(event) => type(event.target.value)}
          />
        )}
      </Field>
      {read?.kind === 'twice' ? (
        <Segmented
          label="Which of the two"
          className="self-start"
          value={value}
          options={read.readings.map(({ iso }, index) => ({
            value: iso,
            label: `the ${index === 0 ? 'first' : 'second'}, ${shortZone(timeZone, iso)}`,
          }))}
          onValue={chooseReading}
        />
      ) : null}
    </div>
  )
}

interface Reading {
  text: string
  read: ReturnType<typeof readWallTime>
  value: string | null
  timeZone: string
}

function faultOf({ text, read, value, timeZone }: Reading): string | null {
  if (text.trim() === '') return null
  if (!read) return 'This is no date and time. Write it as 2026-11-14 21:40.'
  if (read.kind === 'twice' && value === null) {
    return 'The clocks were set back that night, so this time came twice. Say which of the two it was.'
  }
  if (read.kind === 'never') {
    const [earlier, later] = read.readings.map(({ iso }) => `${wallTimeOf(iso, timeZone)} ${shortZone(timeZone, iso)}`)
    return `The clocks were set forward over this time that night. It was ${later} or ${earlier}.`
  }
  return null
}

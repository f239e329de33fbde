'use client'

import { useState, useSyncExternalStore } from 'react'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { TextInput } from '@/components/ui/text-input'
import { zoneName } from '@/lib/client/dates'
import { browserTimeZone } from '@/lib/client/display'
import { everyTimeZone, findTimeZones, timeNowIn } from '@/lib/client/time-zones'

/** As many as can be looked over at once; who sees more types another letter. */
const MOST_SHOWN = 8

interface TimeZoneChoiceProps {
  /** Null: this browser’s. */
  timeZone: string | null
  onTimeZone: (timeZone: string | null) => void
}

/** The zone that times are shown and typed in: the browser’s own, or one found by the name of a place. */
export function TimeZoneChoice({ timeZone, onTimeZone }: TimeZoneChoiceProps) {
  const [typed, setTyped] = useState('')
  const now = useMinute()
  const found = typed.trim() === '' ? [] : findTimeZones(everyTimeZone(), typed)

  function choose(zone: string | null) {
    setTyped('')
    onTimeZone(zone)
  }

  return (
    <div className="flex max-w-md flex-col gap-3">
      <p>
        {timeZone === null ? 'This browser’s' : zoneName(timeZone)}
        {now ? (
          <span className="text-soft">
            {timeZone === null ? `, ${zoneName(browserTimeZone())}` : ''}: it is{' '}
            <span className="figures">{timeNowIn(timeZone ?? browserTimeZone(), now)}</span> there
          </span>
        ) : null}
      </p>
      <Field label="Find a time zone" hint="A city or a country, such as Berlin or New Zealand.">
        {(control) => (
          <TextInput
            {...control}
            type="search"
            autoComplete="off"
            value={typed}
            onChange={(event) => setTyped(event.target.value)}
          />
        )}
      </Field>
      <p aria-live="polite" className="text-sm text-soft empty:hidden">
        {matchWords(typed, found.length)}
      </p>
      {now && found.length > 0 ? (
        <ul aria-label="Time zones found" className="flex flex-col">
          {found.slice(0, MOST_SHOWN).map((zone) => (
            <li key={zone} className="border-b border-rule last:border-b-0">
              <button
                type="button"
                onClick={() => choose(zone)}
                className="flex w-full items-baseline justify-between gap-3 px-1 py-1.5 text-left hover:bg-faint pointer-coarse:min-h-11"
              >
                <span>{zoneName(zone)}</span>{' '}
                <span className="figures text-sm whitespace-nowrap text-soft">{timeNowIn(zone, now)}</span>
              </button>
            </li>
          ))}
        </ul>
      ) : null}
      {timeZone === null ? null : (
        <Button className="self-start" onClick={() => choose(null)}>
          Use this browser’s
        </Button>
      )}
    </div>
  )
}

function matchWords(typed: string, count: number): string {
  if (typed.trim() === '') return ''
  if (count === 0) return 'No time zone of this name. Try the nearest large city.'
  return count > MOST_SHOWN ? `${count} time zones match; the first ${MOST_SHOWN} are shown.` : ''
}

/** The present minute; null on the server, whose minute may be another one. */
function useMinute(): Date | null {
  const minute = useSyncExternalStore(subscribeToMinutes, presentMinute, () => null)
  return minute === null ? null : new Date(minute)
}

function presentMinute(): number {
  return Math.floor(Date.now() / 60_000) * 60_000
}

function subscribeToMinutes(onChange: () => void) {
  const timer = setInterval(onChange, 1000)
  return () => clearInterval(timer)
}

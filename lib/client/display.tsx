'use client'

import { createContext, useContext, useMemo, useSyncExternalStore, type ReactNode } from 'react'
import type { Conversion } from '@/lib/analysis/types'
import { displayOf, type Display } from '@/lib/display-units'
import { DEFAULT_PREFERENCES, type Preferences } from '@/lib/schemas/preferences'
import { datesIn, type Dates } from './dates'

const Context = createContext<Preferences>(DEFAULT_PREFERENCES)

/** How the person who looks wants to see things; the defaults for visitors and on pages shown to anyone. */
export function DisplayProvider({ preferences, children }: { preferences: Preferences; children: ReactNode }) {
  return <Context value={preferences}>{children}</Context>
}

/** The preferences as they are kept: a measure, a unit, and a time zone that may be “this browser’s” (null). */
export function usePreferences(): Preferences {
  return useContext(Context)
}

/** How swings and displacements of a run are shown; without a conversion (lists, several runs) in arc seconds. */
export function useDisplay(conversion: Conversion | null = null): Display {
  const preferences = useContext(Context)
  return useMemo(() => displayOf(preferences, conversion), [preferences, conversion])
}

/**
 * The time zone that times are shown and typed in. The browser’s own is unknown to the server, so such a page says UTC, with
 * its name, until it is alive in the browser.
 */
export function useTimeZone(): string {
  const { timeZone } = useContext(Context)
  const ofBrowser = useSyncExternalStore(subscribeToNothing, browserTimeZone, () => 'UTC')
  return timeZone ?? ofBrowser
}

/** Dates and times as this person reads them. */
export function useDates(): Dates {
  return datesIn(useTimeZone())
}

export function browserTimeZone(): string {
  return new Intl.DateTimeFormat().resolvedOptions().timeZone
}

function subscribeToNothing() {
  return () => undefined
}

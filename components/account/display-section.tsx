'use client'

import { useRouter } from 'next/navigation'
import { useState, type ReactNode } from 'react'
import { Notice } from '@/components/ui/notice'
import { Segmented } from '@/components/ui/segmented'
import { SheetSection } from '@/components/ui/sheet-section'
import { usePreferences } from '@/lib/client/display'
import { sendJson } from '@/lib/client/fetcher'
import { chooseTheme, useChosenTheme } from '@/lib/client/theme'
import { preferencesSchema, type Preferences, type PreferencesChange } from '@/lib/schemas/preferences'
import { TimeZoneChoice } from './time-zone-choice'

const THEMES = [
  { value: 'system', label: 'As the system' },
  { value: 'day', label: 'Day' },
  { value: 'dusk', label: 'Dusk' },
  { value: 'night', label: 'Night' },
] as const

const SWINGS = [
  { value: 'amplitude', label: 'Amplitude' },
  { value: 'peak-to-peak', label: 'Peak-to-peak' },
] as const

const UNITS = [
  { value: 'arcsec', label: 'Arc seconds, ″' },
  { value: 'px', label: 'Pixels, px' },
] as const

/** How this person sees things; every choice is kept with the account at once and holds on all pages. */
export function DisplaySection() {
  const router = useRouter()
  const kept = usePreferences()
  const theme = useChosenTheme(kept.theme)
  const [pending, setPending] = useState<PreferencesChange>({})
  const [state, setState] = useState<'idle' | 'saving' | 'saved' | { fault: string }>('idle')
  const shown: Preferences = { ...kept, ...pending }

  async function choose(change: PreferencesChange) {
    if (change.theme !== undefined) chooseTheme(change.theme)
    setPending((now) => ({ ...now, ...change }))
    setState('saving')
    try {
      await sendJson('PATCH', '/api/account/preferences', change, preferencesSchema)
      setState('saved')
      router.refresh()
    } catch (error) {
      setPending({})
      setState({ fault: error instanceof Error ? error.message : 'Try again in a moment.' })
    }
  }

  return (
    <SheetSection
      title="Display"
      question="How you see things, in every browser you sign in with. What is computed and saved, and every correction table, never depends on it."
    >
      <div className="flex flex-col gap-6">
        <Choice
          title="Theme"
          text="Night is for use at the telescope: nothing on the page has any green or blue in it, so that your eyes stay adapted to the dark. Dialogs of the system, such as the one that picks a file, can’t be tinted."
        >
          <Segmented
            label="Theme of this account"
            value={theme ?? 'system'}
            options={THEMES}
            onValue={(value) => void choose({ theme: value === 'system' ? null : value })}
          />
        </Choice>
        <Choice
          title="Size of a swing"
          text="A swing of amplitude 4″ is 8″ from end to end. The peak-to-peak of a whole worm, and what is an RMS, stay as they are."
        >
          <Segmented
            label="Size of a swing"
            value={shown.swingMeasure}
            options={SWINGS}
            onValue={(swingMeasure) => void choose({ swingMeasure })}
          />
        </Choice>
        <Choice
          title="Displacement"
          text="Pixels are shown only where a run was recorded in pixels of a known scale; everywhere else, in lists and between runs, it stays arc seconds of the axis. Rates and tolerances stay in arc seconds too."
        >
          <Segmented
            label="Displacement"
            value={shown.displacementUnit}
            options={UNITS}
            onValue={(displacementUnit) => void choose({ displacementUnit })}
          />
        </Choice>
        <Choice title="Time zone" text="Times are shown in it, and read in it where you type them.">
          <TimeZoneChoice timeZone={shown.timeZone} onTimeZone={(timeZone) => void choose({ timeZone })} />
        </Choice>
        <p aria-live="polite" className="text-sm text-soft">
          {state === 'saved' ? 'Saved.' : state === 'saving' ? 'Saving …' : ''}
        </p>
        {typeof state === 'object' ? (
          <Notice tone="error" title="Not saved" isLive>
            {state.fault}
          </Notice>
        ) : null}
      </div>
    </SheetSection>
  )
}

function Choice({ title, text, children }: { title: string; text: string; children: ReactNode }) {
  return (
    <div>
      <h3 className="font-semibold">{title}</h3>
      <p className="mb-2 max-w-[70ch] text-sm text-pretty text-soft">{text}</p>
      {children}
    </div>
  )
}

'use client'

import type { SpectrumWindow, WindowName } from '@/lib/analysis/types'
import { turnsNeededByWindow } from '@/lib/analysis/window'
import { LARGEST_KAISER_BETA } from '@/lib/schemas/recipe'
import { formatNumber } from '@/lib/units'
import { ChoiceSetting, NumberSetting } from './setting-rows'

/** Side lobes some 60 dB down, between a Blackman and a Blackman–Harris window. */
const FIRST_KAISER_BETA = 8

const WINDOWS: { value: WindowName | 'kaiser'; label: string }[] = [
  { value: 'rectangular', label: 'none' },
  { value: 'hann', label: 'Hann' },
  { value: 'hamming', label: 'Hamming' },
  { value: 'blackman', label: 'Blackman' },
  { value: 'blackman-harris', label: 'Blackman–Harris' },
  { value: 'kaiser', label: 'Kaiser' },
  { value: 'flat-top', label: 'flat top' },
]

interface WindowSettingProps {
  window: SpectrumWindow
  /** Turns of the worm in the run; null where they are not known, and every window is offered. */
  turns: number | null
  onWindow: (window: SpectrumWindow) => void
}

/** The window of the spectrum. One whose main lobe is wider than the run has turns would lay the drift over the worm. */
export function WindowSetting({ window, turns, onWindow }: WindowSettingProps) {
  const chosen = typeof window === 'string' ? window : window.kind
  const windowOf = (value: WindowName | 'kaiser'): SpectrumWindow => {
    if (value !== 'kaiser') return value
    return typeof window === 'string' ? { kind: 'kaiser', beta: FIRST_KAISER_BETA } : window
  }
  return (
    <>
      <ChoiceSetting
        label="Window"
        value={chosen}
        options={WINDOWS.map(({ value, label }) => {
          const needed = turnsNeededByWindow(windowOf(value))
          const isTooWide = turns !== null && turns < needed && value !== chosen
          return isTooWide
            ? {
                value,
                label: `${label}, from ${formatNumber(Math.ceil(10 * needed) / 10, Number.isInteger(needed) ? 0 : 1)} turns`,
                isDisabled: true,
              }
            : { value, label }
        })}
        onValue={(value) => onWindow(windowOf(value))}
      />
      {typeof window === 'string' ? null : (
        <NumberSetting
          label="Kaiser’s β"
          value={window.beta}
          min={0}
          max={LARGEST_KAISER_BETA}
          onValue={(beta) => onWindow({ kind: 'kaiser', beta })}
        />
      )}
    </>
  )
}

'use client'

import { usePreferences } from '@/lib/client/display'
import { isWithoutPixels, type Display } from '@/lib/display-units'
import { formatSignificant } from '@/lib/units'

/** Says once over the worksheet how its figures are shown, where that is not the usual amplitude in arc seconds. */
export function DisplayNote({ display }: { display: Display }) {
  const preferences = usePreferences()
  const sentences = [
    display.swingMeasure === 'peak-to-peak' ? 'Swings are shown from peak to peak, twice the amplitude.' : null,
    display.arcsecPerPx === null
      ? null
      : `Displacements are shown in pixels of this run, ${formatSignificant(display.arcsecPerPx, 3, { unit: '″' })} of the axis each; rates, tolerance and correction stay in arc seconds.`,
    isWithoutPixels(preferences, display)
      ? 'Displacements are shown in arc seconds: this run has no pixels of a known size on the axis.'
      : null,
  ].filter((sentence) => sentence !== null)
  return sentences.length === 0 ? null : <p className="text-sm text-soft">{sentences.join(' ')}</p>
}

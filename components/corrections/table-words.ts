import type { TableSettings } from '@/lib/analysis/types'
import { formatNumber, formatPercent } from '@/lib/units'

const units: Record<TableSettings['unit'], string> = {
  arcsec: '″',
  'arcsec-per-second': '″/s',
  'percent-sidereal': '% of sidereal rate',
}

const spelledUnits: Record<TableSettings['unit'], string> = {
  arcsec: 'arc seconds',
  'arcsec-per-second': 'arc seconds per second',
  'percent-sidereal': '% of the sidereal rate',
}

export function unitText(unit: TableSettings['unit']): string {
  return units[unit]
}

/** What one number of the table means, and how the table is to be read, one statement a line. */
export function tableMeaning(
  settings: TableSettings,
  facts: { wormPeriodSeconds: number; orders?: number[] },
): string[] {
  const { binCount, quantity, unit, meaning, angleDirection, origin, offsetDegrees, gain, playback } = settings
  const quantityText = quantity === 'position' ? 'a position of the axis' : 'a rate of the axis'
  const sign =
    meaning === 'correction'
      ? 'it says what the axis should do: a positive value moves it ahead, to the west'
      : 'it says what the axis does wrong: a positive value means that it runs ahead, to the west; play it with the opposite sign'
  const lines = [
    `Each value is ${quantityText} in ${spelledUnits[unit]}, and ${sign}.`,
    `${binCount} bins of equal width make one turn of the worm, which takes ${formatNumber(facts.wormPeriodSeconds, 2, { unit: 's' })}.`,
    `The listed worm angle ${angleDirection === 'increasing' ? 'grows' : 'falls'} with time; its zero is ${originText(origin)}.`,
  ]
  if (offsetDegrees !== 0)
    lines.push(`${formatNumber(offsetDegrees, 1, { unit: '°', isSigned: true })} is added to every angle.`)
  if (facts.orders && facts.orders.length > 0) lines.push(`It holds the worm’s harmonics ${facts.orders.join(', ')}.`)
  if (gain !== 1) lines.push(`It takes out ${formatPercent(gain)} of the error.`)
  lines.push(`It is made to be played ${playbackText(playback)}.`)
  return lines
}

function originText(origin: TableSettings['origin']): string {
  if (origin.kind === 'run-start') return 'where the worm stood when the recording began'
  if (origin.kind === 'worm-angle-column') return 'the zero of the recording’s worm-angle column'
  return `the index mark, ${formatNumber(origin.timeSeconds, 1, { unit: 's' })} into the recording`
}

function playbackText(playback: TableSettings['playback']): string {
  if (playback === 'interpolated') return 'with straight lines from each value to the next'
  if (playback === 'held-from-start') return 'in steps, each value held from its angle to the next'
  return 'in steps, each value held around its angle'
}

import type { TableResult, TableSettings } from '@/lib/analysis/types'

/** A correction table as far as a written file needs it; tables that were stored may lack their rehearsal. */
export type WrittenTable = Pick<
  TableResult,
  'bins' | 'settings' | 'orders' | 'wormPeriodSeconds' | 'originTimeSeconds' | 'closureError'
> &
  Partial<Pick<TableResult, 'largestRateArcsecPerSecond' | 'rehearsal'>>

/** Where a table comes from and how it may be used. */
export interface CorrectionSource {
  name: string
  /** An addition only makes sense on top of the table that played while the run was recorded. */
  kind: 'stand-alone' | 'addition'
  senseBasis: 'proven' | 'assumed'
  runName: string | null
  /** SHA-256 of the packed samples; null where there is none (a bench without storage). */
  samplesSha256: string | null
  engineVersion: string
}

/** Plain ASCII: a spreadsheet that guesses the encoding wrongly still shows it right. */
export const TABLE_CAUTIONS = [
  'Keep a copy of the table that is in the mount before replacing it.',
  'A table with the wrong sign or the wrong phase origin makes the error larger: load it, record again, compare.',
] as const

const UNIT_NAMES: Record<TableSettings['unit'], string> = {
  arcsec: 'arcsec',
  'arcsec-per-second': 'arcsec/s',
  'percent-sidereal': 'percent of sidereal rate',
}

export function unitName(unit: TableSettings['unit']): string {
  return UNIT_NAMES[unit]
}

/** What one value is: a position or a rate, of the axis, and what its sign means. */
export function valueMeaning({ quantity, unit, meaning }: TableSettings): string {
  const what = quantity === 'position' ? 'Position of the axis' : 'Rate of the axis on top of tracking'
  const sign =
    meaning === 'correction'
      ? `what the axis should do; positive ${quantity === 'position' ? 'is ahead (west)' : 'is faster (west)'}`
      : `what the axis does wrong; positive ${quantity === 'position' ? 'is ahead (too far west)' : 'is too fast (west)'}, so play it with the opposite sign`
  return `${what} in ${unitName(unit)}: ${sign}.`
}

export function angleMeaning({ settings, originTimeSeconds }: WrittenTable): string {
  const { origin, angleDirection, offsetDegrees } = settings
  const zero =
    origin.kind === 'run-start'
      ? 'the worm angle at the run start'
      : origin.kind === 'index-time'
        ? 'the index mark'
        : "the zero of the recording's worm angle column"
  const offset = offsetDegrees === 0 ? '' : ` ${offsetDegrees} deg are added to every angle.`
  return (
    `Angle 0 is ${zero}, ${originTimeSeconds} s after the first row of the recording. ` +
    `The listed angle ${angleDirection === 'increasing' ? 'grows' : 'falls'} with time.${offset}`
  )
}

export function playbackMeaning({ playback, gain, binCount }: TableSettings): string {
  const how = {
    interpolated: 'straight lines from value to value',
    'held-from-start': 'steps, each value held from its angle to the next',
    'held-at-centre': 'steps, each value held around its angle',
  }[playback]
  return `${binCount} bins make one turn of the worm. To be played as ${how}. Share of the error taken out: ${gain}.`
}

export function closureMeaning({ settings, closureError }: WrittenTable): string {
  return settings.quantity === 'position'
    ? `Step from one turn into the next: ${closureError} ${unitName(settings.unit)} (0 to rounding).`
    : `Sum of all rates over a turn: ${closureError} ${unitName(settings.unit)} (0 to rounding).`
}

export function kindMeaning({ kind, senseBasis }: CorrectionSource): string {
  const use =
    kind === 'stand-alone'
      ? 'A table of its own.'
      : 'An addition: add it bin by bin to the table that was playing while the run was recorded; it is no table of its own.'
  const sense =
    senseBasis === 'proven'
      ? 'The sense of the recording was proven.'
      : 'The sense of the recording is only assumed: the sign may be wrong.'
  return `${use} ${sense}`
}

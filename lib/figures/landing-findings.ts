import type { AnalysisResult } from '@/lib/analysis/types'
import { formatEstimate, formatNumber } from '@/lib/units'

/** What each drawing of the landing page shows, in a sentence; together they are its text alternative. */
export interface LandingFindings {
  track: string
  stems: string
  dial: string
}

const SMALL_NUMBERS = [
  'no',
  'one',
  'two',
  'three',
  'four',
  'five',
  'six',
  'seven',
  'eight',
  'nine',
  'ten',
  'eleven',
  'twelve',
]

export function landingFindings({ run, worm, lines, drift, turn }: AnalysisResult): LandingFindings {
  const minutes = formatNumber(run.durationSeconds / 60, 0)
  const driftPerMinute = formatNumber(Math.abs(drift.rateArcsecPerSecond.value) * 60, 2, { unit: '″' })
  if (!worm) {
    return {
      track: `A star recorded for ${minutes} minutes; it drifts by ${driftPerMinute} a minute.`,
      stems: 'No swing of a worm stands out of it.',
      dial: '',
    }
  }
  const swing = formatNumber(worm.peakToPeakArcsec.value, 1, { unit: '″' })
  const period = formatEstimate(worm.periodSeconds, { unit: 's' })
  const sources = lines.flatMap(({ source }) => (source === null ? [] : [source.toLowerCase()]))
  const others =
    lines.length === 0
      ? 'no swing of another part'
      : `${inWords(lines.length)} ${lines.length === 1 ? 'swing' : 'swings'} of other parts` +
        (sources.length === 0 ? '' : `: ${sources.join(', ')}`)
  return {
    track: `In ${minutes} minutes the worm swings the axis by ${swing} each turn; drift adds ${driftPerMinute} a minute.`,
    stems: `The worm turns in ${period}. Above chance stand ${inWords(worm.harmonics.length)} of its harmonics and ${others}.`,
    dial: turn
      ? `${formatNumber(100 * turn.repeatability, 1, { unit: '%' })} of the variance repeats each turn; ` +
        `a perfect table leaves ${formatNumber(100 * turn.rmsShareLeft, 0, { unit: '%' })} of the RMS.`
      : '',
  }
}

function inWords(count: number): string {
  return SMALL_NUMBERS[count] ?? String(count)
}

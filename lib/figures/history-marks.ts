import type { Estimate } from '@/lib/analysis/types'
import { PLAIN_DISPLAY, shownSwing, type Display } from '@/lib/display-units'
import { amplitudeOf, peakToPeakOf, type HistoryPoint } from '@/lib/findings/project-history'
import { evenTicks } from './svg-geometry'

/** A value and one standard error to either side, as shares of the height from the top; no span where there is no error. */
interface Mark {
  top: number
  span: { top: number; bottom: number } | null
}

export interface HistoryMarks {
  /** Shares 0 … 1 of the picture's width and height, counted from the left and from the top. */
  points: { left: number; swing: Mark; peakToPeak: Mark }[]
  ticks: { top: number; value: number }[]
}

type HistoryEntry = Pick<
  HistoryPoint,
  'at' | 'wormAmplitudeArcsec' | 'wormAmplitudeStderrArcsec' | 'peakToPeakArcsec' | 'peakToPeakStderrArcsec'
>

/**
 * The swing of the worm’s fundamental, as it is measured, and the peak-to-peak of the whole worm against the date of the run,
 * each with its standard error; the scale begins at zero.
 */
export function historyMarks(history: readonly HistoryEntry[], display: Display = PLAIN_DISPLAY): HistoryMarks {
  const swings = history.map((point) => shownSwing(amplitudeOf(point), display))
  const peaks = history.map(peakToPeakOf)
  const times = history.map(({ at }) => Date.parse(at))
  const [from, to] = [Math.min(...times), Math.max(...times)]
  const highest = 1.1 * Math.max(1e-3, ...[...swings, ...peaks].map(({ value, stderr }) => value + (stderr ?? 0)))
  const topOf = (value: number) => 1 - value / highest
  const mark = ({ value, stderr }: Estimate): Mark => ({
    top: topOf(value),
    span: stderr === null ? null : { top: topOf(value + stderr), bottom: topOf(Math.max(0, value - stderr)) },
  })
  return {
    points: history.map((_, index) => ({
      left: to > from ? 0.04 + (0.92 * (times[index] - from)) / (to - from) : 0.5,
      swing: mark(swings[index]),
      peakToPeak: mark(peaks[index]),
    })),
    ticks: evenTicks(0, highest, 4).map((value) => ({ top: topOf(value), value })),
  }
}

import { PLAIN_DISPLAY, swingFactor, type Display } from '@/lib/display-units'
import { evenTicks } from './svg-geometry'

export interface HistoryMarks {
  /** Shares 0 … 1 of the picture's width and height, counted from the left and from the top. */
  points: { left: number; swingTop: number; peakToPeakTop: number }[]
  ticks: { top: number; value: number }[]
}

/** The swing of the worm’s fundamental, as it is measured, and the peak-to-peak of the whole worm against the date of the run; the scale begins at zero. */
export function historyMarks(
  history: readonly { at: string; wormAmplitudeArcsec: number; peakToPeakArcsec: number }[],
  display: Display = PLAIN_DISPLAY,
): HistoryMarks {
  const factor = swingFactor(display)
  const times = history.map(({ at }) => Date.parse(at))
  const [from, to] = [Math.min(...times), Math.max(...times)]
  const highest =
    1.1 *
    Math.max(
      1e-3,
      ...history.flatMap(({ peakToPeakArcsec, wormAmplitudeArcsec }) => [
        peakToPeakArcsec,
        factor * wormAmplitudeArcsec,
      ]),
    )
  const topOf = (value: number) => 1 - value / highest
  return {
    points: history.map((point, index) => ({
      left: to > from ? 0.04 + (0.92 * (times[index] - from)) / (to - from) : 0.5,
      swingTop: topOf(factor * point.wormAmplitudeArcsec),
      peakToPeakTop: topOf(point.peakToPeakArcsec),
    })),
    ticks: evenTicks(0, highest, 4).map((value) => ({ top: topOf(value), value })),
  }
}

import { PLAIN_DISPLAY, formatDisplacement, sizedDisplacement, type Display } from '@/lib/display-units'
import type { OverviewFigures } from '@/lib/schemas/kept-figures'
import { formatEstimate } from '@/lib/units'
import { finding, worm, type Finding } from './finding'
import { peakToPeakOf, type HistoryPoint } from './project-history'
import { capitalised, counted } from './words'

interface OverviewState {
  name: string
  runCount: number
  analysisCount: number
  history: readonly HistoryPoint[]
  /** Figures of the last point of the history, once they are there. */
  latest: OverviewFigures | null
  /** Of the run that the latest figures are of. */
  display?: Display
}

/** The sentence over a project: what its worm does now. */
export function overviewFinding(state: OverviewState): Finding {
  const { name, runCount, analysisCount, history, latest, display = PLAIN_DISPLAY } = state
  if (runCount === 0) return finding`${name} has no recording yet`
  if (analysisCount === 0) {
    return finding`${capitalised(counted(runCount, 'run'))} of ${name} ${runCount === 1 ? 'waits' : 'wait'} for a first analysis`
  }
  const last = history.at(-1)
  if (!last) return finding`None of the analyses of ${name} has a figure for the worm yet`
  const swing = latest?.worm
    ? formatDisplacement(latest.worm.peakToPeakArcsec, display)
    : sizedDisplacement(last.peakToPeakArcsec, display)
  return finding`The worm swings the axis ${worm(swing)} peak to peak in the latest analysed run`
}

/** The sentence over the history; it states the figures and leaves the verdict to a comparison. */
export function historyFinding(history: readonly HistoryPoint[], total = history.length): Finding {
  const [first, last] = [history.at(0), history.at(-1)]
  if (!first || !last) return finding`There is no history yet: save an analysis of a run to begin it.`
  const swing = (point: HistoryPoint) => formatEstimate(peakToPeakOf(point), { unit: '″', significantDigits: 3 })
  if (history.length === 1)
    return finding`One analysed run so far; the history begins with ${worm(swing(last))} peak to peak.`
  const which =
    total > history.length ? `the latest ${history.length} of ${total} analysed runs` : counted(total, 'analysed run')
  return finding`From the first to the last of ${which} the peak-to-peak went from ${swing(first)} to ${worm(swing(last))}.`
}

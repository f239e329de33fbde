import type { AnalysisResult, AnalysisSuccess, AnalysisViews } from '@/lib/analysis/types'
import { keyFigures, type KeyFigureText } from '@/lib/findings/key-figures'
import { formatNumber } from '@/lib/units'
import { landingDial, type LandingDial } from './landing-dial'
import { landingFindings, type LandingFindings } from './landing-findings'
import { landingStems, type LandingStems } from './landing-stems'
import { bands, evenTicks, linearScale, pathOf, type Band, type PlotBox, type Tick } from './svg-geometry'

/** Everything that the landing page draws, in the units of each drawing's own view box. */
export interface LandingPicture {
  track: LandingTrack
  stems: LandingStems
  /** Null when the record gave no worm. */
  dial: LandingDial | null
  findings: LandingFindings
  /** The key figures of the run, as the bench shows them. */
  figures: KeyFigureText[]
}

export interface LandingTrack {
  width: number
  height: number
  plot: PlotBox
  recordedPath: string
  fittedPath: string
  driftPath: string
  gaps: Band[]
  strayPoints: { x: number; y: number }[]
  turns: { x: number; width: number; label: string }[]
  timeTicks: Tick[]
  valueTicks: Tick[]
}

export function landingPicture({ result, views }: Pick<AnalysisSuccess, 'result' | 'views'>): LandingPicture {
  return {
    track: landingTrack(result, views),
    stems: landingStems(result, views),
    dial: views.turn ? landingDial(views.turn) : null,
    findings: landingFindings(result),
    figures: keyFigures(result),
  }
}

const WIDTH = 760
const HEIGHT = 352
const PLOT = { left: 58, right: 752, top: 52, bottom: 298 }

/** The recorded track with what was fitted to it, drawn over the drift. */
function landingTrack(result: AnalysisResult, { track }: AnalysisViews): LandingTrack {
  const { firstUsedTimeSeconds, lastUsedTimeSeconds, gaps } = result.run
  const values = [...track.recordedArcsec, ...track.driftArcsec, ...track.strayArcsec].filter(Number.isFinite)
  const [lowest, highest] = [Math.min(...values), Math.max(...values)]
  const margin = 0.06 * (highest - lowest || 1)
  const x = linearScale([firstUsedTimeSeconds, lastUsedTimeSeconds], [PLOT.left, PLOT.right])
  const y = linearScale([lowest - margin, highest + margin], [PLOT.bottom, PLOT.top])

  const ends = [...track.turnStartSeconds.slice(1), lastUsedTimeSeconds]
  return {
    width: WIDTH,
    height: HEIGHT,
    plot: PLOT,
    recordedPath: pathOf(track.timeSeconds, track.recordedArcsec, x, y),
    fittedPath: pathOf(track.modelTimeSeconds, track.fittedArcsec, x, y),
    driftPath: pathOf(track.modelTimeSeconds, track.driftArcsec, x, y),
    gaps: bands(gaps, x),
    strayPoints: Array.from(track.strayTimeSeconds, (t, i) => ({ x: x(t), y: y(track.strayArcsec[i]) })),
    turns: track.turnStartSeconds
      .map((start, i) => ({ x: x(start), width: x(ends[i]) - x(start), label: `turn ${i + 1}` }))
      .filter(({ width }) => width > 4),
    timeTicks: evenTicks(firstUsedTimeSeconds / 60, lastUsedTimeSeconds / 60, 6).map((minutes) => ({
      at: x(minutes * 60),
      label: formatNumber(minutes, 0),
    })),
    valueTicks: evenTicks(lowest - margin, highest + margin, 5).map((arcsec) => ({
      at: y(arcsec),
      label: formatNumber(arcsec, 0, { isSigned: true }),
    })),
  }
}

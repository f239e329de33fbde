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
  /** The same for a phone: drawn at about its width, so that pictures keep their height and letters their size. */
  narrowTrack: LandingTrack
  narrowStems: LandingStems
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
    track: landingTrack(result, views, WIDE),
    stems: landingStems(result, views, { isNarrow: false }),
    narrowTrack: landingTrack(result, views, NARROW),
    narrowStems: landingStems(result, views, { isNarrow: true }),
    dial: views.turn ? landingDial(views.turn) : null,
    findings: landingFindings(result),
    figures: keyFigures(result),
  }
}

type Frame = Pick<LandingTrack, 'width' | 'height' | 'plot'>

const WIDE: Frame = { width: 760, height: 352, plot: { left: 58, right: 752, top: 52, bottom: 298 } }
const NARROW: Frame = { width: 344, height: 262, plot: { left: 42, right: 338, top: 48, bottom: 214 } }

/** The recorded track with what was fitted to it, drawn over the drift. */
function landingTrack(result: AnalysisResult, { track }: AnalysisViews, frame: Frame): LandingTrack {
  const { plot } = frame
  const { firstUsedTimeSeconds, lastUsedTimeSeconds, gaps } = result.run
  const values = [...track.recordedArcsec, ...track.driftArcsec, ...track.strayArcsec].filter(Number.isFinite)
  const [lowest, highest] = [Math.min(...values), Math.max(...values)]
  const margin = 0.06 * (highest - lowest || 1)
  const x = linearScale([firstUsedTimeSeconds, lastUsedTimeSeconds], [plot.left, plot.right])
  const y = linearScale([lowest - margin, highest + margin], [plot.bottom, plot.top])

  const ends = [...track.turnStartSeconds.slice(1), lastUsedTimeSeconds]
  return {
    ...frame,
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

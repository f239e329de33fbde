import type { AnalysisResult, AnalysisViews } from '@/lib/analysis/types'
import { withinSentence } from '@/lib/findings/words'
import { formatNumber, formatPeriod } from '@/lib/units'
import { placeStemLabels, type LabelledStem, type LabelPlace } from './landing-labels'
import { logScale, short, type PlotBox, type Tick } from './svg-geometry'

export interface LandingStem extends LabelledStem, LabelPlace {
  kind: 'worm' | 'line'
}

/** Swings found, as stems over the spectrum of what they leave; longest period at the left, both axes logarithmic. */
export interface LandingStems {
  width: number
  height: number
  plot: PlotBox
  /** Closed outline of the spectrum that the lines leave. */
  leftOverPath: string
  stems: LandingStem[]
  /** Whole orders along the top. */
  orderTicks: Tick[]
  periodTicks: Tick[]
  amplitudeTicks: Tick[]
}

const WIDTH = 760
const HEIGHT = 262
const PLOT = { left: 58, right: 752, top: 58, bottom: 216 }
const LOWEST_ARCSEC = 0.01

export function landingStems(result: AnalysisResult, { spectrum }: AnalysisViews): LandingStems {
  const { worm, lines, run } = result
  const longest = 1 / Math.max(spectrum.frequencyHz.find((f) => f > 0) ?? 0, 1 / run.durationSeconds)
  const shortest = Math.max(1 / (spectrum.frequencyHz.at(-1) ?? 1), run.shortestPeriodSeconds)
  const swings = [
    ...(worm?.harmonics ?? []).map((harmonic) => ({
      periodSeconds: harmonic.periodSeconds,
      amplitudeArcsec: harmonic.amplitudeArcsec.value,
      label: harmonic.order === 1 ? 'worm' : `worm ×${harmonic.order}`,
      kind: 'worm' as const,
    })),
    ...lines.map((line) => ({
      periodSeconds: line.periodSeconds.value,
      amplitudeArcsec: line.amplitudeArcsec.value,
      label: line.source === null ? formatPeriod(line.periodSeconds.value) : withinSentence(line.source),
      kind: 'line' as const,
    })),
  ].filter(({ periodSeconds }) => periodSeconds <= longest && periodSeconds >= shortest)
  const highest = Math.max(1, ...swings.map(({ amplitudeArcsec }) => amplitudeArcsec * 1.6))
  const x = logScale([longest, shortest], [PLOT.left, PLOT.right])
  const y = logScale([LOWEST_ARCSEC, highest], [PLOT.bottom, PLOT.top])
  const stems = swings.map(({ periodSeconds, amplitudeArcsec, label, kind }) => ({
    x: x(periodSeconds),
    y: y(Math.max(amplitudeArcsec, LOWEST_ARCSEC)),
    label,
    kind,
  }))
  const places = placeStemLabels(stems, { ...PLOT, top: 0 })
  return {
    width: WIDTH,
    height: HEIGHT,
    plot: PLOT,
    leftOverPath: leftOver(spectrum, x, y),
    stems: stems.map((stem, i) => ({ ...stem, ...places[i] })),
    orderTicks: worm ? orderTicks(worm.periodSeconds.value, shortest, x) : [],
    periodTicks: [1000, 300, 100, 30, 10]
      .filter((seconds) => seconds < longest && seconds > shortest)
      .map((seconds) => ({ at: x(seconds), label: formatNumber(seconds, 0, { unit: 's' }) })),
    amplitudeTicks: [0.01, 0.1, 1, 10]
      .filter((arcsec) => arcsec <= highest)
      .map((arcsec) => ({ at: y(arcsec), label: formatNumber(arcsec, arcsec < 0.1 ? 2 : arcsec < 1 ? 1 : 0) })),
  }
}

/** The largest amplitude in each pixel column, closed along the bottom: an average would hide single peaks. */
function leftOver(
  { frequencyHz, afterArcsec }: AnalysisViews['spectrum'],
  x: (s: number) => number,
  y: (a: number) => number,
) {
  const peaks = new Map<number, number>()
  for (let i = 0; i < frequencyHz.length; i++) {
    const column = frequencyHz[i] > 0 ? Math.round(x(1 / frequencyHz[i])) : NaN
    if (!(column >= PLOT.left && column <= PLOT.right) || !Number.isFinite(afterArcsec[i])) continue
    peaks.set(column, Math.max(peaks.get(column) ?? 0, afterArcsec[i]))
  }
  const columns = [...peaks.keys()].sort((a, b) => a - b)
  if (columns.length < 2) return ''
  const outline = columns.map((column) => `L${column} ${short(y(Math.max(peaks.get(column)!, LOWEST_ARCSEC)))}`)
  return `M${columns[0]} ${PLOT.bottom}${outline.join('')}L${columns.at(-1)} ${PLOT.bottom}Z`
}

function orderTicks(wormPeriodSeconds: number, shortestSeconds: number, x: (s: number) => number): Tick[] {
  return [1, 2, 3, 4, 6, 8, 12, 24, 48, 96]
    .filter((order) => wormPeriodSeconds / order > shortestSeconds)
    .map((order) => ({ at: x(wormPeriodSeconds / order), label: formatNumber(order, 0) }))
}

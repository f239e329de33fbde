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

const WIDE = { width: 760, height: 262, plot: { left: 58, right: 752, top: 58, bottom: 216 } }
const NARROW = { width: 344, height: 268, plot: { left: 48, right: 338, top: 58, bottom: 222 } }
/** Numbers along the top that come nearer than this meet. */
const ORDER_SPACING = 17
const LOWEST_ARCSEC = 0.01

export function landingStems(
  result: AnalysisResult,
  { spectrum }: AnalysisViews,
  { isNarrow }: { isNarrow: boolean },
): LandingStems {
  const frame = isNarrow ? NARROW : WIDE
  const { plot } = frame
  const { worm, lines, run } = result
  const longest = 1 / Math.max(spectrum.frequencyHz.find((f) => f > 0) ?? 0, 1 / run.durationSeconds)
  const shortest = Math.max(1 / (spectrum.frequencyHz.at(-1) ?? 1), run.shortestPeriodSeconds)
  const swings = [
    ...(worm?.harmonics ?? []).map((harmonic) => ({
      periodSeconds: harmonic.periodSeconds,
      amplitudeArcsec: harmonic.amplitudeArcsec.value,
      // On a phone the colour says whose multiple it is.
      label: harmonic.order === 1 ? 'worm' : `${isNarrow ? '' : 'worm '}×${harmonic.order}`,
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
  const x = logScale([longest, shortest], [plot.left, plot.right])
  const y = logScale([LOWEST_ARCSEC, highest], [plot.bottom, plot.top])
  const stems = swings.map(({ periodSeconds, amplitudeArcsec, label, kind }) => ({
    x: x(periodSeconds),
    y: y(Math.max(amplitudeArcsec, LOWEST_ARCSEC)),
    label,
    kind,
  }))
  const places = placeStemLabels(stems, { ...plot, top: 0 })
  return {
    ...frame,
    leftOverPath: leftOver(spectrum, { x, y, plot }),
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
  { x, y, plot }: { x: (s: number) => number; y: (a: number) => number; plot: PlotBox },
) {
  const peaks = new Map<number, number>()
  for (let i = 0; i < frequencyHz.length; i++) {
    const column = frequencyHz[i] > 0 ? Math.round(x(1 / frequencyHz[i])) : NaN
    if (!(column >= plot.left && column <= plot.right) || !Number.isFinite(afterArcsec[i])) continue
    peaks.set(column, Math.max(peaks.get(column) ?? 0, afterArcsec[i]))
  }
  const columns = [...peaks.keys()].sort((a, b) => a - b)
  if (columns.length < 2) return ''
  const outline = columns.map((column) => `L${column} ${short(y(Math.max(peaks.get(column)!, LOWEST_ARCSEC)))}`)
  return `M${columns[0]} ${plot.bottom}${outline.join('')}L${columns.at(-1)} ${plot.bottom}Z`
}

function orderTicks(wormPeriodSeconds: number, shortestSeconds: number, x: (s: number) => number): Tick[] {
  return [1, 2, 3, 4, 6, 8, 12, 24, 48, 96]
    .filter((order) => wormPeriodSeconds / order > shortestSeconds)
    .map((order) => ({ at: x(wormPeriodSeconds / order), label: formatNumber(order, 0) }))
    .reduce<Tick[]>(
      (kept, tick) => (tick.at - (kept.at(-1)?.at ?? -Infinity) < ORDER_SPACING ? kept : [...kept, tick]),
      [],
    )
}

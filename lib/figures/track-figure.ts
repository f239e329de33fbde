import type { Annotation, Layout, Shape } from 'plotly.js-dist-min'
import type { AnalysisResult, AnalysisViews, ExcludedSpan } from '@/lib/analysis/types'
import {
  displacementFactor,
  displacementUnitOf,
  displacementUnitWord,
  PLAIN_DISPLAY,
  scaledValues,
  type Display,
} from '@/lib/display-units'
import { withSpace } from '@/lib/units'
import { withAlpha } from './chart-colors'
import {
  axisNote,
  baseAxis,
  baseLayout,
  extent,
  isNarrow,
  noteMark,
  plotWidth,
  type Figure,
  type FigureFrame,
} from './figure'
import { minuteTicks, niceTicks } from './ticks'

const SECONDS = 60

export interface TrackFigureInput {
  result: AnalysisResult
  track: AnalysisViews['track']
  excludedSpans: readonly ExcludedSpan[]
  notes: readonly { number: number; timeSeconds: number; isSettled?: boolean }[]
  /** Said beside "ahead" while the sense is only assumed; else empty. */
  senseMark: string
  /** The unit of the displacement; arc seconds unless given. */
  display?: Display
  frame: FigureFrame
}

/** Displacement on the axis against minutes into the run: recorded thin, fit thick, drift dashed, gaps shaded. */
export function trackFigure(input: TrackFigureInput): Figure {
  const { result, frame, senseMark, display = PLAIN_DISPLAY } = input
  const track = shownTrack(input.track, display)
  const unit = displacementUnitWord(display)
  const { colors } = frame
  const margin = { l: 52, r: 14, t: 44, b: 44 }
  const extentSeconds = trackExtentSeconds(result, track)
  const whole: [number, number] = [extentSeconds[0] / SECONDS, extentSeconds[1] / SECONDS]
  const range = frame.zoom ?? whole
  const [low, high] = extent(track.recordedArcsec, track.fittedArcsec, track.driftArcsec)
  const pad = Math.max(high - low, 1e-6)
  const strayRange: [number, number] = [low - 0.25 * pad, high + 0.25 * pad]
  const [strayLow, strayHigh] = extent(track.strayArcsec)
  const hasStrays = track.strayArcsec.length > 0
  const yRange: [number, number] = [
    (hasStrays ? Math.max(strayRange[0], Math.min(low, strayLow)) : low) - 0.06 * pad,
    (hasStrays ? Math.min(strayRange[1], Math.max(high, strayHigh)) : high) + 0.16 * pad,
  ]
  const yTicks = niceTicks(yRange, 5, { isSigned: true })
  const xTicks = minuteTicks(range, Math.max(2, Math.floor(plotWidth(frame, margin) / (isNarrow(frame) ? 48 : 90))))
  const minutes = toMinutes(track.timeSeconds)
  const modelMinutes = toMinutes(track.modelTimeSeconds)
  const marks = input.notes.map((note) => noteMark({ ...note, x: note.timeSeconds / SECONDS }, frame))
  const turns = turnMarks(input, range)
  const layout: Partial<Layout> = {
    ...baseLayout(frame, { heightPx: isNarrow(frame) ? 250 : 272, margin }),
    xaxis: {
      ...baseAxis(frame),
      range,
      tickvals: xTicks.values,
      ticktext: xTicks.labels,
      ticklen: 4,
      tickcolor: colors.soft,
      showline: true,
      hoverformat: '.2f',
      unifiedhovertitle: { text: '%{x:.2f} min' },
    },
    yaxis: {
      ...baseAxis(frame),
      range: yRange,
      tickvals: yTicks.values,
      ticktext: yTicks.labels,
      showgrid: true,
    },
    shapes: [...shades(input), ...turns.shapes, ...marks.flatMap(({ shapes }) => shapes)],
    annotations: [
      axisNote(`${unit} on the axis, ahead is up${senseMark}`, frame, {
        x: 0,
        y: 1,
        xanchor: 'left',
        xshift: -44,
        yshift: 22,
      }),
      axisNote('minutes into the run', frame, { x: 1, y: 0, xanchor: 'right', yanchor: 'top', yshift: -24 }),
      ...turns.annotations,
      ...marks.map(({ annotation }) => annotation),
    ],
  }
  const mark = withSpace(displacementUnitOf(display))
  const value = `%{y:+.2f}${mark}`
  return {
    layout,
    data: [
      {
        type: 'scatter',
        mode: 'lines',
        name: 'recorded',
        x: minutes,
        y: track.recordedArcsec,
        connectgaps: false,
        line: { color: colors.steel, width: 1 },
        hovertemplate: value,
      },
      {
        type: 'scatter',
        mode: 'lines',
        name: 'drift',
        x: modelMinutes,
        y: track.driftArcsec,
        line: { color: colors.verdigris, width: 1.75, dash: 'dash' },
        hovertemplate: value,
      },
      {
        type: 'scatter',
        mode: 'lines',
        name: 'fitted',
        x: modelMinutes,
        y: track.fittedArcsec,
        line: { color: colors.brass, width: 2.25 },
        hovertemplate: value,
      },
      {
        type: 'scatter',
        mode: 'markers',
        name: 'left out',
        x: toMinutes(track.strayTimeSeconds),
        y: track.strayArcsec.map((stray) => Math.min(Math.max(stray, yRange[0] + 0.02 * pad), yRange[1] - 0.02 * pad)),
        customdata: track.strayArcsec,
        marker: { symbol: 'x-thin', size: 8, color: colors.oxide, line: { color: colors.oxide, width: 1.5 } },
        hovertemplate: `%{customdata:+.2f}${mark}`,
      },
    ],
    table: {
      columns: [
        { name: 'time_seconds', values: track.timeSeconds },
        { name: `recorded_${unit}`, values: track.recordedArcsec },
        { name: 'model_time_seconds', values: track.modelTimeSeconds },
        { name: `fitted_${unit}`, values: track.fittedArcsec },
        { name: `drift_${unit}`, values: track.driftArcsec },
        { name: 'stray_time_seconds', values: track.strayTimeSeconds },
        { name: `stray_${unit}`, values: track.strayArcsec },
      ],
    },
    x: { range, isLog: false, marginLeftPx: margin.l, marginRightPx: margin.r },
  }
}

function shownTrack(track: AnalysisViews['track'], display: Display): AnalysisViews['track'] {
  const factor = displacementFactor(display)
  return {
    ...track,
    recordedArcsec: scaledValues(track.recordedArcsec, factor),
    fittedArcsec: scaledValues(track.fittedArcsec, factor),
    driftArcsec: scaledValues(track.driftArcsec, factor),
    strayArcsec: scaledValues(track.strayArcsec, factor),
  }
}

/** What the whole picture shows, in seconds into the run. */
export function trackExtentSeconds({ run }: AnalysisResult, { timeSeconds }: AnalysisViews['track']): [number, number] {
  const [first, last] = extent(timeSeconds)
  return [Math.min(run.firstUsedTimeSeconds, first), Math.max(run.lastUsedTimeSeconds, last)]
}

function toMinutes(seconds: Float64Array): Float64Array {
  return seconds.map((each) => each / SECONDS)
}

function shades({ result, excludedSpans, frame }: TrackFigureInput): Partial<Shape>[] {
  return [...result.run.gaps, ...excludedSpans].map(({ startSeconds, endSeconds }) => ({
    type: 'rect',
    layer: 'below',
    xref: 'x',
    x0: startSeconds / SECONDS,
    x1: endSeconds / SECONDS,
    yref: 'paper',
    y0: 0,
    y1: 1,
    fillcolor: withAlpha(frame.colors.rule, 0.6),
    line: { width: 0 },
  }))
}

/** A dotted line at every start of a turn, and the turn's number before its end where there is room. */
function turnMarks({ track, frame, result }: TrackFigureInput, range: [number, number]) {
  const { colors } = frame
  const starts = track.turnStartSeconds.map((seconds) => seconds / SECONDS)
  const inside = starts.filter((start) => start > range[0] && start < range[1])
  const pixelsPerTurn = inside.length === 0 ? frame.widthPx : frame.widthPx / (inside.length + 1)
  const shapes = inside.map((start): Partial<Shape> => ({
    type: 'line',
    layer: 'below',
    xref: 'x',
    x0: start,
    x1: start,
    yref: 'paper',
    y0: 0,
    y1: 1,
    line: { color: colors.rule, width: 1, dash: 'dash' },
  }))
  const every = pixelsPerTurn >= 24 ? 1 : Math.ceil(24 / pixelsPerTurn)
  const annotations = starts.flatMap((start, index): Partial<Annotation>[] => {
    const end = Math.min(starts[index + 1] ?? result.run.lastUsedTimeSeconds / SECONDS, range[1])
    const hasRoom =
      ((end - Math.max(start, range[0])) / (range[1] - range[0])) * frame.widthPx >= Math.min(20, pixelsPerTurn)
    if (end <= range[0] || start >= range[1] || index % every !== 0 || !hasRoom) return []
    return [
      {
        text: pixelsPerTurn >= 64 ? `turn ${index + 1}` : String(index + 1),
        x: end,
        xref: 'x',
        xanchor: 'right',
        xshift: -4,
        y: 1,
        yref: 'paper',
        yanchor: 'top',
        showarrow: false,
        font: { size: 12, color: colors.soft },
      },
    ]
  })
  return { shapes, annotations }
}

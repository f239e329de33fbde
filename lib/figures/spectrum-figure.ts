import type { Annotation, Layout, ScatterData, Shape } from 'plotly.js-dist-min'
import type { AnalysisResult, AnalysisViews } from '@/lib/analysis/types'
import {
  displacementUnitOf,
  displacementUnitWord,
  PLAIN_DISPLAY,
  scaledValues,
  swingColumn,
  swingFactor,
  swingWord,
  type Display,
} from '@/lib/display-units'
import { formatProbability, withSpace } from '@/lib/units'
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
import { stemLabels, stemsOf, stemTraces, type PlotAxes, type Stem } from './spectrum-stems'
import { decadeTicks, orderTicks, periodTicks } from './ticks'

export interface SpectrumFigureInput {
  result: AnalysisResult
  spectrum: AnalysisViews['spectrum']
  chanceLevel: number
  isBeforeShown: boolean
  notes: readonly { number: number; periodSeconds: number; isSettled?: boolean }[]
  /** How swings are shown; the amplitudes of the core unless given. */
  display?: Display
  frame: FigureFrame
}

/** Log amplitude against log period, longest at the left: what the lines leave, what was before, lines as stems. */
export function spectrumFigure(input: SpectrumFigureInput): Figure {
  const { result, frame, isBeforeShown, display = PLAIN_DISPLAY } = input
  const spectrum = shownSpectrum(input.spectrum, display)
  const { colors } = frame
  const narrow = isNarrow(frame)
  const margin = { l: 52, r: 14, t: narrow ? 52 : 46, b: 44 }
  const heightPx = narrow ? 320 : 330
  const stems = stemsOf(result, display)
  const periods = spectrum.frequencyHz.map((frequency) => 1 / frequency)
  const [shortest, longest] = periodRange(periods, result.run.durationSeconds)
  const range = frame.zoom ?? ([longest, shortest] as [number, number])
  const yRange = amplitudeRange(spectrum, stems)
  const yLog: [number, number] = [Math.log10(yRange[0]), Math.log10(yRange[1])]
  const xLog: [number, number] = [Math.log10(range[0]), Math.log10(range[1])]
  const width = plotWidth(frame, margin)
  const wormPeriod = result.worm?.periodSeconds.value ?? null
  const yTicks = decadeTicks(yRange)
  const xTicks = periodTicks([range[1], range[0]], {
    firstSeconds: wormPeriod,
    widthPx: width,
    spacingPx: narrow ? 44 : 52,
  })
  const floor = (values: Float64Array) =>
    values.map((value) => (value > 0 ? Math.max(value, yRange[0] / 2) : yRange[0] / 2))
  const marks = input.notes.map((note) => noteMark({ ...note, x: note.periodSeconds, isLog: true }, frame))
  const ruler = wormPeriod === null ? null : rulerOf({ wormPeriod, range, width, frame })
  const axes = { xLog, yLog, width, heightPx: heightPx - margin.t - margin.b }
  const axisTitle = `${displacementUnitWord(display)} ${swingWord(display)}`
  const chance = chanceLabel({ ...input, spectrum }, axes)
  const layout: Partial<Layout> = {
    ...baseLayout(frame, { heightPx, margin }),
    hovermode: 'closest',
    xaxis: {
      ...baseAxis(frame),
      type: 'log',
      range: xLog,
      tickvals: xTicks.values,
      ticktext: xTicks.labels,
      ticklen: 4,
      tickcolor: colors.soft,
      showline: true,
    },
    yaxis: {
      ...baseAxis(frame),
      type: 'log',
      range: yLog,
      tickvals: yTicks.values,
      ticktext: yTicks.labels,
      showgrid: true,
    },
    shapes: [...(ruler?.shapes ?? []), ...marks.flatMap(({ shapes }) => shapes)],
    annotations: [
      axisNote(axisTitle, frame, {
        // On a phone the worm's own stem stands in the left corner.
        ...(narrow ? { x: 1, xanchor: 'right', xshift: -2 } : { x: 0, xanchor: 'left', xshift: 4 }),
        y: 1,
        yanchor: 'top',
        yshift: -2,
      }),
      axisNote('period', frame, { x: 1, y: 0, xanchor: 'right', yanchor: 'top', yshift: -24 }),
      ...(ruler?.annotations ?? []),
      chance.annotation,
      ...stemLabels(stems, { ...axes, taken: chance.box, axisTitle, frame }),
      ...marks.map(({ annotation }) => annotation),
    ],
  }
  const orders = wormPeriod === null ? null : spectrum.frequencyHz.map((frequency) => frequency * wormPeriod)
  const size = `%{x:.4~r} s<br>%{y:.3~r}${withSpace(displacementUnitOf(display))}`
  const hover = orders ? `order %{customdata:.3f}<br>${size}` : size
  const column = (curve: string) => `${curve}_${displacementUnitWord(display)}${endsOf(display)}`
  const curve = (name: string, y: Float64Array): Partial<ScatterData> => ({
    type: 'scatter',
    mode: 'lines',
    name,
    x: periods,
    y: floor(y),
    ...(orders ? { customdata: orders } : {}),
    hovertemplate: `${hover} ${name}<extra></extra>`,
  })
  return {
    layout,
    data: [
      ...(isBeforeShown
        ? [{ ...curve('before', spectrum.beforeArcsec), line: { color: colors.steel, width: 0.75 }, opacity: 0.5 }]
        : []),
      {
        ...curve('left after the lines', spectrum.afterArcsec),
        line: { color: colors.steel, width: 1.1 },
        fill: 'tozeroy',
        fillcolor: withAlpha(colors.steel, 0.16),
      },
      {
        ...curve('chance level', spectrum.chanceArcsec),
        line: { color: colors.oxide, width: 1.5, dash: 'dot' },
      },
      ...stemTraces(
        stems.filter(({ isWorm }) => !isWorm),
        { floor: yRange[0] / 2, line: colors.verdigris, dot: colors.verdigris, ring: colors.card, symbol: 'diamond' },
      ),
      ...stemTraces(
        stems.filter(({ isWorm }) => isWorm),
        { floor: yRange[0] / 2, line: colors.brass, dot: colors['brass-fill'], ring: colors.card, symbol: 'circle' },
      ),
    ],
    table: {
      columns: [
        { name: 'period_seconds', values: periods },
        ...(orders ? [{ name: 'order', values: orders }] : []),
        { name: column('before'), values: spectrum.beforeArcsec },
        { name: column('left'), values: spectrum.afterArcsec },
        { name: column('chance'), values: spectrum.chanceArcsec },
        { name: 'line_name', values: stems.map(({ name }) => name) },
        { name: 'line_period_seconds', values: stems.map(({ periodSeconds }) => periodSeconds) },
        { name: `line_${swingColumn(display)}`, values: stems.map(({ size }) => size) },
      ],
    },
    x: { range, isLog: true, marginLeftPx: margin.l, marginRightPx: margin.r },
  }
}

/** Every curve of a spectrum is a swing at each period, so all are shown by the same measure. */
function shownSpectrum(spectrum: AnalysisViews['spectrum'], display: Display): AnalysisViews['spectrum'] {
  const factor = swingFactor(display)
  return {
    frequencyHz: spectrum.frequencyHz,
    beforeArcsec: scaledValues(spectrum.beforeArcsec, factor),
    afterArcsec: scaledValues(spectrum.afterArcsec, factor),
    chanceArcsec: scaledValues(spectrum.chanceArcsec, factor),
  }
}

/** In heads of columns: amplitudes are meant unless said. */
function endsOf({ swingMeasure }: Display): string {
  return swingMeasure === 'peak-to-peak' ? '_peak_to_peak' : ''
}

/** The order ruler over the picture: swings per turn of the worm. */
function rulerOf({
  wormPeriod,
  range,
  width,
  frame,
}: {
  wormPeriod: number
  range: [number, number]
  width: number
  frame: FigureFrame
}) {
  const { colors } = frame
  const { labelled, plain } = orderTicks([wormPeriod / range[0], wormPeriod / range[1]], {
    widthPx: width,
    spacingPx: 26,
  })
  const tick = (order: number, length: number): Partial<Shape> => ({
    type: 'line',
    xref: 'x',
    x0: wormPeriod / order,
    x1: wormPeriod / order,
    yref: 'paper',
    yanchor: 1,
    ysizemode: 'pixel',
    y0: 21,
    y1: 21 - length,
    line: { color: colors.soft, width: 1 },
  })
  const baseline: Partial<Shape> = {
    type: 'line',
    xref: 'paper',
    x0: 0,
    x1: 1,
    yref: 'paper',
    yanchor: 1,
    ysizemode: 'pixel',
    y0: 21,
    y1: 21,
    line: { color: colors.soft, width: 1 },
  }
  const label = (order: number): Partial<Annotation> => ({
    text: String(order),
    x: Math.log10(wormPeriod / order),
    xref: 'x',
    y: 1,
    yref: 'paper',
    yanchor: 'bottom',
    yshift: 21,
    showarrow: false,
    font: { size: 12, color: colors.soft },
  })
  return {
    shapes: [baseline, ...labelled.map((order) => tick(order, 12)), ...plain.map((order) => tick(order, 6))],
    annotations: [
      axisNote('order', frame, { x: 0, y: 1, xanchor: 'right', xshift: -9, yshift: 21 }),
      ...labelled.map(label),
    ],
  }
}

/** Names the chance level where its curve enters the room of the words, and keeps that room free of other labels. */
function chanceLabel({ spectrum, chanceLevel, frame }: SpectrumFigureInput, axes: PlotAxes) {
  const odds = formatProbability(chanceLevel)
  const text = isNarrow(frame) ? 'chance' : `chance reaches this high ${odds.replace(/^1 in/, '1 time in')}`
  const { xLog, yLog, width, heightPx } = axes
  const leftPx = width - 7.3 * text.length
  const frequency = 10 ** -(xLog[0] + (leftPx / width) * (xLog[1] - xLog[0]))
  const index = spectrum.frequencyHz.findIndex((each) => each >= frequency)
  const level = spectrum.chanceArcsec[index < 0 ? spectrum.chanceArcsec.length - 1 : index]
  const share = level > 0 ? (Math.log10(level) - yLog[0]) / (yLog[1] - yLog[0]) : 0
  const yPx = (1 - Math.min(Math.max(share, 0), 0.92)) * heightPx
  const annotation: Partial<Annotation> = {
    text,
    x: 1,
    xref: 'paper',
    xanchor: 'right',
    y: 1 - yPx / heightPx,
    yref: 'paper',
    yanchor: 'bottom',
    yshift: 2,
    showarrow: false,
    font: { size: 12, color: frame.colors.soft },
  }
  return { annotation, box: { left: leftPx, right: width, top: yPx - 20, bottom: yPx } }
}

/** Not longer than the run: nothing is known of what takes longer. */
function periodRange(periods: Float64Array, durationSeconds: number): [number, number] {
  const [shortest, longest] = extent(periods)
  const end = durationSeconds > 2 * shortest ? Math.min(longest, durationSeconds) : longest
  return shortest < end ? [shortest, end] : [shortest / 2, longest * 2]
}

/** What the whole picture shows, in seconds, the shorter period first. */
export function spectrumExtentSeconds({ run }: AnalysisResult, spectrum: AnalysisViews['spectrum']): [number, number] {
  return periodRange(
    spectrum.frequencyHz.map((frequency) => 1 / frequency),
    run.durationSeconds,
  )
}

/** From a third of a decade over the largest swing down to where the noise lies, at most four decades. */
function amplitudeRange(spectrum: AnalysisViews['spectrum'], stems: readonly Stem[]): [number, number] {
  const largest = Math.max(extent(spectrum.beforeArcsec)[1], ...stems.map(({ size }) => size))
  const chance = extent(spectrum.chanceArcsec)
  const high = Math.max(largest, chance[1]) * 2.2
  const noise = Math.max(chance[0] / 12, high / 1e4)
  const power = Math.floor(Math.log10(noise))
  const low = noise >= 3 * 10 ** power ? 3 * 10 ** power : 10 ** power
  return [low, high]
}

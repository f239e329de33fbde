import type { Annotation, Layout, Shape } from 'plotly.js-dist-min'
import type { AnalysisViews } from '@/lib/analysis/types'
import {
  displacementFactor,
  displacementUnitOf,
  displacementUnitWord,
  PLAIN_DISPLAY,
  scaledValues,
  type Display,
} from '@/lib/display-units'
import { withSpace } from '@/lib/units'
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
import { niceTicks, type Ticks } from './ticks'

export interface TurnFigureInput {
  turn: NonNullable<AnalysisViews['turn']>
  senseMark: string
  /** The unit of the displacement; arc seconds unless given. */
  display?: Display
  notes: readonly { number: number; angleDegrees: number; isSettled?: boolean }[]
  frame: FigureFrame
}

/** Every turn over the worm angle, thin, and the fitted curve, thick. */
export function turnFigure(input: TurnFigureInput): Figure {
  const { frame, notes, senseMark, display = PLAIN_DISPLAY } = input
  const turn = shownTurn(input.turn, display)
  const unit = displacementUnitWord(display)
  const { colors } = frame
  // The numbers of the notes stand between the title and the picture.
  const noteRoom = notes.length > 0 ? 12 : 0
  const margin = { l: 40, r: 22, t: 34 + noteRoom, b: 44 }
  const range = frame.zoom ?? ([0, 360] as [number, number])
  const yRange = padded(extent(turn.curveArcsec, ...turn.turns.map(({ arcsec }) => arcsec)))
  const yTicks = niceTicks(yRange, 6, { isSigned: true })
  const xTicks = angleTicks(range, plotWidth(frame, margin))
  const marks = notes.map((note) => noteMark({ ...note, x: note.angleDegrees }, frame))
  const layout: Partial<Layout> = {
    ...baseLayout(frame, { heightPx: frame.widthPx < 420 ? 280 : 350, margin }),
    hovermode: 'closest',
    xaxis: {
      ...baseAxis(frame),
      range,
      tickvals: xTicks.values,
      ticktext: xTicks.labels,
      ticklen: 4,
      tickcolor: colors.soft,
      showline: true,
    },
    yaxis: { ...baseAxis(frame), range: yRange, tickvals: yTicks.values, ticktext: yTicks.labels, showgrid: true },
    shapes: marks.flatMap(({ shapes }) => shapes),
    annotations: [
      axisNote(`${unit}, ahead is up${senseMark}`, frame, {
        x: 0,
        y: 1,
        xanchor: 'left',
        xshift: -34,
        yshift: 14 + noteRoom,
      }),
      axisNote('worm angle from run start', frame, { x: 1, y: 0, xanchor: 'right', yanchor: 'top', yshift: -24 }),
      ...marks.map(({ annotation }) => annotation),
    ],
  }
  const hover = `%{x:.1f}°<br>%{y:+.2f}${withSpace(displacementUnitOf(display))}`
  return {
    layout,
    data: [
      ...turn.turns.map(
        ({ turnNumber, angleDegrees, arcsec }) =>
          ({
            type: 'scatter',
            mode: 'lines',
            name: `turn ${turnNumber}`,
            x: angleDegrees,
            y: arcsec,
            connectgaps: false,
            opacity: 0.75,
            line: { color: colors.steel, width: 0.9 },
            hovertemplate: `${hover} turn ${turnNumber}<extra></extra>`,
          }) as const,
      ),
      {
        type: 'scatter',
        mode: 'lines',
        name: 'fitted',
        x: turn.angleDegrees,
        y: turn.curveArcsec,
        line: { color: colors.brass, width: 2.75 },
        hovertemplate: `${hover} fitted<extra></extra>`,
      },
    ],
    table: {
      columns: [
        { name: 'worm_angle_degrees', values: turn.angleDegrees },
        { name: `fitted_${unit}`, values: turn.curveArcsec },
        ...turn.turns.flatMap(({ turnNumber, angleDegrees, arcsec }) => [
          { name: `turn_${turnNumber}_angle_degrees`, values: angleDegrees },
          { name: `turn_${turnNumber}_${unit}`, values: arcsec },
        ]),
      ],
    },
    x: { range, isLog: false, marginLeftPx: margin.l, marginRightPx: margin.r },
  }
}

/** The turns in the unit of the display; the table’s values keep their own. */
export function shownTurn(
  turn: NonNullable<AnalysisViews['turn']>,
  display: Display,
): NonNullable<AnalysisViews['turn']> {
  const factor = displacementFactor(display)
  return {
    ...turn,
    curveArcsec: scaledValues(turn.curveArcsec, factor),
    turns: turn.turns.map((each) => ({ ...each, arcsec: scaledValues(each.arcsec, factor) })),
  }
}

export interface SlipFigureInput {
  slip: NonNullable<AnalysisViews['slip']>
  slipForTenPercentDegrees: number
  slipForNoHelpDegrees: number
  frame: FigureFrame
}

/** Share of the swing that is left when the table is played late (positive) or early. */
export function slipFigure({ slip, slipForTenPercentDegrees, slipForNoHelpDegrees, frame }: SlipFigureInput): Figure {
  const { colors } = frame
  const margin = { l: 52, r: 22, t: 26, b: 44 }
  const whole = extent(slip.slipDegrees)
  const range = frame.zoom ?? whole
  const high = Math.max(1.1, extent(slip.shareLeft)[1] * 1.05)
  const yTicks = niceTicks([0, high], 4)
  const xTicks = angleTicks(range, plotWidth(frame, margin), true)
  const narrow = isNarrow(frame)
  const marks = [-slipForTenPercentDegrees, slipForTenPercentDegrees].filter((at) => at >= whole[0] && at <= whole[1])
  const word = (text: string, place: Partial<Annotation>): Partial<Annotation> => ({
    text,
    yref: 'y',
    y: 1,
    yanchor: 'bottom',
    showarrow: false,
    font: { size: 12, color: colors.soft },
    ...place,
  })
  // To the right of the mark the curve is still low, so the words above the limit stand clear of it.
  const words = [
    ...(marks.length === 2
      ? [
          word(`${narrow ? '' : 'a tenth back at '}±${slipForTenPercentDegrees.toFixed(1)}°`, {
            x: slipForTenPercentDegrees,
            xanchor: 'left',
            xshift: 4,
            yref: 'paper',
            yanchor: 'top',
          }),
        ]
      : []),
    word(narrow ? 'no help' : `no help beyond ±${slipForNoHelpDegrees.toFixed(0)}°`, {
      x: -slipForTenPercentDegrees,
      xanchor: 'right',
      xshift: -6,
    }),
  ]
  const layout: Partial<Layout> = {
    ...baseLayout(frame, { heightPx: 190, margin }),
    hovermode: 'closest',
    xaxis: {
      ...baseAxis(frame),
      range,
      tickvals: xTicks.values,
      ticktext: xTicks.labels,
      ticklen: 4,
      tickcolor: colors.soft,
      showline: true,
    },
    yaxis: {
      ...baseAxis(frame),
      range: [0, high],
      tickvals: yTicks.values,
      ticktext: yTicks.values.map((value) => `${Math.round(100 * value)} %`),
      showgrid: true,
    },
    shapes: [
      {
        type: 'line',
        xref: 'paper',
        x0: 0,
        x1: 1,
        yref: 'y',
        y0: 1,
        y1: 1,
        line: { color: colors.oxide, width: 1.5, dash: 'dot' },
      },
      ...marks.map((at): Partial<Shape> => ({
        type: 'line',
        xref: 'x',
        x0: at,
        x1: at,
        yref: 'paper',
        y0: 0,
        y1: 1,
        line: { color: colors.verdigris, width: 1, dash: 'dash' },
      })),
    ],
    annotations: [
      axisNote('RMS of the swing left', frame, { x: 0, y: 1, xanchor: 'left', xshift: -44, yshift: 6 }),
      axisNote('slip of the worm angle', frame, { x: 1, y: 0, xanchor: 'right', yanchor: 'top', yshift: -24 }),
      ...words,
    ],
  }
  return {
    layout,
    data: [
      {
        type: 'scatter',
        mode: 'lines',
        name: 'left',
        x: slip.slipDegrees,
        y: slip.shareLeft,
        line: { color: colors.brass, width: 2.25 },
        hovertemplate: '%{x:+.1f}° of slip<br>%{y:.0%} left<extra></extra>',
      },
    ],
    table: {
      columns: [
        { name: 'slip_degrees', values: slip.slipDegrees },
        { name: 'share_left', values: slip.shareLeft },
      ],
    },
    x: { range, isLog: false, marginLeftPx: margin.l, marginRightPx: margin.r },
  }
}

/** Quarter turns while all of them are seen, else round steps. */
function angleTicks(range: [number, number], widthPx: number, isSigned = false): Ticks {
  const span = range[1] - range[0]
  if (span < 180) return niceTicks(range, Math.max(2, Math.floor(widthPx / 70)), { isSigned, unit: '°' })
  const first = Math.ceil(range[0] / 90)
  const values = Array.from({ length: Math.floor(range[1] / 90) - first + 1 }, (_, i) => (first + i) * 90 + 0)
  const sign = (value: number) => (value < 0 ? '−' : isSigned && value > 0 ? '+' : '')
  return { values, labels: values.map((value) => `${sign(value)}${Math.abs(value)}°`) }
}

function padded([low, high]: [number, number]): [number, number] {
  const pad = 0.08 * Math.max(high - low, 1e-6)
  return [low - pad, high + pad]
}

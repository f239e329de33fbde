import type { Annotation, Layout, LayoutAxis, ScatterData, Shape } from 'plotly.js-dist-min'
import type { ChartColors } from './chart-colors'
import type { FigureTable } from './figure-table'

/** One Plotly picture of `scatter` traces, and the numbers in it. */
export interface Figure {
  data: Partial<ScatterData>[]
  layout: Partial<Layout>
  table: FigureTable
  /** The x axis as it is drawn, so that a place on the screen can be told in data units. */
  x: { range: [number, number]; isLog: boolean; marginLeftPx: number; marginRightPx: number }
}

/** What a figure must know of the place it is drawn in. */
export interface FigureFrame {
  colors: ChartColors
  widthPx: number
  /** Part of the x axis to show, in the units of the axis; null: all of it. */
  zoom: [number, number] | null
}

export interface Margins {
  l: number
  r: number
  t: number
  b: number
}

export const MONO = "'Atkinson Hyperlegible Mono Variable', ui-monospace, monospace"
export const SANS = "'Atkinson Hyperlegible Next Variable', ui-sans-serif, system-ui, sans-serif"

const NARROW_PX = 560

export function isNarrow({ widthPx }: FigureFrame): boolean {
  return widthPx < NARROW_PX
}

/** Width of the area inside the axes. */
export function plotWidth({ widthPx }: FigureFrame, margin: Margins): number {
  return Math.max(40, widthPx - margin.l - margin.r)
}

export function baseLayout(
  frame: FigureFrame,
  { heightPx, margin }: { heightPx: number; margin: Margins },
): Partial<Layout> {
  const { colors } = frame
  return {
    width: frame.widthPx,
    height: heightPx,
    margin: { ...margin, pad: 0 },
    autosize: false,
    showlegend: false,
    dragmode: false,
    hovermode: 'x unified',
    hoverdistance: 24,
    paper_bgcolor: 'rgba(0,0,0,0)',
    plot_bgcolor: 'rgba(0,0,0,0)',
    font: { family: MONO, size: 12, color: colors.soft },
    hoverlabel: {
      bgcolor: colors.card,
      bordercolor: colors.steel,
      font: { family: MONO, size: 12, color: colors.ink },
    },
    colorway: [colors.steel],
    separators: '. ',
  }
}

export function baseAxis({ colors }: FigureFrame): Partial<LayoutAxis> {
  return {
    fixedrange: true,
    automargin: false,
    zeroline: false,
    showgrid: false,
    showline: false,
    ticks: 'outside',
    ticklen: 5,
    linecolor: colors.soft,
    tickcolor: 'rgba(0,0,0,0)',
    gridcolor: colors.faint,
    tickfont: { family: MONO, size: 12, color: colors.soft },
    // Plotly sets its spikes on white, whatever the theme.
    showspikes: false,
  }
}

/** Names an axis where the picture has room for it, instead of turned by a quarter along it. */
export function axisNote(
  text: string,
  frame: FigureFrame,
  place: {
    x: number
    y: number
    xanchor: 'left' | 'right'
    yanchor?: 'top' | 'bottom'
    xshift?: number
    yshift?: number
  },
): Partial<Annotation> {
  return {
    text,
    xref: 'paper',
    yref: 'paper',
    showarrow: false,
    yanchor: 'bottom',
    font: { family: MONO, size: 12, color: frame.colors.soft },
    ...place,
  }
}

/**
 * A note's number in a plum box at the upper edge, and its line down through the picture; of a settled note both are dashed
 * and the box is hollow.
 */
export function noteMark(
  mark: { number: number; x: number; isLog?: boolean; isSettled?: boolean },
  frame: FigureFrame,
): { annotation: Partial<Annotation>; shapes: Partial<Shape>[] } {
  const { colors } = frame
  const { isSettled = false } = mark
  const line = {
    color: colors.plum,
    width: isSettled ? 1 : 1.5,
    dash: isSettled ? ('dash' as const) : ('solid' as const),
  }
  return {
    annotation: {
      text: String(mark.number),
      // Unlike shapes, annotations want the logarithm on a log axis.
      x: mark.isLog ? Math.log10(mark.x) : mark.x,
      xref: 'x',
      y: 1,
      yref: 'paper',
      yanchor: 'bottom',
      showarrow: false,
      ...(isSettled ? {} : { bgcolor: colors.card, bordercolor: colors.plum, borderwidth: 1.5 }),
      borderpad: 2,
      font: { family: MONO, size: 11, color: colors.ink },
    },
    shapes: [
      { type: 'line', xref: 'x', x0: mark.x, x1: mark.x, yref: 'paper', y0: 0, y1: 1, line },
      ...(isSettled ? [dashedBox(mark, line)] : []),
    ],
  }
}

/** Annotations have no dashed border, so the box of a settled note is drawn, as large as that of an open one. */
function dashedBox({ x, number }: { x: number; number: number }, line: Shape['line']): Partial<Shape> {
  const halfPx = 4 + 3.5 * String(number).length
  return {
    type: 'rect',
    xref: 'x',
    xsizemode: 'pixel',
    xanchor: x,
    x0: -halfPx,
    x1: halfPx,
    yref: 'paper',
    ysizemode: 'pixel',
    yanchor: 1,
    y0: 1,
    y1: 18,
    line: { ...line, dash: 'dot' },
  }
}

/** The smallest and largest finite value of some series; 0 and 1 where there is none. */
export function extent(...series: readonly ArrayLike<number>[]): [number, number] {
  let low = Infinity
  let high = -Infinity
  for (const values of series) {
    for (let i = 0; i < values.length; i++) {
      const value = values[i]
      if (Number.isFinite(value)) {
        if (value < low) low = value
        if (value > high) high = value
      }
    }
  }
  return low <= high ? [low, high] : [0, 1]
}

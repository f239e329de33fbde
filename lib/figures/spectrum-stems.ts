import type { Annotation, ScatterData } from 'plotly.js-dist-min'
import type { AnalysisResult } from '@/lib/analysis/types'
import { displacementUnitOf, PLAIN_DISPLAY, swingFactor, type Display } from '@/lib/display-units'
import { harmonicName, withinSentence } from '@/lib/findings/words'
import { formatNumber, formatPeriod } from '@/lib/units'
import { withAlpha } from './chart-colors'
import { isNarrow, SANS, type FigureFrame } from './figure'
import { placeLabels, type Box } from './place-labels'

/** A swing that was found, as it stands in the spectrum. */
export interface Stem {
  periodSeconds: number
  /** As it is shown: amplitude or peak-to-peak, in arc seconds or pixels. */
  size: number
  name: string
  isWorm: boolean
  hover: string
}

/** The worm's harmonics and the lines beside them; what has no amplitude cannot stand on a log axis. */
export function stemsOf({ worm, lines }: AnalysisResult, display: Display = PLAIN_DISPLAY): Stem[] {
  const factor = swingFactor(display)
  const written = (size: number) => formatNumber(size, 3, { unit: displacementUnitOf(display) })
  const ofWorm = (worm?.harmonics ?? []).map(({ order, periodSeconds, amplitudeArcsec }): Stem => ({
    periodSeconds,
    size: amplitudeArcsec.value * factor,
    name: harmonicName(order),
    isWorm: true,
    hover: `order ${order}<br>${formatPeriod(periodSeconds)}<br>${written(amplitudeArcsec.value * factor)}`,
  }))
  const others = lines.map(({ order, periodSeconds, amplitudeArcsec, source }): Stem => ({
    periodSeconds: periodSeconds.value,
    size: amplitudeArcsec.value * factor,
    name: source === null ? 'unexplained' : withinSentence(source),
    isWorm: false,
    hover: `${order ? `order ${formatNumber(order.value, 3)}<br>` : ''}${formatPeriod(periodSeconds.value)}<br>${written(amplitudeArcsec.value * factor)}`,
  }))
  return [...ofWorm, ...others].filter(({ size }) => size > 0)
}

/** The stems themselves, then their dots with what a pointer reads there. */
export function stemTraces(
  stems: readonly Stem[],
  look: { floor: number; line: string; dot: string; ring: string; symbol: 'circle' | 'diamond' },
): Partial<ScatterData>[] {
  if (stems.length === 0) return []
  return [
    {
      type: 'scatter',
      mode: 'lines',
      hoverinfo: 'skip',
      x: stems.flatMap(({ periodSeconds }) => [periodSeconds, periodSeconds, null]),
      y: stems.flatMap(({ size }) => [look.floor, size, null]),
      line: { color: look.line, width: 2 },
    },
    {
      type: 'scatter',
      mode: 'markers',
      x: stems.map(({ periodSeconds }) => periodSeconds),
      y: stems.map(({ size }) => size),
      text: stems.map(({ hover, name }) => `${hover} ${name}`),
      // The second box that Plotly would put the name into stands on white, whatever the theme.
      hovertemplate: '%{text}<extra></extra>',
      marker: { color: look.dot, size: 10, symbol: look.symbol, line: { color: look.ring, width: 1.5 } },
    },
  ]
}

/** The plotted area: logs of period and amplitude at its edges, and its size in pixels. */
export interface PlotAxes {
  xLog: [number, number]
  yLog: [number, number]
  width: number
  heightPx: number
}

/** Names of the stems, the tallest first, where no other name stands. */
export function stemLabels(
  stems: readonly Stem[],
  axes: PlotAxes & { taken: Box; axisTitle: string; frame: FigureFrame },
): Partial<Annotation>[] {
  const { xLog, yLog, width, heightPx, frame, taken, axisTitle } = axes
  const points = stems
    .map((stem) => ({
      stem,
      // On a phone the colour says whose multiple it is.
      text: isNarrow(frame) ? stem.name.replace(/^worm ×/, '×') : stem.name,
      xPx: ((Math.log10(stem.periodSeconds) - xLog[0]) / (xLog[1] - xLog[0])) * width,
      yPx: (1 - (Math.log10(stem.size) - yLog[0]) / (yLog[1] - yLog[0])) * heightPx,
    }))
    .filter(({ xPx }) => xPx >= 0 && xPx <= width)
    .sort((a, b) => b.stem.size - a.stem.size)
  // The name of the axis stands in the upper left corner, on a phone in the right one.
  const titleWidth = Math.max(128, 7.3 * axisTitle.length + 8)
  const left = isNarrow(frame) ? width - titleWidth : 0
  const blocked = [{ left, right: left + titleWidth, top: 0, bottom: 17 }, taken]
  return placeLabels(points, { widthPx: width, blocked, floorPx: heightPx }).map(
    ({ xPx, yPx, text, anchor, liftPx }) => {
      const stem = points.find((point) => point.xPx === xPx && point.text === text)?.stem
      return {
        text,
        x: xPx / width,
        xref: 'paper',
        xanchor: anchor === 'over' ? 'center' : anchor === 'right' ? 'left' : 'right',
        xshift: anchor === 'over' ? 0 : anchor === 'right' ? 7 : -7,
        y: 1 - yPx / heightPx,
        yref: 'paper',
        yanchor: anchor === 'over' ? 'bottom' : 'middle',
        yshift: liftPx + (anchor === 'over' ? 5 : 3),
        showarrow: false,
        // A curve that passes behind the word would strike it through.
        bgcolor: withAlpha(frame.colors.card, 0.8),
        borderpad: 0,
        font: {
          family: SANS,
          size: 13,
          weight: 600,
          color: stem?.isWorm ? frame.colors.brass : frame.colors.verdigris,
        },
      }
    },
  )
}

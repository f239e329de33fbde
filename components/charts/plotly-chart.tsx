'use client'

import { useEffect, useMemo, useRef, useState, type CSSProperties, type ReactNode } from 'react'
import type { ChartColors } from '@/lib/figures/chart-colors'
import type { Figure, FigureFrame } from '@/lib/figures/figure'
import { loadedPlotly, loadPlotly, type PlotlyParts } from './load-plotly'
import { MarkButtons, type ChartMark, type MarkLink } from './mark-buttons'
import { Picture, type SvgPicture } from './picture'
import { axisShare, useAxisDrag } from './use-axis-drag'
import { useChartColors } from './use-chart-colors'
import { useWidth } from './use-width'
import './plotly-chart.css'

const CONFIG = { displayModeBar: false, showTips: false, scrollZoom: false, doubleClick: false, responsive: false }

export interface PlotlyChartProps {
  /** For file names: “track”. */
  name: string
  /** The picture in words, for those who do not see it. */
  summary: string
  /** Makes the figure for a width, the colours of the theme and the part of the axis that is shown. */
  makeFigure: (frame: FigureFrame) => Figure
  legend?: ReactNode
  /** A stretch of the x axis was selected; `zoomIn` shows it alone. Without this a drag zooms at once. */
  onSelect?: (range: [number, number], zoomIn: () => void) => void
  /** A place on the x axis was clicked. */
  onPick?: (value: number) => void
  /** What the figure marks at the upper edge, in the units of its x axis. */
  marks?: readonly (ChartMark & { x: number })[]
  markLink?: MarkLink
  /** Shown below the picture: what to do with the selection. */
  children?: ReactNode
}

/** The one place where Plotly draws: client only, `scatter` traces, no buttons or colours but ours. */
export function PlotlyChart(props: PlotlyChartProps) {
  const { name, summary, makeFigure, legend, onSelect, onPick, marks = [], markLink, children } = props
  const holder = useRef<HTMLDivElement>(null)
  const widthPx = useWidth(holder)
  const colors = useChartColors()
  const [zoom, setZoom] = useState<[number, number] | null>(null)
  const { parts, fault } = usePlotly()
  const figure = useMemo(
    () => makeFigure({ widthPx: Math.max(widthPx, 240), colors, zoom }),
    [makeFigure, widthPx, colors, zoom],
  )
  const drag = useAxisDrag({
    axis: figure.x,
    onSelect: (range) => (onSelect ? onSelect(range, () => setZoom(range)) : setZoom(range)),
    onPick,
  })
  const toSvg = parts ? () => drawSvg(parts, figure, colors) : null

  return (
    <Picture
      name={name}
      legend={legend}
      table={figure.table}
      toSvg={toSvg}
      actions={
        zoom ? (
          <button
            type="button"
            onClick={() => setZoom(null)}
            className="mr-2 rounded-control border border-rule px-2 py-0.5 text-ink hover:bg-faint pointer-coarse:min-h-11"
          >
            Show all of it
          </button>
        ) : null
      }
    >
      <div className="relative">
        <div
          ref={holder}
          role="img"
          aria-label={summary}
          aria-busy={parts === null}
          className="plotly-chart relative touch-pan-y select-none"
          style={{ height: figure.layout.height, '--shape': `${widthPx} / ${figure.layout.height}` } as CSSProperties}
          onDoubleClick={() => setZoom(null)}
          {...drag.handlers}
        >
          {parts && widthPx > 0 ? (
            <parts.Plot
              data={figure.data}
              layout={figure.layout}
              config={CONFIG}
              style={{ width: widthPx }}
              onInitialized={(_, plot) => makeScalable(plot)}
              onUpdate={(_, plot) => makeScalable(plot)}
            />
          ) : null}
          {fault ? (
            <p className="pt-8 text-soft">The drawing could not be loaded. Reload the page to try again.</p>
          ) : null}
          {drag.band ? (
            <div
              className="pointer-events-none absolute top-8 bottom-10 border-x border-brass bg-brass-fill opacity-30"
              style={{ left: drag.band.leftPx, width: drag.band.widthPx }}
            />
          ) : null}
        </div>
        {markLink && parts ? <MarkButtons marks={marksOver(figure, marks, widthPx)} link={markLink} /> : null}
      </div>
      {children}
    </Picture>
  )
}

/** Height of a mark’s box over the upper edge of the picture, to its middle. */
const MARK_MIDDLE_PX = 10

/** The marks that lie within what is shown, in pixels. */
function marksOver({ x, layout }: Figure, marks: readonly (ChartMark & { x: number })[], widthPx: number) {
  const { t = 0, b = 0 } = layout.margin ?? {}
  const inner = widthPx - x.marginLeftPx - x.marginRightPx
  const line = { top: t, height: (layout.height ?? 0) - t - b }
  return marks.flatMap((mark) => {
    const share = axisShare(mark.x, x)
    if (!(share >= 0 && share <= 1)) return []
    return [{ ...mark, left: `${x.marginLeftPx + share * inner}px`, top: `${t - MARK_MIDDLE_PX}px`, line }]
  })
}

/** On paper the drawing is scaled to the column (plotly-chart.css); for that it must say what its own size is. */
function makeScalable(plot: Readonly<HTMLElement>) {
  for (const svg of plot.querySelectorAll('.main-svg')) {
    svg.setAttribute('viewBox', `0 0 ${svg.getAttribute('width')} ${svg.getAttribute('height')}`)
  }
}

function usePlotly(): { parts: PlotlyParts | null; fault: boolean } {
  const [parts, setParts] = useState<PlotlyParts | null>(null)
  const [fault, setFault] = useState(false)
  useEffect(() => {
    let isGone = false
    const ready = loadedPlotly()
    const loading = ready ? Promise.resolve(ready) : loadPlotly()
    loading.then(
      (loaded) => !isGone && setParts(loaded),
      () => !isGone && setFault(true),
    )
    return () => {
      isGone = true
    }
  }, [])
  return { parts, fault }
}

async function drawSvg(parts: PlotlyParts, figure: Figure, colors: ChartColors): Promise<SvgPicture> {
  const width = figure.layout.width ?? 800
  const height = figure.layout.height ?? 300
  const layout = { ...figure.layout, paper_bgcolor: colors.card }
  const url = await parts.toImage({ data: figure.data, layout }, { format: 'svg', width, height })
  return { svg: decodeURIComponent(url.slice(url.indexOf(',') + 1)), width, height }
}

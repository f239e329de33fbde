'use client'

import { useState } from 'react'
import { extent } from '@/lib/figures/figure'
import type { TablePicture } from '@/lib/figures/table-picture'
import { niceTicks } from '@/lib/figures/ticks'
import { formatNumber } from '@/lib/units'
import { LegendEntry } from './picture'
import type { ChartMark, MarkLink } from './mark-buttons'
import { markStroke } from './mark-stroke'
import { SvgPicture } from './svg-picture'

const LINE_HEIGHT = 15
const LETTER_WIDTH = 7.3
const MARGIN = { left: 56, right: 22, top: 14, bottom: 52 }

interface TableChartProps {
  picture: TablePicture
  summary: string
  axisTitle: string
  angleTitle: string
  notes: readonly (ChartMark & { number: number; angleDegrees: number; isSettled: boolean })[]
  markLink: MarkLink
  isNarrow: boolean
}

/** The table bin by bin as bars, and the worm's own error as a dashed curve. */
export function TableChart({ picture, summary, axisTitle, angleTitle, notes, markLink, isNarrow }: TableChartProps) {
  const [pointed, setPointed] = useState<number | null>(null)
  const { bars, curve, unit } = picture
  // Drawn at about the size it is seen at, so that the letters keep theirs.
  const width = isNarrow ? 336 : 870
  const titleLines = wrapped(axisTitle, width - 24)
  const angleLines = wrapped(angleTitle, width - MARGIN.right - 12)
  // The numbers of the notes stand between the title and the bars.
  const extra = LINE_HEIGHT * (titleLines.length - 1) + (notes.length > 0 ? 14 : 0)
  const extraBelow = LINE_HEIGHT * (angleLines.length - 1)
  const height = 238 + extra + extraBelow
  const [low, high] = extent(
    bars.map(({ value }) => value),
    curve.map(({ value }) => value),
    [0],
  )
  const pad = 0.06 * Math.max(high - low, 1e-12)
  const plot = {
    left: MARGIN.left,
    right: width - MARGIN.right,
    top: MARGIN.top + extra,
    bottom: height - MARGIN.bottom - extraBelow,
  }
  const x = (angle: number) => plot.left + (angle / 360) * (plot.right - plot.left)
  const y = (value: number) => plot.bottom - ((value - low + pad) / (high - low + 2 * pad)) * (plot.bottom - plot.top)
  const ticks = niceTicks([low - pad, high + pad], 4, { isSigned: true })
  const gap = bars.length > 120 ? 0 : 1
  const barWidth = (plot.right - plot.left) / bars.length
  const hit = pointed === null ? null : bars.find(({ left }) => pointed >= left && pointed < left + 360 / bars.length)

  return (
    <SvgPicture
      name="correction"
      summary={summary}
      width={width}
      height={height}
      table={{
        columns: [
          { name: 'bin', values: bars.map(({ index }) => index) },
          { name: 'worm_angle_degrees', values: bars.map(({ angleDegrees }) => angleDegrees) },
          { name: `value_${picture.unitName}`, values: bars.map(({ value }) => value) },
        ],
      }}
      marks={notes.map((note) => ({ ...note, x: x(note.angleDegrees), y: plot.top }))}
      markLink={markLink}
      onPoint={(place) =>
        setPointed(
          place && place.x >= plot.left && place.x <= plot.right
            ? ((place.x - plot.left) / (plot.right - plot.left)) * 360
            : null,
        )
      }
      legend={
        <>
          <LegendEntry look="error">what the worm does</LegendEntry>
          <span className="figures text-xs">
            {hit
              ? `bin ${hit.index} at ${formatNumber(hit.angleDegrees, 1)}°: ${formatNumber(hit.value, 3, { isSigned: true })}${unit}`
              : null}
          </span>
        </>
      }
    >
      {titleLines.map((line, index) => (
        <text key={line} x="12" y={10 + LINE_HEIGHT * index} fontSize="12" className="figures fill-soft">
          {line}
        </text>
      ))}
      {ticks.values.map((value, index) => (
        <g key={value}>
          <line x1={plot.left} x2={plot.right} y1={y(value)} y2={y(value)} className="stroke-faint" />
          <text x={plot.left - 10} y={y(value) + 4} textAnchor="end" fontSize="12" className="figures fill-soft">
            {ticks.labels[index]}
          </text>
        </g>
      ))}
      <g className="opacity-80">
        {gap === 0 ? (
          // Bars that touch are drawn as one shape, which has no seams.
          <path
            d={`M${plot.left} ${y(0)}${bars.map((bar) => `V${y(bar.value)}H${x(bar.left) + barWidth}`).join('')}V${y(0)}Z`}
            className="fill-brass-fill"
          />
        ) : null}
        {bars.map((bar) =>
          gap === 0 && bar !== hit ? null : (
            <rect
              key={bar.index}
              x={x(bar.left) + gap}
              width={Math.max(barWidth - 2 * gap, 0.5)}
              y={Math.min(y(bar.value), y(0))}
              height={Math.max(Math.abs(y(bar.value) - y(0)), 0.5)}
              className={bar === hit ? 'fill-brass' : 'fill-brass-fill'}
            />
          ),
        )}
      </g>
      <line x1={plot.left} x2={plot.right} y1={y(0)} y2={y(0)} className="stroke-soft" />
      <polyline
        points={curve
          .map(({ angleDegrees, value }) => `${x(angleDegrees).toFixed(1)},${y(value).toFixed(1)}`)
          .join(' ')}
        fill="none"
        className="stroke-soft"
        strokeWidth="1.25"
        strokeDasharray="5 3"
      />
      {notes.map(({ id, number, angleDegrees, isSettled }) => (
        <g key={id}>
          <line
            x1={x(angleDegrees)}
            x2={x(angleDegrees)}
            y1={plot.top}
            y2={plot.bottom}
            className="stroke-plum"
            {...markStroke(isSettled)}
          />
          <rect
            x={x(angleDegrees) - 8}
            y={plot.top - 8}
            width="16"
            height="16"
            rx="3"
            className={isSettled ? 'fill-none stroke-plum' : 'fill-card stroke-plum'}
            {...markStroke(isSettled)}
          />
          <text x={x(angleDegrees)} y={plot.top + 4} textAnchor="middle" fontSize="11" className="figures fill-ink">
            {number}
          </text>
        </g>
      ))}
      <line x1={plot.left} x2={plot.right} y1={plot.bottom} y2={plot.bottom} className="stroke-soft" />
      {[0, 90, 180, 270, 360].map((angle) => (
        <g key={angle}>
          <line x1={x(angle)} x2={x(angle)} y1={plot.bottom} y2={plot.bottom + 4} className="stroke-soft" />
          <text x={x(angle)} y={plot.bottom + 19} textAnchor="middle" fontSize="12" className="figures fill-soft">
            {angle}°
          </text>
        </g>
      ))}
      {angleLines.map((line, index) => (
        <text
          key={line}
          x={plot.right}
          y={plot.bottom + 40 + LINE_HEIGHT * index}
          textAnchor="end"
          fontSize="12"
          className="figures fill-soft"
        >
          {line}
        </text>
      ))}
    </SvgPicture>
  )
}

/** Words in lines of at most this width, at the size of the axis titles. */
function wrapped(text: string, widthPx: number): string[] {
  const most = Math.floor(widthPx / LETTER_WIDTH)
  return text.split(' ').reduce<string[]>((lines, word) => {
    const last = lines.at(-1)
    if (last === undefined || last.length + 1 + word.length > most) return [...lines, word]
    return [...lines.slice(0, -1), `${last} ${word}`]
  }, [])
}

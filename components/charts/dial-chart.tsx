'use client'

import { useState } from 'react'
import type { AnalysisViews } from '@/lib/analysis/types'
import { dialPath, freestAngle, dialPoint, dialRadius, dialScale } from '@/lib/figures/dial'
import { shownTurn } from '@/lib/figures/turn-figure'
import { displacementUnitOf, displacementUnitWord, PLAIN_DISPLAY, type Display } from '@/lib/display-units'
import { formatNumber, wrapDegrees } from '@/lib/units'
import type { ChartMark, MarkLink } from './mark-buttons'
import { markStroke } from './mark-stroke'
import { SvgPicture } from './svg-picture'

const SIZE = 420
const CENTRE = SIZE / 2
const RIM = 160
/** Where the boxes of the notes stand. */
const MARK_RADIUS = RIM - 10

interface DialChartProps {
  turn: NonNullable<AnalysisViews['turn']>
  summary: string
  senseMark: string
  display?: Display
  /** Those with an id and a label can be pointed at, where there is a `markLink`. */
  notes: readonly (Partial<ChartMark> & NoteMarkProps)[]
  markLink?: MarkLink
  onPick?: (angleDegrees: number) => void
}

/** Every turn round one worm angle: outward is ahead, inward behind; zero is the dotted circle. */
export function DialChart({
  summary,
  senseMark,
  display = PLAIN_DISPLAY,
  notes,
  markLink,
  onPick,
  ...props
}: DialChartProps) {
  const turn = shownTurn(props.turn, display)
  const [pointed, setPointed] = useState<number | null>(null)
  const scale = dialScale(turn.curveArcsec, ...turn.turns.map(({ arcsec }) => arcsec))
  const radius = (arcsec: number) => RIM * dialRadius(arcsec, scale)
  const labelAngle = freestAngle(turn, scale.ringsArcsec)
  const closed = [...turn.angleDegrees]
  const index = pointed === null ? null : nearestIndex(closed, pointed)

  return (
    <div>
      <SvgPicture
        name="dial"
        summary={summary}
        table={{
          columns: [
            { name: 'worm_angle_degrees', values: turn.angleDegrees },
            { name: `fitted_${displacementUnitWord(display)}`, values: turn.curveArcsec },
          ],
        }}
        width={SIZE}
        height={SIZE}
        className="mx-auto max-w-100"
        marks={notes.flatMap(({ id, label, angleDegrees }) => {
          if (id === undefined || label === undefined) return []
          const { x, y } = dialPoint(angleDegrees, MARK_RADIUS)
          return [{ id, label, x: CENTRE + x, y: CENTRE + y }]
        })}
        markLink={markLink}
        onPoint={(place) => setPointed(place && angleAt(place))}
        onPick={onPick ? (place) => onPick(angleAt(place)) : undefined}
        legend={
          <span className="figures text-xs" aria-live="off">
            {index === null
              ? `outward is ahead${senseMark}`
              : `at ${formatNumber(closed[index], 0)}° ${formatNumber(turn.curveArcsec[index], 2, { isSigned: true, unit: displacementUnitOf(display) })}`}
          </span>
        }
      >
        <g transform={`translate(${CENTRE} ${CENTRE})`}>
          <circle r={RIM + 8} className="fill-transparent" />
          <Rim />
          {scale.ringsArcsec.map((ring) => (
            <circle
              key={ring}
              r={radius(ring)}
              fill="none"
              className={ring === 0 ? 'stroke-soft' : 'stroke-faint'}
              strokeDasharray={ring === 0 ? '2.5 3' : undefined}
            />
          ))}
          {turn.turns.map(({ turnNumber, angleDegrees, arcsec }) => (
            <path
              key={turnNumber}
              d={dialPath(angleDegrees, arcsec, scale, RIM)}
              fill="none"
              className="stroke-steel opacity-75"
              strokeWidth="0.9"
            />
          ))}
          <path
            d={dialPath(turn.angleDegrees, turn.curveArcsec, scale, RIM)}
            fill="none"
            className="stroke-brass"
            strokeWidth="2.75"
            strokeLinejoin="round"
          />
          {scale.ringsArcsec.map((ring) => (
            <text
              key={ring}
              x={dialPoint(labelAngle, radius(ring)).x}
              y={dialPoint(labelAngle, radius(ring)).y + 4}
              textAnchor="middle"
              className="figures fill-soft stroke-card"
              strokeWidth="3"
              paintOrder="stroke"
              fontSize="12"
            >
              {formatNumber(ring, decimals(ring), { isSigned: true })}
            </text>
          ))}
          {notes.map((note) => (
            <NoteMark key={note.number} {...note} />
          ))}
          {index === null ? null : (
            <circle
              cx={dialPoint(closed[index], radius(turn.curveArcsec[index])).x}
              cy={dialPoint(closed[index], radius(turn.curveArcsec[index])).y}
              r="5"
              className="fill-brass-fill stroke-card"
              strokeWidth="1.5"
            />
          )}
        </g>
      </SvgPicture>
    </div>
  )
}

function Rim() {
  return (
    <>
      {Array.from({ length: 72 }, (_, step) => step * 5).map((angle) => {
        const length = angle % 90 === 0 ? 9 : angle % 30 === 0 ? 9 : 4
        const from = dialPoint(angle, RIM)
        const to = dialPoint(angle, RIM + length)
        return <line key={angle} x1={from.x} y1={from.y} x2={to.x} y2={to.y} className="stroke-soft" />
      })}
      <g className="figures fill-soft" fontSize="12">
        <text y={-RIM - 15} textAnchor="middle">
          0°
        </text>
        <text x={RIM + 13} y="4">
          90°
        </text>
        <text y={RIM + 25} textAnchor="middle">
          180°
        </text>
        <text x={-RIM - 13} y="4" textAnchor="end">
          270°
        </text>
      </g>
    </>
  )
}

interface NoteMarkProps {
  number: number
  angleDegrees: number
  isSettled?: boolean
}

function NoteMark({ number, angleDegrees, isSettled = false }: NoteMarkProps) {
  const from = dialPoint(angleDegrees, 0.2 * RIM)
  const to = dialPoint(angleDegrees, MARK_RADIUS)
  return (
    <g>
      <line x1={from.x} y1={from.y} x2={to.x} y2={to.y} className="stroke-plum" {...markStroke(isSettled)} />
      <rect
        x={to.x - 8}
        y={to.y - 8}
        width="16"
        height="16"
        rx="3"
        className={isSettled ? 'fill-none stroke-plum' : 'fill-card stroke-plum'}
        {...markStroke(isSettled)}
      />
      <text x={to.x} y={to.y + 4} textAnchor="middle" fontSize="11" className="figures fill-ink">
        {number}
      </text>
    </g>
  )
}

function angleAt({ x, y }: { x: number; y: number }): number {
  return wrapDegrees((Math.atan2(x - CENTRE, CENTRE - y) * 180) / Math.PI)
}

function nearestIndex(angles: readonly number[], angle: number): number {
  let best = 0
  angles.forEach((each, index) => {
    if (Math.abs(each - angle) < Math.abs(angles[best] - angle)) best = index
  })
  return best
}

function decimals(ring: number): number {
  return ring === 0 || Math.abs(ring) >= 1 ? 0 : Math.ceil(-Math.log10(Math.abs(ring)))
}

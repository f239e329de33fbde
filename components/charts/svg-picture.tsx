'use client'

import { useRef, type PointerEvent, type ReactNode } from 'react'
import { classNames } from '@/components/ui/class-names'
import type { FigureTable } from '@/lib/figures/figure-table'
import { MarkButtons, type ChartMark, type MarkLink } from './mark-buttons'
import { Picture } from './picture'
import { standaloneSvg } from './save-picture'
import { useChartColors } from './use-chart-colors'

interface SvgPictureProps {
  name: string
  summary: string
  table: FigureTable
  /** Size of the drawing in its own units; it scales with the page. */
  width: number
  height: number
  legend?: ReactNode
  className?: string
  /** A place in the drawing's own units, while the pointer is over it; null when it leaves. */
  onPoint?: (place: { x: number; y: number } | null) => void
  onPick?: (place: { x: number; y: number }) => void
  /** What the drawing marks, in its own units. */
  marks?: readonly (ChartMark & { x: number; y: number })[]
  markLink?: MarkLink
  children: ReactNode
}

/** A drawing of our own in SVG, coloured by the style sheet, with the same buttons as the other pictures. */
export function SvgPicture(props: SvgPictureProps) {
  const {
    name,
    summary,
    table,
    width,
    height,
    legend,
    className,
    onPoint,
    onPick,
    marks = [],
    markLink,
    children,
  } = props
  const drawing = useRef<SVGSVGElement>(null)
  const colors = useChartColors()

  function place(event: PointerEvent<SVGSVGElement> | React.MouseEvent<SVGSVGElement>) {
    const box = event.currentTarget.getBoundingClientRect()
    return { x: ((event.clientX - box.left) / box.width) * width, y: ((event.clientY - box.top) / box.height) * height }
  }

  return (
    <Picture
      name={name}
      legend={legend}
      table={table}
      toSvg={async () => {
        const element = drawing.current
        if (!element) return null
        const box = element.getBoundingClientRect()
        return {
          svg: standaloneSvg(element, colors.card),
          width: Math.round(box.width),
          height: Math.round(box.height),
        }
      }}
    >
      <div className={classNames('relative', className)}>
        <svg
          ref={drawing}
          role="img"
          aria-label={summary}
          viewBox={`0 0 ${width} ${height}`}
          className="block h-auto w-full"
          onPointerMove={onPoint ? (event) => onPoint(place(event)) : undefined}
          onPointerLeave={onPoint ? () => onPoint(null) : undefined}
          onClick={onPick ? (event) => onPick(place(event)) : undefined}
        >
          {children}
        </svg>
        {markLink ? (
          <MarkButtons
            marks={marks.map((mark) => ({
              ...mark,
              left: `${(100 * mark.x) / width}%`,
              top: `${(100 * mark.y) / height}%`,
            }))}
            link={markLink}
          />
        ) : null}
      </div>
    </Picture>
  )
}

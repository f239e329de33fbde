import type { ReactNode } from 'react'
import { classNames } from '@/components/ui/class-names'

interface PictureTextProps {
  x: number
  y: number
  anchor: 'start' | 'middle' | 'end'
  /** Colour; the soft one unless given. */
  className?: string
  /** A square drawing is shown a little smaller than it is drawn, so its letters are larger. */
  isSquare?: boolean
  children: ReactNode
}

/** Letters in a drawing, on a rim of the card's colour that keeps lines off them. */
export function PictureText({ x, y, anchor, className = 'fill-soft', isSquare = false, children }: PictureTextProps) {
  return (
    <text
      x={x}
      y={y}
      textAnchor={anchor}
      paintOrder="stroke"
      strokeWidth="4"
      strokeLinejoin="round"
      className={classNames('stroke-card font-mono', isSquare ? 'text-[14px]' : 'text-[12.5px]', className)}
    >
      {children}
    </text>
  )
}

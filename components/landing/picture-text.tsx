import type { ReactNode } from 'react'
import { classNames } from '@/components/ui/class-names'

interface PictureTextProps {
  x: number
  y: number
  anchor: 'start' | 'middle' | 'end'
  /** Colour; the soft one unless given. */
  className?: string
  /** In a square drawing, which a phone shows at nearly its full size, letters stay as they are. */
  isSquare?: boolean
  /** Left out on a phone, where the drawing is half as wide and its letters therefore twice as large. */
  isOptional?: boolean
  children: ReactNode
}

/** Letters in a drawing; they grow, in the drawing's units, as the drawing shrinks. */
export function PictureText({
  x,
  y,
  anchor,
  className = 'fill-soft',
  isSquare = false,
  isOptional = false,
  children,
}: PictureTextProps) {
  return (
    <text
      x={x}
      y={y}
      textAnchor={anchor}
      paintOrder="stroke"
      strokeWidth="4"
      strokeLinejoin="round"
      className={classNames(
        'stroke-card font-mono',
        isSquare ? 'text-[14px]' : 'text-[12.5px] max-sm:text-[21px]',
        isOptional && 'max-sm:hidden',
        className,
      )}
    >
      {children}
    </text>
  )
}

'use client'

import { useRef, useState, type PointerEvent, type SyntheticEvent } from 'react'
import type { Figure } from '@/lib/figures/figure'

/** Moves below this are a click. */
const CLICK_PX = 5

export interface AxisDrag {
  /** From and to while dragging, in pixels from the left of the picture. */
  band: { leftPx: number; widthPx: number } | null
  handlers: {
    onPointerDown: (event: PointerEvent<HTMLElement>) => void
    onPointerMove: (event: PointerEvent<HTMLElement>) => void
    onPointerUp: (event: PointerEvent<HTMLElement>) => void
    onPointerCancel: () => void
    onMouseDownCapture: (event: SyntheticEvent) => void
    onTouchStartCapture: (event: SyntheticEvent) => void
  }
}

interface AxisDragOptions {
  axis: Figure['x']
  onSelect: (range: [number, number]) => void
  onPick?: (value: number) => void
}

/** Dragging sideways over a picture selects a stretch of its x axis; a click or a tap picks one place. */
export function useAxisDrag({ axis, onSelect, onPick }: AxisDragOptions): AxisDrag {
  const start = useRef<{ x: number; pointerId: number } | null>(null)
  const [band, setBand] = useState<AxisDrag['band']>(null)

  function place(event: PointerEvent<HTMLElement>) {
    const box = event.currentTarget.getBoundingClientRect()
    const width = box.width - axis.marginLeftPx - axis.marginRightPx
    const inside = Math.min(Math.max(event.clientX - box.left - axis.marginLeftPx, 0), width)
    return { px: inside + axis.marginLeftPx, value: axisValue(inside / width, axis) }
  }

  return {
    band,
    handlers: {
      onPointerDown(event) {
        if (event.button !== 0) return
        start.current = { x: place(event).px, pointerId: event.pointerId }
        event.currentTarget.setPointerCapture(event.pointerId)
      },
      onPointerMove(event) {
        if (!start.current) return
        const { px } = place(event)
        if (Math.abs(px - start.current.x) < CLICK_PX) return
        setBand({ leftPx: Math.min(px, start.current.x), widthPx: Math.abs(px - start.current.x) })
      },
      onPointerUp(event) {
        if (!start.current) return
        const { px, value } = place(event)
        const box = event.currentTarget.getBoundingClientRect()
        const width = box.width - axis.marginLeftPx - axis.marginRightPx
        const from = axisValue((start.current.x - axis.marginLeftPx) / width, axis)
        const isClick = Math.abs(px - start.current.x) < CLICK_PX
        start.current = null
        setBand(null)
        if (isClick) onPick?.(value)
        else onSelect(inOrder([from, value], axis))
      },
      onPointerCancel() {
        start.current = null
        setBand(null)
      },
      onMouseDownCapture: keepToOurselves,
      onTouchStartCapture: keepToOurselves,
    },
  }
}

/** The drawing below would begin a drag of its own, and keep the page from being scrolled by touch. */
function keepToOurselves(event: SyntheticEvent): void {
  event.stopPropagation()
}

/** Data value at a share 0 … 1 of the axis from its left end. */
function axisValue(share: number, { range, isLog }: Pick<Figure['x'], 'range' | 'isLog'>): number {
  return isLog ? range[0] * (range[1] / range[0]) ** share : range[0] + share * (range[1] - range[0])
}

/** The other way round: where a data value lies, as a share of the axis; not between 0 and 1 where it is not shown. */
export function axisShare(value: number, { range, isLog }: Pick<Figure['x'], 'range' | 'isLog'>): number {
  if (isLog) return Math.log(value / range[0]) / Math.log(range[1] / range[0])
  return (value - range[0]) / (range[1] - range[0])
}

/** The two ends from left to right. */
function inOrder([a, b]: [number, number], { range }: Figure['x']): [number, number] {
  const isRising = range[1] > range[0]
  return a < b === isRising ? [a, b] : [b, a]
}

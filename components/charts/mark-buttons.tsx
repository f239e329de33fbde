'use client'

import type { CSSProperties } from 'react'
import { classNames } from '@/components/ui/class-names'

/** A mark that a picture bears, as something to point at and to follow. */
export interface ChartMark {
  id: string
  /** What it is, for those who do not see it: “Note 2, at 207.6 s”. */
  label: string
}

export interface MarkLink {
  activeId: string | null
  onPoint: (id: string | null) => void
  onFollow: (id: string) => void
}

interface MarkButtonsProps {
  /** Where each mark’s box has its middle; `line` is the extent of its line over the picture, if it is upright. */
  marks: readonly (ChartMark & { left: string; top: string; line?: { top: number; height: number } })[]
  link: MarkLink
}

/** Buttons over the boxes that a picture draws: they take the pointer and the focus, which a drawing can’t. */
export function MarkButtons({ marks, link: { activeId, onPoint, onFollow } }: MarkButtonsProps) {
  return (
    <div className="no-print pointer-events-none absolute inset-0">
      {marks.map(({ id, label, left, top, line }) => {
        const isActive = id === activeId
        const at: CSSProperties = { left, top }
        return (
          <span key={id}>
            {isActive && line ? (
              <span
                aria-hidden="true"
                className="absolute -ml-[2px] w-1 bg-plum opacity-70"
                style={{ left, top: line.top, height: line.height }}
              />
            ) : null}
            <button
              type="button"
              aria-label={label}
              style={at}
              onPointerEnter={() => onPoint(id)}
              onPointerLeave={() => onPoint(null)}
              onFocus={() => onPoint(id)}
              onBlur={() => onPoint(null)}
              onClick={() => onFollow(id)}
              className={classNames(
                'pointer-events-auto absolute size-6 -translate-1/2 rounded-control border-2 pointer-coarse:size-11',
                isActive ? 'border-plum' : 'border-transparent',
              )}
            />
          </span>
        )
      })}
    </div>
  )
}

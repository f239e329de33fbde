'use client'

import { useEffect, useState } from 'react'
import { Button } from './button'

interface ProgressBarProps {
  /** What is being done, in words. */
  label: string
  /** 0 … 1, or null while nobody knows. */
  fraction: number | null
  onCancel?: () => void
  /** Nothing is shown before this, because what is quick needs no bar. */
  delayMs?: number
}

export function ProgressBar({ label, fraction, onCancel, delayMs = 200 }: ProgressBarProps) {
  const [isDue, setDue] = useState(delayMs === 0)
  useEffect(() => {
    if (delayMs === 0) return
    const timer = setTimeout(() => setDue(true), delayMs)
    return () => clearTimeout(timer)
  }, [delayMs])
  if (!isDue) return null

  const percent = fraction === null ? null : Math.round(Math.min(1, Math.max(0, fraction)) * 100)
  return (
    <div className="flex items-center gap-3">
      <div className="min-w-0 flex-1">
        <p className="flex justify-between gap-3 text-sm">
          <span role="status">{label}</span>
          {percent === null ? null : (
            <span className="figures text-soft">
              {percent}
              {'\u202f'}%
            </span>
          )}
        </p>
        <div
          role="progressbar"
          aria-label={label}
          aria-valuemin={0}
          aria-valuemax={100}
          aria-valuenow={percent ?? undefined}
          className="mt-1 h-1.5 overflow-hidden rounded-full bg-faint"
        >
          <div
            className={percent === null ? 'h-full w-1/3 animate-pulse bg-brass-fill' : 'h-full bg-brass-fill'}
            style={percent === null ? undefined : { width: `${percent}%` }}
          />
        </div>
      </div>
      {onCancel ? <Button onClick={onCancel}>Cancel</Button> : null}
    </div>
  )
}

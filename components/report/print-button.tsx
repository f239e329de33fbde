'use client'

import { useEffect, useState, type RefObject } from 'react'
import { Button } from '@/components/ui/button'

interface PrintButtonProps {
  sheet: RefObject<HTMLElement | null>
  /** Whether everything that will be drawn has its numbers. */
  isSettled: boolean
}

/**
 * Prints once every picture is drawn. For that moment the sheet has the width of paper and the colours of Day, so that
 * what was drawn for a phone or for the night is drawn anew and not merely scaled.
 */
export function PrintButton({ sheet, isSettled }: PrintButtonProps) {
  const [isWanted, setWanted] = useState(false)

  useEffect(() => {
    const element = sheet.current
    if (!isWanted || !isSettled || !element) return
    let isGone = false
    const root = document.documentElement
    const theme = root.dataset.theme
    const restore = () => {
      delete element.dataset.paper
      if (theme === undefined) delete root.dataset.theme
      else root.dataset.theme = theme
    }
    const print = async () => {
      element.dataset.paper = 'true'
      root.dataset.theme = 'day'
      await nextFrames(2)
      await drawn(element, () => isGone)
      if (isGone) return
      window.addEventListener('afterprint', restore, { once: true })
      window.print()
      setWanted(false)
    }
    void print()
    return () => {
      if (isGone) return
      isGone = true
      restore()
    }
  }, [isWanted, isSettled, sheet])

  return (
    <Button variant="primary" aria-live="polite" disabled={isWanted} onClick={() => setWanted(true)}>
      {isWanted ? 'Waiting for the pictures' : 'Print or save as PDF'}
    </Button>
  )
}

/** Until every picture of the library stands there in the width of its place. */
async function drawn(sheet: HTMLElement, isGone: () => boolean): Promise<void> {
  while (!isGone() && ![...sheet.querySelectorAll<HTMLElement>('.plotly-chart')].every(isDrawn)) await nextFrames(3)
  await nextFrames(2)
}

function isDrawn(chart: HTMLElement): boolean {
  const svg = chart.querySelector('.main-svg')
  // A drawing that could not be loaded says so in words and is not waited for.
  if (!svg) return chart.querySelector('p') !== null
  return Math.abs(Number(svg.getAttribute('width')) - chart.clientWidth) <= 1
}

async function nextFrames(count: number): Promise<void> {
  for (let i = 0; i < count; i++) await new Promise((resolve) => requestAnimationFrame(resolve))
}

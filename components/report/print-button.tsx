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
    const print = async () => {
      await printOnPaper(element, () => isGone)
      if (!isGone) setWanted(false)
    }
    void print()
    return () => {
      isGone = true
    }
  }, [isWanted, isSettled, sheet])

  return (
    <Button variant="primary" aria-live="polite" disabled={isWanted} onClick={() => setWanted(true)}>
      {isWanted ? 'Waiting for the pictures' : 'Print or save as PDF'}
    </Button>
  )
}

async function printOnPaper(sheet: HTMLElement, isGone: () => boolean): Promise<void> {
  const root = document.documentElement
  const { theme } = root.dataset
  const restore = () => {
    delete sheet.dataset.paper
    if (theme === undefined) delete root.dataset.theme
    else root.dataset.theme = theme
  }
  sheet.dataset.paper = 'true'
  root.dataset.theme = 'day'
  await nextFrames(2)
  await drawn(sheet, isGone)
  if (isGone()) return restore()
  // Some browsers return before the printer has the page.
  window.addEventListener('afterprint', restore, { once: true })
  window.print()
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

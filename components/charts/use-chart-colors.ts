'use client'

import { useSyncExternalStore } from 'react'
import { CHART_COLOR_NAMES, DAY_COLORS, type ChartColors } from '@/lib/figures/chart-colors'

/** The theme's colours as they are on screen now; pictures that use them are redrawn when the theme changes. */
export function useChartColors(): ChartColors {
  return useSyncExternalStore(subscribe, readColors, () => DAY_COLORS)
}

let last = DAY_COLORS

function readColors(): ChartColors {
  const style = getComputedStyle(document.documentElement)
  const colors = Object.fromEntries(
    CHART_COLOR_NAMES.map((name) => [name, style.getPropertyValue(`--${name}`).trim() || DAY_COLORS[name]]),
  ) as ChartColors
  if (CHART_COLOR_NAMES.some((name) => colors[name] !== last[name])) last = colors
  return last
}

function subscribe(onChange: () => void): () => void {
  const observer = new MutationObserver(onChange)
  observer.observe(document.documentElement, { attributes: true, attributeFilter: ['data-theme', 'class'] })
  const queries = ['(prefers-color-scheme: dark)', 'print'].map((query) => window.matchMedia(query))
  queries.forEach((query) => query.addEventListener('change', onChange))
  return () => {
    observer.disconnect()
    queries.forEach((query) => query.removeEventListener('change', onChange))
  }
}

import type { ComponentType } from 'react'
import type { PlotParams } from 'react-plotly.js/factory'
import type { Figure } from '@/lib/figures/figure'

export interface PlotlyParts {
  Plot: ComponentType<PlotParams>
  toImage: (
    figure: Pick<Figure, 'data' | 'layout'>,
    options: { format: 'svg'; width: number; height: number },
  ) => Promise<string>
  resize: (element: HTMLElement) => void
}

let loading: Promise<PlotlyParts> | null = null
let loaded: PlotlyParts | null = null

/**
 * Loads Plotly once. It keeps the main thread busy for a second or two, so it waits until the browser is idle; whoever
 * expects pictures soon may call this beforehand.
 */
export function loadPlotly(): Promise<PlotlyParts> {
  loading ??= whenIdle().then(async () => {
    const [plotly, factory] = await Promise.all([import('plotly.js-dist-min'), import('react-plotly.js/factory')])
    const Plotly = plotly.default
    loaded = {
      Plot: factory.default(Plotly) as ComponentType<PlotParams>,
      toImage: (figure, options) => Plotly.toImage(figure, options),
      resize: (element) => Plotly.Plots.resize(element),
    }
    return loaded
  })
  loading.catch(() => {
    loading = null
  })
  return loading
}

export function loadedPlotly(): PlotlyParts | null {
  return loaded
}

function whenIdle(): Promise<void> {
  return new Promise((resolve) => {
    if ('requestIdleCallback' in window) window.requestIdleCallback(() => resolve(), { timeout: 1500 })
    else setTimeout(resolve, 100)
  })
}

import { evenTicks } from './svg-geometry'

export interface BinBars {
  /** Shares 0 … 1 of the picture's width and height; `top` counts from the top. */
  bars: { left: number; width: number; top: number; height: number; isNegative: boolean }[]
  zeroTop: number
  ticks: { top: number; value: number }[]
}

/** One bar for each bin of a correction table, standing on zero. */
export function binBars(values: readonly number[]): BinBars {
  const lowest = Math.min(0, ...values)
  const highest = Math.max(0, ...values)
  const margin = 0.08 * (highest - lowest || 1)
  const [bottom, top] = [lowest - margin, highest + margin]
  const topOf = (value: number) => (top - value) / (top - bottom)
  return {
    bars: values.map((value, index) => ({
      left: index / values.length,
      width: 1 / values.length,
      top: Math.min(topOf(value), topOf(0)),
      height: Math.abs(topOf(value) - topOf(0)),
      isNegative: value < 0,
    })),
    zeroTop: topOf(0),
    ticks: evenTicks(bottom, top, 4).map((value) => ({ top: topOf(value), value })),
  }
}

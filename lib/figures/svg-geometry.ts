import type { ExcludedSpan } from '@/lib/analysis/types'

/** A mark on an axis: where it stands in the drawing, and what is written there. */
export interface Tick {
  at: number
  label: string
}

/** An upright band of the drawing. */
export interface Band {
  x: number
  width: number
}

/** The part of a drawing that the axes enclose. */
export interface PlotBox {
  left: number
  right: number
  top: number
  bottom: number
}

export type Scale = (value: number) => number

/** Maps one interval onto another in a straight line. */
export function linearScale([from, to]: [number, number], [start, end]: [number, number]): Scale {
  const factor = to === from ? 0 : (end - start) / (to - from)
  return (value) => start + (value - from) * factor
}

/** Maps the logarithm of an interval above zero onto another interval. */
export function logScale([from, to]: [number, number], range: [number, number]): Scale {
  const scale = linearScale([Math.log(from), Math.log(to)], range)
  return (value) => scale(Math.log(value))
}

/** Multiples of 1, 2 or 5 times a power of ten that lie in an interval: about as many as are wanted, in rising order. */
export function evenTicks(lowest: number, highest: number, wanted: number): number[] {
  const rough = (highest - lowest) / wanted
  if (!(rough > 0) || !Number.isFinite(rough)) return []
  const power = 10 ** Math.floor(Math.log10(rough))
  const step = power * ([1, 2, 5, 10].find((multiple) => multiple * power >= rough * 0.75) ?? 10)
  const first = Math.ceil(lowest / step - 1e-9)
  const last = Math.floor(highest / step + 1e-9)
  return Array.from({ length: Math.max(last - first + 1, 0) }, (_, i) => (first + i) * step || 0)
}

/** Path of a curve; a value that is not finite breaks the line, and a lone point leaves no trace. */
export function pathOf(xs: ArrayLike<number>, ys: ArrayLike<number>, x: Scale, y: Scale): string {
  let path = ''
  let isDrawing = false
  for (let i = 0; i < xs.length; i++) {
    const [px, py] = [x(xs[i]), y(ys[i])]
    if (!Number.isFinite(px) || !Number.isFinite(py)) {
      isDrawing = false
      continue
    }
    path += `${isDrawing ? 'L' : 'M'}${short(px)} ${short(py)}`
    isDrawing = true
  }
  return path
}

/** Bands of a drawing for spans of time. */
export function bands(spans: ExcludedSpan[], x: Scale): Band[] {
  return spans.map(({ startSeconds, endSeconds }) => ({ x: x(startSeconds), width: x(endSeconds) - x(startSeconds) }))
}

/** One decimal is a tenth of a pixel: more would only make the page heavier. */
export function short(value: number): string {
  const text = value.toFixed(1)
  return text === '-0.0' ? '0' : text.replace(/\.0$/, '')
}

import { MINUS } from '@/lib/units'

export interface Ticks {
  values: number[]
  labels: string[]
}

/** The smallest step of 1, 2 or 5 times a power of ten that makes at most `most` intervals of the range. */
export function niceStep(span: number, most: number): number {
  if (!(span > 0) || !(most >= 1)) return 1
  const rough = span / most
  const power = 10 ** Math.floor(Math.log10(rough))
  const factor = [1, 2, 5, 10].find((each) => each * power >= rough * (1 - 1e-9)) ?? 10
  return factor * power
}

/** Multiples of a nice step within [low, high], inclusive; labels have a true minus, and a plus if signed. */
export function niceTicks(
  [low, high]: [number, number],
  most: number,
  options: { isSigned?: boolean; unit?: string } = {},
): Ticks {
  const step = niceStep(high - low, most)
  return ticksAt(multiples([low, high], step), step, options)
}

/** Steps that people count minutes in; below a minute and above an hour the usual ones. */
export function minuteTicks([low, high]: [number, number], most: number): Ticks {
  const span = high - low
  const step = [1, 2, 5, 10, 15, 20, 30, 60, 120, 180, 240].find((each) => span / each <= most) ?? niceStep(span, most)
  const chosen = span / most < 0.5 ? niceStep(span, most) : step
  return ticksAt(multiples([low, high], chosen), chosen, {})
}

/** 1 and 3 in every decade from low to high: 0.01, 0.03, 0.1 …; with many decades only the tens. */
export function decadeTicks([low, high]: [number, number]): Ticks {
  const first = Math.floor(Math.log10(low))
  const last = Math.ceil(Math.log10(high))
  const factors = last - first > 6 ? [1] : [1, 3]
  const values: number[] = []
  for (let power = first; power <= last; power++) {
    for (const factor of factors) {
      const value = Number(`${factor}e${power}`)
      if (value >= low * (1 - 1e-9) && value <= high * (1 + 1e-9)) values.push(value)
    }
  }
  return { values, labels: values.map((value) => String(value)) }
}

export interface PeriodTickOptions {
  /** Shown before all others, if within range. */
  firstSeconds: number | null
  widthPx: number
  spacingPx: number
}

/** Periods for a log axis: the worm's own first, then 1-2-3-5 steps of every decade as far as there is room. */
export function periodTicks([low, high]: [number, number], options: PeriodTickOptions): Ticks {
  const { firstSeconds, widthPx, spacingPx } = options
  const pixelsPerDecade = widthPx / Math.log10(high / low)
  const values: number[] = []
  const add = (value: number) => {
    const isInside = value >= low && value <= high
    const isFree = values.every((other) => Math.abs(Math.log10(value / other)) * pixelsPerDecade >= spacingPx)
    if (isInside && isFree) values.push(value)
  }
  if (firstSeconds !== null) add(firstSeconds)
  for (const factor of [1, 3, 2, 5, 1.5]) {
    for (let power = Math.ceil(Math.log10(high)); power >= Math.floor(Math.log10(low)); power--)
      add(factor * 10 ** power)
  }
  values.sort((a, b) => b - a)
  return { values, labels: values.map((value) => `${Number(value.toPrecision(3))} s`) }
}

export interface OrderTicks {
  labelled: number[]
  plain: number[]
}

/** Orders for the ruler: 1, 2, 3, 4, 6, 8, 12, 16, 24 … labelled where there is room, the others as ticks only. */
export function orderTicks(
  [low, high]: [number, number],
  { widthPx, spacingPx }: { widthPx: number; spacingPx: number },
): OrderTicks {
  const pixelsPerDecade = widthPx / Math.log10(high / low)
  const distance = (a: number, b: number) => Math.abs(Math.log10(a / b)) * pixelsPerDecade
  const labelled: number[] = []
  for (const order of [1, 2, 3, 4, 6, 12, 24, 48, 96, 8, 16, 32, 64, 128, 5, 10, 20, 40, 80, 160]) {
    const isInside = order >= low && order <= high
    if (isInside && labelled.every((other) => distance(order, other) >= spacingPx)) labelled.push(order)
  }
  labelled.sort((a, b) => a - b)
  const plain: number[] = []
  for (
    let order = Math.max(1, Math.ceil(low));
    order <= Math.min(high, 200);
    order += order < 12 ? 1 : order < 48 ? 4 : 12
  ) {
    const others = [...labelled, ...plain]
    if (!labelled.includes(order) && others.every((other) => distance(order, other) >= 6)) plain.push(order)
  }
  return { labelled, plain }
}

function multiples([low, high]: [number, number], step: number): number[] {
  const first = Math.ceil(low / step - 1e-9)
  const last = Math.floor(high / step + 1e-9)
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, i) => (first + i) * step + 0)
}

function ticksAt(
  values: number[],
  step: number,
  { isSigned = false, unit = '' }: { isSigned?: boolean; unit?: string },
): Ticks {
  const decimals = Math.max(0, -Math.floor(Math.log10(step) + 1e-9))
  const labels = values.map((value) => {
    const text = Math.abs(value).toFixed(decimals)
    const isZero = !/[1-9]/.test(text)
    return (isZero ? '' : value < 0 ? MINUS : isSigned ? '+' : '') + text + unit
  })
  return { values, labels }
}

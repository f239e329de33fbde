/** What the joint model is made of: a drift polynomial, harmonics of one worm period, and free lines. */
export interface FitShape {
  /** 0 … 3. */
  driftDegree: number
  /** Orders of the worm's harmonics, increasing; empty without a worm. */
  wormOrders: readonly number[]
  lineCount: number
}

/** The frequencies in hertz that the columns depend on. */
export interface FitFrequencies {
  wormHz: number
  linesHz: readonly number[]
}

/** Times centred on the run, s = t − t_ref with t_ref midway between first and last sample, and half the span. */
export interface CentredTime {
  referenceSeconds: number
  halfSpanSeconds: number
  offsetSeconds: Float64Array
}

export function centreTime(timeSeconds: Float64Array): CentredTime {
  const first = timeSeconds[0]
  const last = timeSeconds[timeSeconds.length - 1]
  const referenceSeconds = (first + last) / 2
  return {
    referenceSeconds,
    halfSpanSeconds: (last - first) / 2,
    offsetSeconds: timeSeconds.map((t) => t - referenceSeconds),
  }
}

/** Powers τ^0 … τ^degree of τ = s/half span, in [−1, 1]. */
export function driftColumns(time: CentredTime, degree: number): Float64Array[] {
  const columns = [new Float64Array(time.offsetSeconds.length).fill(1)]
  for (let j = 1; j <= degree; j++) {
    const previous = columns[j - 1]
    columns.push(previous.map((value, i) => (value * time.offsetSeconds[i]) / time.halfSpanSeconds))
  }
  return columns
}

/** cos 2πfs and sin 2πfs. */
export function lineColumns(offsetSeconds: Float64Array, frequencyHz: number): [Float64Array, Float64Array] {
  const cosines = new Float64Array(offsetSeconds.length)
  const sines = new Float64Array(offsetSeconds.length)
  const omega = 2 * Math.PI * frequencyHz
  for (let i = 0; i < offsetSeconds.length; i++) {
    cosines[i] = Math.cos(omega * offsetSeconds[i])
    sines[i] = Math.sin(omega * offsetSeconds[i])
  }
  return [cosines, sines]
}

/** cos kθ, sin kθ for each order k by multiplying the fundamental's complex exponential (k roundings at most). */
export function wormColumns(
  offsetSeconds: Float64Array,
  frequencyHz: number,
  orders: readonly number[],
): Float64Array[] {
  if (orders.length === 0) return []
  const [c1, s1] = lineColumns(offsetSeconds, frequencyHz)
  const wanted = new Set(orders)
  const columns: Float64Array[] = []
  let c = c1
  let s = s1
  const highest = orders[orders.length - 1]
  for (let k = 1; k <= highest; k++) {
    if (k > 1) {
      const nextC = new Float64Array(c.length)
      const nextS = new Float64Array(c.length)
      for (let i = 0; i < c.length; i++) {
        nextC[i] = c[i] * c1[i] - s[i] * s1[i]
        nextS[i] = s[i] * c1[i] + c[i] * s1[i]
      }
      c = nextC
      s = nextS
    }
    if (wanted.has(k)) columns.push(c, s)
  }
  return columns
}

/**
 * Linear columns B in the order τ^0 … τ^d, a_k and b_k of each worm order, α_l and β_l of each line.
 * The drift's columns do not depend on the frequencies and are handed in.
 */
export function linearColumns(
  time: CentredTime,
  drift: readonly Float64Array[],
  shape: FitShape,
  frequencies: FitFrequencies,
): Float64Array[] {
  return [
    ...drift.slice(0, shape.driftDegree + 1),
    ...wormColumns(time.offsetSeconds, frequencies.wormHz, shape.wormOrders),
    ...frequencies.linesHz.slice(0, shape.lineCount).flatMap((f) => lineColumns(time.offsetSeconds, f)),
  ]
}

/** One frequency of the model and the linear columns it moves: pairs (cos, sin) from firstColumn on, of these orders. */
export interface FrequencyBlock {
  firstColumn: number
  orders: readonly number[]
}

export function wormBlock(shape: FitShape): FrequencyBlock {
  return { firstColumn: shape.driftDegree + 1, orders: shape.wormOrders }
}

export function lineBlock(shape: FitShape, index: number): FrequencyBlock {
  return { firstColumn: shape.driftDegree + 1 + 2 * shape.wormOrders.length + 2 * index, orders: [1] }
}

/** (∂B/∂f)·c for one frequency f: Σ 2πk s(−a_k sin kθ + b_k cos kθ), in the values' unit per hertz. */
export function derivativeColumn(
  time: CentredTime,
  linear: readonly Float64Array[],
  coefficients: Float64Array,
  block: FrequencyBlock,
): Float64Array {
  const column = new Float64Array(time.offsetSeconds.length)
  block.orders.forEach((order, index) => {
    const j = block.firstColumn + 2 * index
    const [c, s] = [linear[j], linear[j + 1]]
    const [a, b] = [order * coefficients[j], order * coefficients[j + 1]]
    for (let i = 0; i < column.length; i++) column[i] += b * c[i] - a * s[i]
  })
  for (let i = 0; i < column.length; i++) column[i] *= 2 * Math.PI * time.offsetSeconds[i]
  return column
}

/** (∂B/∂f)ᵀ·r: one entry per linear column, zero outside the block. */
export function derivativeProjection(
  time: CentredTime,
  linear: readonly Float64Array[],
  residual: Float64Array,
  block: FrequencyBlock,
): Float64Array {
  const projection = new Float64Array(linear.length)
  block.orders.forEach((order, index) => {
    const j = block.firstColumn + 2 * index
    const [c, s] = [linear[j], linear[j + 1]]
    let cosPart = 0
    let sinPart = 0
    for (let i = 0; i < residual.length; i++) {
      const weight = time.offsetSeconds[i] * residual[i]
      cosPart -= weight * s[i]
      sinPart += weight * c[i]
    }
    projection[j] = 2 * Math.PI * order * cosPart
    projection[j + 1] = 2 * Math.PI * order * sinPart
  })
  return projection
}

import type { HarmonicCoefficients } from './types'

/**
 * The periodic curve e(θ) = Σ a_k cos kθ + b_k sin kθ, θ in radians, e in arc seconds of axis; what a gear of
 * integer orders does in every turn.
 */
export function harmonicValue(harmonics: readonly HarmonicCoefficients[], angleRadians: number): number {
  let total = 0
  for (const { order, cosArcsec, sinArcsec } of harmonics) {
    total += cosArcsec * Math.cos(order * angleRadians) + sinArcsec * Math.sin(order * angleRadians)
  }
  return total
}

/** de/dθ = Σ k(−a_k sin kθ + b_k cos kθ), in arc seconds per radian; times 2π/P it is a rate in time. */
export function harmonicSlope(harmonics: readonly HarmonicCoefficients[], angleRadians: number): number {
  return derivative(harmonics, angleRadians, 1)
}

/** n-th derivative: order k is multiplied by kⁿ and turned by n quarter turns. */
function derivative(harmonics: readonly HarmonicCoefficients[], angleRadians: number, n: number): number {
  let total = 0
  for (const { order, cosArcsec, sinArcsec } of harmonics) {
    const angle = order * angleRadians
    const c = Math.cos(angle)
    const s = Math.sin(angle)
    const turned =
      n % 4 === 0
        ? cosArcsec * c + sinArcsec * s
        : n % 4 === 1
          ? -cosArcsec * s + sinArcsec * c
          : n % 4 === 2
            ? -cosArcsec * c - sinArcsec * s
            : cosArcsec * s - sinArcsec * c
    total += order ** n * turned
  }
  return total
}

export interface CurvePoint {
  /** In [0, 2π). */
  angleRadians: number
  value: number
}

export interface CurveExtrema {
  highest: CurvePoint
  lowest: CurvePoint
}

/**
 * Highest and lowest point of the n-th derivative over one turn: a scan at 48 points per cycle of the highest order
 * (at least 720 points), then Newton steps on the next derivative from the best scan point, kept only if they improve.
 */
function extremaOfDerivative(harmonics: readonly HarmonicCoefficients[], n: number): CurveExtrema {
  const highestOrder = harmonics.reduce((largest, { order }) => Math.max(largest, order), 1)
  const pointCount = Math.max(720, 48 * highestOrder)
  let high = 0
  let low = 0
  let highValue = -Infinity
  let lowValue = Infinity
  for (let i = 0; i < pointCount; i++) {
    const angle = (2 * Math.PI * i) / pointCount
    const value = derivative(harmonics, angle, n)
    if (value > highValue) [high, highValue] = [angle, value]
    if (value < lowValue) [low, lowValue] = [angle, value]
  }
  const step = (2 * Math.PI) / pointCount
  return {
    highest: polish(harmonics, n, { angle: high, sign: 1, step }),
    lowest: polish(harmonics, n, { angle: low, sign: -1, step }),
  }
}

function polish(
  harmonics: readonly HarmonicCoefficients[],
  n: number,
  start: { angle: number; sign: 1 | -1; step: number },
): CurvePoint {
  let angle = start.angle
  for (let iteration = 0; iteration < 20; iteration++) {
    const curvature = derivative(harmonics, angle, n + 2)
    if (curvature === 0) break
    const shift = derivative(harmonics, angle, n + 1) / curvature
    if (!(Math.abs(angle - shift - start.angle) <= start.step)) break
    angle -= shift
    if (Math.abs(shift) < 1e-14) break
  }
  const scanned = derivative(harmonics, start.angle, n)
  const polished = derivative(harmonics, angle, n)
  const isBetter = start.sign * (polished - scanned) >= 0
  const turn = 2 * Math.PI
  const best = isBetter ? angle : start.angle
  const wrapped = best - turn * Math.floor(best / turn)
  return { angleRadians: wrapped >= turn ? 0 : wrapped, value: isBetter ? polished : scanned }
}

/** Where the axis is furthest ahead (highest) and furthest behind (lowest) in one turn; both 0 without harmonics. */
export function curveExtrema(harmonics: readonly HarmonicCoefficients[]): CurveExtrema {
  return extremaOfDerivative(harmonics, 0)
}

export function curvePeakToPeak(harmonics: readonly HarmonicCoefficients[]): number {
  const { highest, lowest } = curveExtrema(harmonics)
  return highest.value - lowest.value
}

/** The point of the largest |de/dθ|; `value` keeps its sign, in arc seconds per radian. */
export function steepestPoint(harmonics: readonly HarmonicCoefficients[]): CurvePoint {
  const { highest, lowest } = extremaOfDerivative(harmonics, 1)
  return highest.value >= -lowest.value ? highest : lowest
}

/** RMS of the curve over a whole turn, √(ΣA²/2). */
export function curveRms(harmonics: readonly HarmonicCoefficients[]): number {
  return Math.sqrt(harmonics.reduce((total, { cosArcsec: a, sinArcsec: b }) => total + (a * a + b * b) / 2, 0))
}

/**
 * Coefficients of the same curve counted from another origin: with θ = θ' + shift, Z_k' = Z_k e^{ik·shift} for
 * Z_k = a_k − i b_k. A later origin has a positive shift, 2π(t_new − t_old)/P.
 */
export function shiftHarmonics(
  harmonics: readonly HarmonicCoefficients[],
  shiftRadians: number,
): HarmonicCoefficients[] {
  return harmonics.map(({ order, cosArcsec, sinArcsec }) => {
    const c = Math.cos(order * shiftRadians)
    const s = Math.sin(order * shiftRadians)
    return { order, cosArcsec: cosArcsec * c + sinArcsec * s, sinArcsec: sinArcsec * c - cosArcsec * s }
  })
}

import { erfc, gaussLegendre } from './special-functions'
import { span } from './statistics'
import type { SpanResult } from './types'

/**
 * Spans (largest minus smallest) as parts are taken away in the order drift, worm, lines, and the parts' own spans,
 * which do not add up.
 *
 * @param parts the raw track and the fitted parts at its samples, all of one length
 */
export function spanSplit(parts: {
  raw: Float64Array
  drift: Float64Array
  worm: Float64Array
  lines: Float64Array
}): SpanResult {
  const { raw, drift, worm, lines } = parts
  const afterDrift = raw.map((value, i) => value - drift[i])
  const afterWorm = afterDrift.map((value, i) => value - worm[i])
  const afterLines = afterWorm.map((value, i) => value - lines[i])
  return {
    rawArcsec: span(raw),
    afterDriftArcsec: span(afterDrift),
    afterWormArcsec: span(afterWorm),
    afterLinesArcsec: span(afterLines),
    rawWithoutWormArcsec: span(raw.map((value, i) => value - worm[i])),
    driftArcsec: span(drift),
    wormArcsec: span(worm),
  }
}

/** Shares of the raw span; they add up to it by construction, and one may be negative. */
export function spanShares(spans: SpanResult): { drift: number; worm: number; lines: number; residual: number } {
  return {
    drift: spans.rawArcsec - spans.afterDriftArcsec,
    worm: spans.afterDriftArcsec - spans.afterWormArcsec,
    lines: spans.afterWormArcsec - spans.afterLinesArcsec,
    residual: spans.afterLinesArcsec,
  }
}

/** Beyond x = 40/√2 standard deviations nothing is left of either tail in double precision. */
const PANEL_WIDTH = 0.5
const PANEL_COUNT = 80

/**
 * d₂(N): expected range of N independent Gaussian values in units of σ, ∫[1 − Φ^N − (1 − Φ)^N]dx. With correlated
 * values use the effective number, which need not be an integer.
 *
 * @returns 0 for N ≤ 1
 * @see Tippett (1925), Biometrika 17, 364
 */
export function expectedRangeFactor(count: number): number {
  if (!(count > 1)) return 0
  const { nodes, weights } = gaussLegendre(16)
  let total = 0
  for (let panel = 0; panel < PANEL_COUNT; panel++) {
    for (let k = 0; k < nodes.length; k++) {
      const x = (panel + 0.5 * (nodes[k] + 1)) * PANEL_WIDTH
      const tail = 0.5 * erfc(x / Math.SQRT2)
      total += weights[k] * (-Math.expm1(count * Math.log1p(-tail)) - tail ** count)
    }
  }
  return total * PANEL_WIDTH // twice the half line, half a panel per unit of weight
}

/** A residual span above this many expected ranges means outliers or a missing line. */
export const SUSPICIOUS_RANGE_RATIO = 1.5

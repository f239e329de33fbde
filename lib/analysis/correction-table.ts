import { SIDEREAL_RATE_ARCSEC_PER_SECOND } from './constants'
import { failure } from './failure'
import { harmonicValue, shiftHarmonics } from './harmonic-curve'
import { rehearseTable } from './rehearsal'
import { fraction, mean, normaliseDegrees, sum } from './statistics'
import type { PlayedTable } from './table-playback'
import type { Failure, HarmonicCoefficients, TableResult, TableSettings } from './types'

export interface TableInput {
  /** The worm's curve, θ = 2π(t − firstUsedTimeSeconds)/P; integer orders only. */
  harmonics: readonly HarmonicCoefficients[]
  periodSeconds: number
  firstUsedTimeSeconds: number
  settings: TableSettings
  /** Orders taken for `orders: 'default'`. */
  defaultOrders: readonly number[]
  /** Time of the worm's zero by the angle column (see originFromWormAngle); null without such a column. */
  wormAngleOriginSeconds: number | null
  /** Reduction on turns that the table was not made from; null with fewer than three turns. */
  heldOutReduction: number | null
}

/**
 * Corrections at N nodes, c_j = −g·(m_j − mean m), m the included harmonics counted from the table's origin: the mean
 * is gone and the table is periodic, so a turn closes without net motion.
 */
export function tableNodes(
  harmonics: readonly HarmonicCoefficients[],
  { binCount, gain }: { binCount: number; gain: number },
): Float64Array {
  const model = Float64Array.from({ length: binCount }, (_, j) =>
    harmonicValue(harmonics, (2 * Math.PI * j) / binCount),
  )
  const centre = mean(model)
  return model.map((value) => -gain * (value - centre) + 0)
}

/** Rate from node j to node j + 1 in ″/s; positive is faster, towards west. Its sum over a turn is 0 to rounding. */
export function tableRates(nodes: Float64Array, periodSeconds: number): Float64Array {
  const binSeconds = periodSeconds / nodes.length
  return nodes.map((node, j) => (nodes[j + 1 < nodes.length ? j + 1 : 0] - node) / binSeconds)
}

/** The unit that the quantity can have: a position is in arc seconds, a rate never is. */
function effectiveUnit({ quantity, unit }: TableSettings): TableSettings['unit'] {
  if (quantity === 'position') return 'arcsec'
  return unit === 'arcsec' ? 'arcsec-per-second' : unit
}

/** Harmonics of the included orders, counted from the table's origin. */
export function includedHarmonics(
  input: Pick<TableInput, 'harmonics' | 'settings' | 'defaultOrders' | 'periodSeconds' | 'firstUsedTimeSeconds'>,
  originSeconds: number,
): { included: HarmonicCoefficients[]; all: HarmonicCoefficients[] } {
  const { harmonics, settings, defaultOrders, periodSeconds, firstUsedTimeSeconds } = input
  const orders = settings.orders === 'default' ? defaultOrders : settings.orders
  const all = shiftHarmonics(harmonics, 2 * Math.PI * fraction((originSeconds - firstUsedTimeSeconds) / periodSeconds))
  return { all, included: all.filter(({ order }) => orders.includes(order)) }
}

/** Time at which node 0 stands; `no-index` when the worm angle was to give it and there is none. */
export function tableOrigin(
  input: Pick<TableInput, 'settings' | 'firstUsedTimeSeconds' | 'wormAngleOriginSeconds'>,
): { ok: true; seconds: number } | Failure {
  const { origin } = input.settings
  if (origin.kind === 'run-start') return { ok: true, seconds: input.firstUsedTimeSeconds }
  if (origin.kind === 'index-time') return { ok: true, seconds: origin.timeSeconds }
  if (input.wormAngleOriginSeconds === null) return failure('no-index')
  return { ok: true, seconds: input.wormAngleOriginSeconds }
}

/** How the device plays the table; a table of rates is by its nature straight lines between the nodes' positions. */
export function playedTable(nodes: Float64Array, settings: TableSettings): PlayedTable {
  return { nodes, playback: settings.quantity === 'rate' ? 'interpolated' : settings.playback }
}

/**
 * The correction table with its rehearsal. Rows are listed in the order in which they are played; their angle grows or
 * falls as the settings say, and a rate holds from its own row's angle to the next row's, sign unchanged. The offset
 * is added to the listed angle only.
 *
 * @returns `no-index` without the wanted origin, `singular` when no order is included, `out-of-range` for fewer than
 * two bins or a period that is not positive
 */
export function makeCorrectionTable(input: TableInput): TableResult | Failure {
  const { settings, periodSeconds } = input
  if (!Number.isInteger(settings.binCount) || settings.binCount < 2) return failure('out-of-range')
  if (!(periodSeconds > 0) || !Number.isFinite(periodSeconds)) return failure('out-of-range')
  const origin = tableOrigin(input)
  if (!origin.ok) return origin
  const { included, all } = includedHarmonics(input, origin.seconds)
  if (included.length === 0) return failure('singular')

  const nodes = tableNodes(included, settings)
  const rates = tableRates(nodes, periodSeconds)
  const unit = effectiveUnit(settings)
  const sign = settings.meaning === 'correction' ? 1 : -1
  const scale = unit === 'percent-sidereal' ? 100 / SIDEREAL_RATE_ARCSEC_PER_SECOND : 1
  const written = settings.quantity === 'position' ? nodes : rates
  const step = (settings.angleDirection === 'increasing' ? 360 : -360) / settings.binCount
  const values = written.map((value) => sign * scale * value + 0)
  return {
    bins: Array.from(values, (value, index) => ({
      index,
      angleDegrees: normaliseDegrees(settings.offsetDegrees + index * step),
      value,
    })),
    settings: { ...settings, unit },
    orders: included.map(({ order }) => order),
    wormPeriodSeconds: periodSeconds,
    originTimeSeconds: origin.seconds,
    closureError: settings.quantity === 'rate' ? sum(values) : stepsRoundTheTurn(values),
    largestRateArcsecPerSecond: rates.reduce((largest, rate) => Math.max(largest, Math.abs(rate)), 0),
    rehearsal: rehearseTable({
      table: playedTable(nodes, settings),
      all,
      includedOrders: included.map(({ order }) => order),
      gain: settings.gain,
      heldOutReduction: input.heldOutReduction,
    }),
  }
}

function stepsRoundTheTurn(values: Float64Array): number {
  return sum(values.map((value, j) => values[j + 1 < values.length ? j + 1 : 0] - value))
}

/** A column of worm angles follows time this closely (mean resultant length) or is no guide to the worm's zero. */
const SMALLEST_RESULTANT = 0.9

/**
 * Time at which a recorded worm angle passes zero, within one period after the first sample, and whether the angle
 * grows or falls with time: the circular mean of angle ∓ 360°·t/P over all samples that have an angle.
 *
 * @returns `no-index` when no angle was recorded or it does not follow the period
 */
export function originFromWormAngle(options: {
  timeSeconds: Float64Array
  wormAngleDegrees: Float64Array
  periodSeconds: number
}): { ok: true; originSeconds: number; direction: TableSettings['angleDirection'] } | Failure {
  const { timeSeconds, wormAngleDegrees, periodSeconds } = options
  const first = timeSeconds[0]
  const meanOf = (sign: 1 | -1) => {
    let [re, im, count] = [0, 0, 0]
    wormAngleDegrees.forEach((degrees, i) => {
      if (!Number.isFinite(degrees) || !Number.isFinite(timeSeconds[i])) return
      const angle = 2 * Math.PI * (fraction(degrees / 360) - sign * fraction((timeSeconds[i] - first) / periodSeconds))
      re += Math.cos(angle)
      im += Math.sin(angle)
      count++
    })
    return { length: count === 0 ? 0 : Math.hypot(re, im) / count, turns: Math.atan2(im, re) / (2 * Math.PI) }
  }
  const rising = meanOf(1)
  const falling = meanOf(-1)
  const best = rising.length >= falling.length ? rising : falling
  if (best.length < SMALLEST_RESULTANT) return failure('no-index')
  const isRising = best === rising
  // Rising: angle/360 = turns + (t − first)/P = 0 (mod 1); falling: turns − (t − first)/P = 0 (mod 1).
  const turnsToZero = fraction(isRising ? -best.turns : best.turns)
  return {
    ok: true,
    originSeconds: first + turnsToZero * periodSeconds,
    direction: isRising ? 'increasing' : 'decreasing',
  }
}

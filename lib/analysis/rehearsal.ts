import { curvePeakToPeak, harmonicValue } from './harmonic-curve'
import { playAt, playedCoefficients, playedMeanSquare, type PlayedTable } from './table-playback'
import type { HarmonicCoefficients, TableRehearsal, Track } from './types'

/** Share of the fundamental that may come back through slip. */
const SLIP_SHARE = 0.1

interface RehearsalInput {
  table: PlayedTable
  /** Every harmonic of the worm, counted from the table's origin. */
  all: readonly HarmonicCoefficients[]
  includedOrders: readonly number[]
  gain: number
  heldOutReduction: number | null
}

/** What is left of one order, Z + F·e^{−ikd}, with F of the played table and the slip d (radians, positive: late). */
export function residualOfOrder(table: PlayedTable, harmonic: HarmonicCoefficients, slipRadians = 0): number {
  const played = playedCoefficients(table, harmonic.order)
  const c = Math.cos(harmonic.order * slipRadians)
  const s = Math.sin(harmonic.order * slipRadians)
  return Math.hypot(
    harmonic.cosArcsec + played.cosArcsec * c - played.sinArcsec * s,
    harmonic.sinArcsec + played.sinArcsec * c + played.cosArcsec * s,
  )
}

/** Samples per turn of the played residual: many to a bin, so that corners and jumps are met. */
const scanCount = (binCount: number) => 4 * binCount * Math.max(1, Math.ceil(1800 / binCount))

/** Peak-to-peak and RMS of e(θ) + c(θ − d) over one turn, by a scan of at least 7200 points. */
export function playedResidual(
  table: PlayedTable,
  all: readonly HarmonicCoefficients[],
  slipRadians = 0,
): { peakToPeakArcsec: number; rmsArcsec: number } {
  const count = scanCount(table.nodes.length)
  let [lowest, highest, squares] = [Infinity, -Infinity, 0]
  for (let i = 0; i < count; i++) {
    const left = harmonicValue(all, (2 * Math.PI * i) / count) + playAt(table, i / count - slipRadians / (2 * Math.PI))
    lowest = Math.min(lowest, left)
    highest = Math.max(highest, left)
    squares += left * left
  }
  return { peakToPeakArcsec: highest - lowest, rmsArcsec: Math.sqrt(squares / count) }
}

/** The table played over the model it was made from, order by order, and how far its phase may slip. */
export function rehearseTable(input: RehearsalInput): TableRehearsal {
  const { table, all, includedOrders, gain, heldOutReduction } = input
  const included = all.filter(({ order }) => includedOrders.includes(order))
  return {
    orders: all.map((harmonic) => ({
      order: harmonic.order,
      beforeArcsec: Math.hypot(harmonic.cosArcsec, harmonic.sinArcsec),
      afterArcsec: residualOfOrder(table, harmonic),
      isIncluded: includedOrders.includes(harmonic.order),
    })),
    peakToPeakBeforeArcsec: curvePeakToPeak(all),
    peakToPeakAfterArcsec: playedResidual(table, all).peakToPeakArcsec,
    heldOutReduction,
    slipForTenPercentDegrees: slipAtShare(table, included, SLIP_SHARE),
    slipForNoHelpDegrees: slipAtShare(table, included, 1),
    binningLossShare: included.reduce((largest, harmonic) => Math.max(largest, lossOf(table, harmonic, gain)), 0),
  }
}

/** |1 + F/(gZ)|: the part of an order that bins and playback alone keep from being corrected. */
function lossOf(table: PlayedTable, harmonic: HarmonicCoefficients, gain: number): number {
  const size = gain * Math.hypot(harmonic.cosArcsec, harmonic.sinArcsec)
  if (size === 0) return 0
  const played = playedCoefficients(table, harmonic.order)
  return Math.hypot(gain * harmonic.cosArcsec + played.cosArcsec, gain * harmonic.sinArcsec + played.sinArcsec) / size
}

/**
 * Least slip, early or late, in degrees of worm angle at which this share of the fundamental is left (of the strongest
 * included order when the fundamental is not in the table): |1 − G e^{−ik(d + β)}| = share, G and β the gain and delay
 * of the order as played. 0 when the table leaves as much without any slip. For gain 1 a tenth is back at
 * 2·asin(0.05) = 5.732°, and from 60° on the table helps no more.
 */
function slipAtShare(table: PlayedTable, included: readonly HarmonicCoefficients[], share: number): number {
  const size = ({ cosArcsec, sinArcsec }: HarmonicCoefficients) => Math.hypot(cosArcsec, sinArcsec)
  const leading =
    included.find(({ order }) => order === 1) ?? included.toSorted((one, other) => size(other) - size(one))[0]
  if (leading === undefined || size(leading) === 0) return 0
  const played = playedCoefficients(table, leading.order)
  const gain = Math.hypot(played.cosArcsec, played.sinArcsec) / size(leading)
  if (gain === 0) return 0
  const cosine = (1 + gain * gain - share * share) / (2 * gain)
  if (cosine >= 1) return 0
  const delay = Math.abs(
    Math.atan2(
      leading.sinArcsec * played.cosArcsec - leading.cosArcsec * played.sinArcsec,
      -(leading.cosArcsec * played.cosArcsec + leading.sinArcsec * played.sinArcsec),
    ),
  )
  const angle = Math.acos(Math.max(-1, cosine)) - delay
  return (Math.max(0, angle) * 180) / Math.PI / leading.order
}

/**
 * RMS of the worm's curve that is left when the table plays with a slip, over the RMS without a table. Exact:
 * ⟨(e + c)²⟩ = ⟨e²⟩ + ⟨c²⟩ + 2⟨e c⟩, where only the curve's own orders enter the last term.
 */
export function slipCurve(
  table: PlayedTable,
  all: readonly HarmonicCoefficients[],
  slipDegrees: Float64Array,
): { slipDegrees: Float64Array; shareLeft: Float64Array } {
  const before = all.reduce((total, { cosArcsec: a, sinArcsec: b }) => total + (a * a + b * b) / 2, 0)
  const played = all.map(({ order }) => playedCoefficients(table, order))
  const constant = before + playedMeanSquare(table)
  const shareLeft = slipDegrees.map((degrees) => {
    if (before === 0) return 0
    let cross = 0
    all.forEach(({ order, cosArcsec, sinArcsec }, i) => {
      const slip = (order * degrees * Math.PI) / 180
      const { cosArcsec: a, sinArcsec: b } = played[i]
      cross += (cosArcsec * a + sinArcsec * b) * Math.cos(slip) + (sinArcsec * a - cosArcsec * b) * Math.sin(slip)
    })
    return Math.sqrt(Math.max(0, constant + cross) / before)
  })
  return { slipDegrees, shareLeft }
}

/** Turns until a table that runs by the clock with a period off by dP has let a tenth of the fundamental back in. */
export function turnsUntilTenPercent(periodSeconds: number, periodErrorSeconds: number): number | null {
  if (periodErrorSeconds === 0) return null
  return (Math.asin(SLIP_SHARE / 2) / Math.PI) * (periodSeconds / Math.abs(periodErrorSeconds))
}

/**
 * A recorded track with the table played over it, sample by sample; analyse the result as any other run.
 *
 * @param options.originSeconds time at which node 0 stands
 */
export function playOverTrack(
  track: Track,
  options: { table: PlayedTable; periodSeconds: number; originSeconds: number; slipRadians?: number },
): Track {
  const { table, periodSeconds, originSeconds, slipRadians = 0 } = options
  const slipTurns = slipRadians / (2 * Math.PI)
  return {
    timeSeconds: track.timeSeconds,
    raArcsec: track.raArcsec.map(
      (error, i) => error + playAt(table, (track.timeSeconds[i] - originSeconds) / periodSeconds - slipTurns),
    ),
  }
}

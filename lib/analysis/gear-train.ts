import { SIDEREAL_DAY_SECONDS } from './constants'
import { failure } from './failure'
import type { DriveTrain, Estimate, Failure, PredictedOrder } from './types'

const isCount = (n: number) => Number.isInteger(n) && n > 0

/**
 * Worm period s·86164.0905/n in seconds at the sidereal rate, n teeth of the wheel, s starts of the worm.
 *
 * @returns `no-period` when the teeth are unknown, `out-of-range` unless both are positive integers
 */
export function wormPeriod(
  train: Pick<DriveTrain, 'wheelTeeth' | 'wormStarts'>,
): { ok: true; seconds: number } | Failure {
  const { wheelTeeth, wormStarts } = train
  if (wheelTeeth === null) return failure('no-period')
  if (!isCount(wheelTeeth) || !isCount(wormStarts)) return failure('out-of-range')
  return { ok: true, seconds: (wormStarts * SIDEREAL_DAY_SECONDS) / wheelTeeth }
}

/**
 * Orders (cycles per worm turn) of every part, walking upstream from the worm: a pair multiplies the order of the
 * shaft by driven/driving teeth; teeth mesh z times per turn of their shaft; a belt of B teeth on a pulley of z goes
 * round z/B times per turn of the pulley.
 *
 * @param wormPeriodSeconds the period that orders are counted against; the drive train's own when not given
 * @returns nothing without a period or when a number of teeth is no positive integer
 */
export function predictedOrders(train: DriveTrain, wormPeriodSeconds: number | null = null): PredictedOrder[] {
  const period = wormPeriod(train)
  const seconds = wormPeriodSeconds ?? (period.ok ? period.seconds : 0)
  if (!(seconds > 0)) return []
  const parts: { name: string; order: number }[] = [{ name: 'Worm', order: 1 }]
  let shaftOrder = 1
  for (const [i, stage] of train.stages.entries()) {
    const { name, drivenTeeth, drivingTeeth } = stage
    if (!isCount(drivenTeeth) || !isCount(drivingTeeth)) return []
    const meshOrder = drivenTeeth * shaftOrder
    if (stage.kind === 'belt') {
      if (!isCount(stage.beltTeeth)) return []
      parts.push({ name, order: meshOrder / stage.beltTeeth }, { name: `${name}, teeth`, order: meshOrder })
    } else {
      parts.push({ name: `${name}, tooth mesh`, order: meshOrder })
    }
    shaftOrder = meshOrder / drivingTeeth
    const isLast = i === train.stages.length - 1
    parts.push({ name: isLast ? 'Motor shaft' : `Shaft driving ${name}`, order: shaftOrder })
  }
  return parts.map((part) => ({ ...part, periodSeconds: seconds / part.order }))
}

/**
 * The predicted part nearest to a line's order, if it lies within max(3σ, 0.5·P/T) of it.
 *
 * @param splitOrders P/T, the orders that two lines must lie apart in this record
 */
export function matchOrder(
  order: Estimate,
  predicted: readonly PredictedOrder[],
  splitOrders: number,
): PredictedOrder | null {
  const tolerance = Math.max(3 * (order.stderr ?? 0), 0.5 * splitOrders)
  let nearest: PredictedOrder | null = null
  for (const part of predicted) {
    const distance = Math.abs(part.order - order.value)
    if (distance <= tolerance && (nearest === null || distance < Math.abs(nearest.order - order.value))) nearest = part
  }
  return nearest
}

/** Meshes after which the same two teeth meet again: lcm(z1, z2). */
export function huntingMeshes(firstTeeth: number, secondTeeth: number): number {
  let [a, b] = [firstTeeth, secondTeeth]
  while (b !== 0) [a, b] = [b, a % b]
  return (firstTeeth / a) * secondTeeth
}

/** Full-step order and electrical-cycle order (4 full steps) of a stepper on a shaft of the given order. */
export function stepperOrders(shaftOrder: number, fullStepsPerTurn: number): { fullStep: number; electrical: number } {
  return { fullStep: fullStepsPerTurn * shaftOrder, electrical: (fullStepsPerTurn / 4) * shaftOrder }
}

export interface BearingOrders {
  ok: true
  cage: number
  outerRace: number
  innerRace: number
  /** Spin of a ball; a fault on it shows at twice this. */
  ball: number
}

/**
 * Orders of a rolling bearing with a fixed outer race on a shaft of order r: m balls of diameter d on the pitch
 * diameter D, contact angle α, g = (d/D) cos α. Real bearings slip by 1–2 %: search windows, not fixed lines.
 *
 * @returns `out-of-range` unless 0 < g < 1
 * @see Randall & Antoni (2011), Mech. Syst. Signal Process. 25, 485
 */
export function bearingOrders(bearing: {
  shaftOrder: number
  ballCount: number
  ballDiameter: number
  pitchDiameter: number
  contactAngleDegrees: number
}): BearingOrders | Failure {
  const { shaftOrder: r, ballCount: m, ballDiameter, pitchDiameter, contactAngleDegrees } = bearing
  const g = (ballDiameter / pitchDiameter) * Math.cos((contactAngleDegrees * Math.PI) / 180)
  if (!(g > 0 && g < 1) || !isCount(m)) return failure('out-of-range')
  const cage = (r / 2) * (1 - g)
  return {
    ok: true,
    cage,
    outerRace: m * cage,
    innerRace: ((m * r) / 2) * (1 + g),
    ball: ((r * pitchDiameter) / (2 * ballDiameter)) * (1 - g * g),
  }
}

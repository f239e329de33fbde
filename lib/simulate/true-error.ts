import { SIDEREAL_DAY_SECONDS } from '@/lib/analysis/constants'
import type { SimulationOptions } from './options'

const TAU = 2 * Math.PI
const RADIANS_PER_DEGREE = Math.PI / 180

/** Worm period of a simulated mount, starts · 86164.0905 s / teeth. */
export function simulatedWormPeriodSeconds({
  wheelTeeth,
  wormStarts,
}: Pick<SimulationOptions, 'wheelTeeth' | 'wormStarts'>) {
  return (wormStarts * SIDEREAL_DAY_SECONDS) / wheelTeeth
}

/** Offsets of the fundamental's cosine and sine (in worm angle from the start of the run) at turns 0, 1, 2, … */
export interface TurnWander {
  cosArcsec: Float64Array
  sinArcsec: Float64Array
}

/** The parts of the tracking error, each in arc seconds of axis. */
export interface ErrorParts {
  worm: number
  gears: number
  drift: number
  steps: number
}

/**
 * The tracking error's parts averaged over an exposure of T seconds about time t (T = 0: the instant itself).
 *
 * A sinusoid of frequency f averages to sinc(fT) = sin(πfT)/(πfT) times its value at mid-exposure; a power of t to the
 * difference of its integral at both ends; a step to the share of the exposure after it. The fundamental's wander from
 * turn to turn is so slow that its value at mid-exposure stands for the exposure.
 *
 * @param timeSeconds t, mid-exposure, from the start of the run
 * @param exposureSeconds T
 * @param wander from turn to turn; it must reach past the turn of t
 */
export function averagedErrorParts(
  options: SimulationOptions,
  wander: TurnWander,
  timeSeconds: number,
  exposureSeconds: number,
): ErrorParts {
  const period = simulatedWormPeriodSeconds(options)
  const turns = timeSeconds / period
  const startAngle = options.startWormAngleDegrees * RADIANS_PER_DEGREE
  let worm = 0
  for (const { order, amplitudeArcsec, phaseDegrees } of options.harmonics) {
    const argument = order * (TAU * turns + startAngle) - phaseDegrees * RADIANS_PER_DEGREE
    worm += amplitudeArcsec * sinc((order * exposureSeconds) / period) * Math.cos(argument)
  }
  if (options.turnWanderArcsec > 0) {
    const turn = Math.min(Math.max(Math.floor(turns), 0), wander.cosArcsec.length - 2)
    const share = turns - turn
    const cosine = wander.cosArcsec[turn] * (1 - share) + wander.cosArcsec[turn + 1] * share
    const sine = wander.sinArcsec[turn] * (1 - share) + wander.sinArcsec[turn + 1] * share
    const fading = sinc(exposureSeconds / period)
    worm += fading * (cosine * Math.cos(TAU * turns) + sine * Math.sin(TAU * turns))
  }
  let gears = 0
  for (const { order, amplitudeArcsec, phaseDegrees } of options.gears) {
    const argument = TAU * order * turns - phaseDegrees * RADIANS_PER_DEGREE
    gears += amplitudeArcsec * sinc((order * exposureSeconds) / period) * Math.cos(argument)
  }
  const start = timeSeconds - exposureSeconds / 2
  const end = timeSeconds + exposureSeconds / 2
  let drift = 0
  options.driftCoefficients.forEach((coefficient, i) => {
    const power = i + 1
    drift +=
      coefficient *
      (exposureSeconds > 0
        ? (end ** (power + 1) - start ** (power + 1)) / ((power + 1) * exposureSeconds)
        : timeSeconds ** power)
  })
  let steps = 0
  for (const { atSeconds, heightArcsec } of options.steps) {
    const share = exposureSeconds > 0 ? (end - atSeconds) / exposureSeconds : timeSeconds >= atSeconds ? 1 : 0
    steps += heightArcsec * Math.min(Math.max(share, 0), 1)
  }
  return { worm, gears, drift, steps }
}

/** sin(πx)/(πx), 1 at 0. */
export function sinc(x: number): number {
  const angle = Math.PI * x
  return Math.abs(angle) < 1e-8 ? 1 : Math.sin(angle) / angle
}

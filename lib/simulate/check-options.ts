import type { SimulationOptions } from './options'

const LARGEST_ROW_COUNT = 20_000_000

/**
 * Stops a simulation that was asked for wrongly.
 *
 * @throws {RangeError} naming the option, the demand and the value
 */
export function checkOptions(options: SimulationOptions): void {
  const { seeing, declination, conversion } = options
  demandWhole('wheelTeeth', options.wheelTeeth, 1)
  demandWhole('wormStarts', options.wormStarts, 1)
  demandWhole('seed', options.seed, 0)
  demandPositive('cadenceSeconds', options.cadenceSeconds)
  demandPositive('durationSeconds', options.durationSeconds)
  demandNotNegative('cadenceJitterSeconds', options.cadenceJitterSeconds)
  demandNotNegative('turnWanderArcsec', options.turnWanderArcsec)
  demandNotNegative('quantum', options.quantum)
  demandNotNegative('wormAngleQuantumDegrees', options.wormAngleQuantumDegrees ?? 0)
  demandFinite('startWormAngleDegrees', options.startWormAngleDegrees)
  options.driftCoefficients.forEach((value, i) => demandFinite(`driftCoefficients[${i}]`, value))
  for (const { order, amplitudeArcsec, phaseDegrees } of options.harmonics) {
    demandWhole('order of a harmonic', order, 1)
    demandFinite('amplitudeArcsec', amplitudeArcsec)
    demandFinite('phaseDegrees', phaseDegrees)
  }
  for (const { order, amplitudeArcsec, phaseDegrees } of options.gears) {
    demandPositive('order of a gear', order)
    demandFinite('amplitudeArcsec', amplitudeArcsec)
    demandFinite('phaseDegrees', phaseDegrees)
  }
  for (const air of declination ? [seeing, declination.seeing] : [seeing]) {
    demandNotNegative('whiteSkyArcsec', air.whiteSkyArcsec)
    demandNotNegative('correlatedSkyArcsec', air.correlatedSkyArcsec)
    demandPositive('correlationSeconds', air.correlationSeconds)
  }
  demandNotNegative('exposureSeconds', conversion.exposureSeconds ?? 0)
  if (conversion.displacementUnit === 'px')
    demandPositive('imageScaleArcsecPerPx', conversion.imageScaleArcsecPerPx ?? 0)
  if (Math.abs(conversion.declinationDegrees ?? 0) >= 89) {
    throw new RangeError(`declinationDegrees must lie within ±89: got ${conversion.declinationDegrees}`)
  }
  if (options.durationSeconds / options.cadenceSeconds > LARGEST_ROW_COUNT) {
    throw new RangeError(`durationSeconds / cadenceSeconds must be at most ${LARGEST_ROW_COUNT}`)
  }
}

function demandFinite(name: string, value: number) {
  if (!Number.isFinite(value)) throw new RangeError(`${name} must be finite: got ${value}`)
}

function demandNotNegative(name: string, value: number) {
  if (!(value >= 0 && Number.isFinite(value))) throw new RangeError(`${name} must be at least 0: got ${value}`)
}

function demandPositive(name: string, value: number) {
  if (!(value > 0 && Number.isFinite(value))) throw new RangeError(`${name} must be above 0: got ${value}`)
}

function demandWhole(name: string, value: number, least: number) {
  if (!Number.isInteger(value) || value < least) {
    throw new RangeError(`${name} must be a whole number of at least ${least}: got ${value}`)
  }
}

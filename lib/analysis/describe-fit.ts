import { SIDEREAL_RATE_ARCSEC_PER_SECOND } from './constants'
import { describeOscillation, listOscillations, propagate } from './fit-covariance'
import type { FitErrors, FitOscillation } from './fit-covariance'
import { matchOrder } from './gear-train'
import { curveExtrema, curveRms, steepestPoint } from './harmonic-curve'
import type { JointFit } from './joint-fit'
import type { FoundLine } from './prewhiten'
import { exposureAttenuation } from './sampling'
import { normaliseDegrees } from './statistics'
import type {
  AnalysisResult,
  Estimate,
  HarmonicCoefficients,
  HarmonicResult,
  LineResult,
  PredictedOrder,
  WormResult,
} from './types'

const DEGREES = 180 / Math.PI

/** What dividing by the exposure's sinc does to an amplitude; 1 where it must not be corrected. */
function exposureFactor(frequencyHz: number, exposureSeconds: number | null): number {
  const { factor, isCorrectable } = exposureAttenuation(frequencyHz, exposureSeconds)
  return isCorrectable ? factor : 1
}

/** Coefficients of (t − t_mid)^1, ^2, ^3 and the rate at t_mid, from those of τ = (t − t_mid)/h. */
export function describeDrift(fit: JointFit, errors: FitErrors): AnalysisResult['drift'] {
  const half = fit.time.halfSpanSeconds
  const coefficients: Estimate[] = []
  for (let j = 1; j <= fit.shape.driftDegree; j++) {
    coefficients.push({
      value: fit.coefficients[j] / half ** j,
      stderr: Math.sqrt(errors.reported[j][j]) / half ** j,
    })
  }
  const rate = coefficients[0] ?? { value: 0, stderr: null }
  return {
    degree: fit.shape.driftDegree,
    coefficients,
    rateArcsecPerSecond: rate,
    percentOfSidereal: (100 * rate.value) / SIDEREAL_RATE_ARCSEC_PER_SECOND,
  }
}

/** a_k, b_k of the worm at t_ref, with the exposure's averaging taken back. */
function wormHarmonics(fit: JointFit, oscillations: readonly FitOscillation[], exposureSeconds: number | null) {
  return oscillations.map(({ column, frequencyHz }, index): HarmonicCoefficients => {
    const factor = exposureFactor(frequencyHz, exposureSeconds)
    return {
      order: fit.shape.wormOrders[index],
      cosArcsec: fit.coefficients[column] / factor,
      sinArcsec: fit.coefficients[column + 1] / factor,
    }
  })
}

export interface WormContext {
  firstUsedTimeSeconds: number
  exposureSeconds: number | null
  periodSource: WormResult['periodSource']
  /** The period as it was given where it is held: one over one over it may differ in the last digit. */
  heldPeriodSeconds: number | null
  fittedPeriodSeconds: Estimate | null
  gearPeriodSeconds: number | null
}

/**
 * The worm's figures from a joint fit: harmonics at the first used sample; peak-to-peak with σ² = GᵀCG,
 * G = (cos kθ₊ − cos kθ₋, sin kθ₊ − sin kθ₋); the steepest rate R with gradient ±(2πk/P)(−sin kθ*, cos kθ*) and
 * −R/P for the period.
 */
export function describeWorm(fit: JointFit, errors: FitErrors, context: WormContext): WormResult {
  const { firstUsedTimeSeconds, exposureSeconds } = context
  const oscillations = listOscillations(fit).slice(0, fit.shape.wormOrders.length)
  const covariance = errors.reported
  const harmonics = oscillations.map((oscillation, index): HarmonicResult => {
    const figures = describeOscillation(fit, covariance, oscillation, firstUsedTimeSeconds)
    const factor = exposureFactor(oscillation.frequencyHz, exposureSeconds)
    const size = Math.abs(factor)
    const turned = factor < 0 ? 180 : 0
    const [aa, ab, bb] = figures.covariance
    return {
      order: fit.shape.wormOrders[index],
      periodSeconds: figures.periodSeconds.value,
      amplitudeArcsec: { value: figures.amplitude.value / size, stderr: scale(figures.amplitude.stderr, 1 / size) },
      phaseDegrees: {
        value: normaliseDegrees(figures.phaseRadians.value * DEGREES + turned),
        stderr: scale(figures.phaseRadians.stderr, DEGREES),
      },
      isPhaseMeaningful: figures.isPhaseMeaningful,
      cosArcsec: figures.cos / factor,
      sinArcsec: figures.sin / factor,
      covarianceArcsec2: [aa / size ** 2, ab / size ** 2, bb / size ** 2],
    }
  })

  const atReference = wormHarmonics(fit, oscillations, exposureSeconds)
  const period = context.heldPeriodSeconds ?? 1 / fit.frequencies.wormHz
  const { highest, lowest } = curveExtrema(atReference)
  const gradient = new Float64Array(covariance.length)
  const steep = steepestPoint(atReference)
  const rate = (2 * Math.PI * Math.abs(steep.value)) / period
  const sign = steep.value < 0 ? -1 : 1
  const rateGradient = new Float64Array(covariance.length)
  oscillations.forEach(({ column, frequencyHz }, index) => {
    const k = fit.shape.wormOrders[index]
    const factor = exposureFactor(frequencyHz, exposureSeconds)
    const [up, down, at] = [k * highest.angleRadians, k * lowest.angleRadians, k * steep.angleRadians]
    gradient[column] = (Math.cos(up) - Math.cos(down)) / factor
    gradient[column + 1] = (Math.sin(up) - Math.sin(down)) / factor
    rateGradient[column] = (-sign * 2 * Math.PI * k * Math.sin(at)) / period / factor
    rateGradient[column + 1] = (sign * 2 * Math.PI * k * Math.cos(at)) / period / factor
  })
  const frequencyParameter = oscillations[0]?.frequencyParameter ?? null
  // R = 2π f |slope|, so ∂R/∂f = R/f; in the period that is −R/P.
  if (frequencyParameter !== null) rateGradient[frequencyParameter] = rate * period

  const extremaAtFirst = curveExtrema(harmonics)
  const powers = atReference.map(({ cosArcsec, sinArcsec }) => cosArcsec ** 2 + sinArcsec ** 2)
  const allPower = powers.reduce((sum, power) => sum + power, 0)
  const frequencyStderr =
    frequencyParameter === null ? null : Math.sqrt(covariance[frequencyParameter][frequencyParameter])
  return {
    periodSeconds: { value: period, stderr: scale(frequencyStderr, period ** 2) },
    periodSource: context.periodSource,
    fittedPeriodSeconds: context.fittedPeriodSeconds,
    gearPeriodSeconds: context.gearPeriodSeconds,
    harmonics,
    peakToPeakArcsec: { value: highest.value - lowest.value, stderr: propagate(gradient, covariance) },
    rmsArcsec: curveRms(atReference),
    steepestRateArcsecPerSecond: { value: rate, stderr: propagate(rateGradient, covariance) },
    furthestAheadDegrees: normaliseDegrees(extremaAtFirst.highest.angleRadians * DEGREES),
    furthestAheadArcsec: extremaAtFirst.highest.value,
    furthestBehindDegrees: normaliseDegrees(extremaAtFirst.lowest.angleRadians * DEGREES),
    furthestBehindArcsec: extremaAtFirst.lowest.value,
    fundamentalPowerShare: allPower > 0 && fit.shape.wormOrders[0] === 1 ? powers[0] / allPower : 0,
  }
}

/** Lines of the final fit with their orders, and the part of the drive train that predicts each. */
export function describeLines(
  fit: JointFit,
  errors: FitErrors,
  context: {
    firstUsedTimeSeconds: number
    exposureSeconds: number | null
    found: readonly FoundLine[]
    predicted: readonly PredictedOrder[]
  },
): LineResult[] {
  const { firstUsedTimeSeconds, exposureSeconds, found, predicted } = context
  const span = 2 * fit.time.halfSpanSeconds
  const all = listOscillations(fit)
  const lines = all.slice(fit.shape.wormOrders.length)
  return lines.map((oscillation, index): LineResult => {
    const figures = describeOscillation(fit, errors.reported, oscillation, firstUsedTimeSeconds)
    const factor = exposureFactor(oscillation.frequencyHz, exposureSeconds)
    const size = Math.abs(factor)
    const order = orderOf(fit, errors, oscillation)
    const nearest = Math.min(
      ...all
        .filter((other) => other !== oscillation)
        .map((other) => Math.abs(other.frequencyHz - oscillation.frequencyHz)),
    )
    return {
      periodSeconds: figures.periodSeconds,
      frequencyHz: figures.frequencyHz,
      order,
      amplitudeArcsec: { value: figures.amplitude.value / size, stderr: scale(figures.amplitude.stderr, 1 / size) },
      phaseDegrees: {
        value: normaliseDegrees(figures.phaseRadians.value * DEGREES + (factor < 0 ? 180 : 0)),
        stderr: scale(figures.phaseRadians.stderr, DEGREES),
      },
      falseAlarmProbability: found[index]?.falseAlarmProbability ?? 1,
      signalToNoise: found[index]?.signalToNoise ?? 0,
      source: order === null ? null : (matchOrder(order, predicted, 1 / (span * fit.frequencies.wormHz))?.name ?? null),
      isUnresolved: nearest < 1 / span,
    }
  })
}

/** f_line/f_worm with its error, both frequencies' errors and their correlation included. */
export function orderOf(fit: JointFit, errors: FitErrors, line: FitOscillation): Estimate | null {
  if (fit.shape.wormOrders.length === 0) return null
  const wormHz = fit.frequencies.wormHz
  const gradient = new Float64Array(errors.reported.length)
  if (line.frequencyParameter !== null) gradient[line.frequencyParameter] = 1 / wormHz
  const wormParameter = listOscillations(fit)[0].frequencyParameter
  if (wormParameter !== null) gradient[wormParameter] = -line.frequencyHz / wormHz ** 2
  return { value: line.frequencyHz / wormHz, stderr: propagate(gradient, errors.reported) }
}

function scale(value: number | null, factor: number): number | null {
  return value === null ? null : value * factor
}

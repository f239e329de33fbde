import { describe, expect, test } from 'vitest'
import {
  autoregressiveCovariance,
  describeOscillation,
  estimateErrors,
  handAutoregressiveFactor,
  listOscillations,
  whiteCovariance,
} from '@/lib/analysis/fit-covariance'
import { describeDrift, describeWorm } from '@/lib/analysis/describe-fit'
import { fitJointly } from '@/lib/analysis/joint-fit'
import type { JointFit, JointFitRequest } from '@/lib/analysis/joint-fit'
import { factorQr, solveLeastSquares } from '@/lib/analysis/least-squares'
import { medianCadence } from '@/lib/analysis/sampling'
import type { Failure } from '@/lib/analysis/types'
import enso from '@/tests/reference/enso.json'
import reference from '@/tests/reference/jointfit.json'

function unwrap<T extends { ok: true }>(outcome: T | Failure): T {
  if (!outcome.ok) throw new Error(`unexpected failure: ${outcome.reason}`)
  return outcome
}

const relative = (value: number, expected: number) => Math.abs(value / expected - 1)

const track = { timeSeconds: Float64Array.from(reference.t), raArcsec: Float64Array.from(reference.y) }
const request: JointFitRequest = {
  track,
  driftDegree: 2,
  worm: { orders: [1, 2, 3], frequencyHz: 1 / reference.start.period, isFree: true },
  lines: [{ frequencyHz: 1 / reference.start.line_period, isFree: true }],
  highestFrequencyHz: 0.19,
  isPolished: true,
}

// Reference: tests/reference/jointfit.json; tolerances 1e-7 on parameters and 1e-6 on standard errors.
describe('fitJointly on the synthetic run of four turns', () => {
  const fit = unwrap(fitJointly(request))
  const qr = factorQr(fit.jacobian)
  if (!qr.ok) throw new Error(qr.reason)
  const period = 1 / fit.frequencies.wormHz
  const linePeriod = 1 / fit.frequencies.linesHz[0]
  const periodPerHertz = [...new Array<number>(11).fill(1), period ** 2, linePeriod ** 2]

  test('finds every parameter', () => {
    const values = [...fit.coefficients, period, linePeriod]
    values.forEach((value, j) => expect(relative(value, reference.value[j])).toBeLessThan(1e-7))
    expect(relative(fit.rss, reference.rss)).toBeLessThan(1e-10)
    expect(fit.residual.length - fit.parameterCount).toBe(reference.dof)
    expect(fit.isConverged).toBe(true)
  })

  test('gives the white standard errors from the full Jacobian', () => {
    whiteCovariance(fit, qr).forEach((row, j) => {
      expect(relative(Math.sqrt(row[j]) * periodPerHertz[j], reference.se_white[j])).toBeLessThan(1e-6)
    })
  })

  test('refers phases to any origin, with the error of the period in them', () => {
    const white = whiteCovariance(fit, qr)
    const [fundamental] = listOscillations(fit)
    const atMiddle = describeOscillation(fit, white, fundamental, fit.time.referenceSeconds)
    const atFirst = describeOscillation(fit, white, fundamental, track.timeSeconds[0])
    const degrees = 180 / Math.PI
    expect(relative(atMiddle.phaseRadians.value * degrees, 34.9208553043)).toBeLessThan(1e-7)
    expect(relative((atMiddle.phaseRadians.stderr ?? 0) * degrees, 0.1558224051)).toBeLessThan(1e-6)
    expect(relative(atFirst.phaseRadians.value * degrees, 66.1806026811)).toBeLessThan(1e-7)
    expect(relative((atFirst.phaseRadians.stderr ?? 0) * degrees, 0.3068895625)).toBeLessThan(1e-6)
    const series = listOscillations(fit).map((o) => describeOscillation(fit, white, o, fit.time.referenceSeconds))
    ;[...reference.harmonics, reference.line].forEach(({ A, se_A }, index) => {
      expect(relative(series[index].amplitude.value, A)).toBeLessThan(1e-7)
      expect(relative(series[index].amplitude.stderr ?? 0, se_A)).toBeLessThan(1e-6)
    })
  })

  test('peak-to-peak and steepest rate carry the white errors of the reference when those are asked for', () => {
    const errors = unwrap(estimateErrors(fit, track.timeSeconds, medianCadence(track.timeSeconds)))
    const worm = describeWorm(
      fit,
      { ...errors, reported: errors.white },
      {
        firstUsedTimeSeconds: 0,
        exposureSeconds: null,
        periodSource: 'fitted',
        heldPeriodSeconds: null,
        fittedPeriodSeconds: null,
        gearPeriodSeconds: null,
      },
    )
    expect(relative(worm.peakToPeakArcsec.value, reference.peak_to_peak)).toBeLessThan(1e-7)
    expect(relative(worm.peakToPeakArcsec.stderr ?? 0, reference.se_peak_to_peak)).toBeLessThan(1e-6)
    expect(relative(worm.steepestRateArcsecPerSecond.value, 0.14843567507)).toBeLessThan(1e-7)
    expect(relative(worm.steepestRateArcsecPerSecond.stderr ?? 0, 0.0012134822814)).toBeLessThan(1e-6)
    const drift = describeDrift(fit, { ...errors, reported: errors.white })
    expect(relative(drift.rateArcsecPerSecond.value, reference.drift_rate_at_tref_arcsec_per_s)).toBeLessThan(1e-7)
  })

  test('AR(1) sandwich: corrected lag-one correlation and the errors of worm, line and drift', () => {
    const cadenceSeconds = medianCadence(track.timeSeconds)
    const errors = unwrap(estimateErrors(fit, track.timeSeconds, cadenceSeconds))
    expect(relative(errors.lagOne, 0.0089071583434)).toBeLessThan(1e-6)
    expect(relative(errors.correctedLagOne, 0.0269691181563)).toBeLessThan(1e-6)
    const figures = (covariance: readonly Float64Array[]) => [
      Math.sqrt(covariance[11][11]) * period ** 2,
      Math.sqrt(covariance[12][12]) * linePeriod ** 2,
      Math.sqrt(covariance[1][1]) / fit.time.halfSpanSeconds,
    ]
    const expected = [0.1715840043056, 0.0440396971798, 2.99832617113e-5]
    figures(errors.autoregressive).forEach((value, k) => expect(relative(value, expected[k])).toBeLessThan(1e-6))
    const strong = { fit, qr, timeSeconds: track.timeSeconds, cadenceSeconds, lagOne: 0.6 }
    const expectedStrong = [0.3401471879093, 0.0786074739712, 5.9474928545e-5]
    figures(autoregressiveCovariance(strong)).forEach((value, k) => {
      expect(relative(value, expectedStrong[k])).toBeLessThan(1e-6)
    })
  })

  test('reported errors are never below the sandwich, and phases follow their amplitudes', () => {
    const errors = unwrap(estimateErrors(fit, track.timeSeconds, medianCadence(track.timeSeconds)))
    errors.reported.forEach((row, j) => {
      expect(row[j]).toBeGreaterThanOrEqual(errors.autoregressive[j][j] * (1 - 1e-12))
    })
  })

  test('starting within half a resolution element of the truth leads to the same minimum', () => {
    const span = 2 * fit.time.halfSpanSeconds
    for (const shift of [-0.4, 0.4]) {
      const frequencyHz = 1 / 478.69 + shift / span
      const other = unwrap(fitJointly({ ...request, worm: { orders: [1, 2, 3], frequencyHz, isFree: true } }))
      expect(relative(1 / other.frequencies.wormHz, reference.value[11])).toBeLessThan(1e-9)
    }
  })
})

// NIST Statistical Reference Datasets, nonlinear regression, ENSO: certified values, both published starting points.
describe.each(['start1', 'start2'] as const)('NIST StRD ENSO from %s', (start) => {
  const certified = enso.certified
  const guess = certified[start]
  const timeSeconds = Float64Array.from(enso.y, (_, i) => i + 1)
  const fit = unwrap(
    fitJointly({
      track: { timeSeconds, raArcsec: Float64Array.from(enso.y) },
      driftDegree: 0,
      worm: { orders: [1], frequencyHz: 1 / 12, isFree: false },
      lines: [3, 6].map((index) => ({ frequencyHz: 1 / guess[index], isFree: true })),
      highestFrequencyHz: 0.5,
      isPolished: true,
    }),
  )
  const qr = factorQr(fit.jacobian)
  if (!qr.ok) throw new Error(qr.reason)
  const covariance = whiteCovariance(fit, qr)
  const [annual, slow, fast] = listOscillations(fit).map((o) => describeOscillation(fit, covariance, o, 0))
  const digits = (value: number, expected: number) => -Math.log10(Math.max(relative(value, expected), 1e-16))

  test('parameters to at least 8 digits', () => {
    const values = [
      fit.coefficients[0],
      annual.cos,
      annual.sin,
      slow.periodSeconds.value,
      slow.cos,
      slow.sin,
      fast.periodSeconds.value,
      fast.cos,
      fast.sin,
    ]
    values.forEach((value, j) => expect(digits(value, certified.b[j])).toBeGreaterThan(8))
    expect(digits(fit.rss, certified.rss)).toBeGreaterThan(8)
  })

  test('standard deviations to at least 8 digits', () => {
    const deviations = [
      Math.sqrt(covariance[0][0]),
      Math.sqrt(annual.covariance[0]),
      Math.sqrt(annual.covariance[2]),
      slow.periodSeconds.stderr ?? 0,
      Math.sqrt(slow.covariance[0]),
      Math.sqrt(slow.covariance[2]),
      fast.periodSeconds.stderr ?? 0,
      Math.sqrt(fast.covariance[0]),
      Math.sqrt(fast.covariance[2]),
    ]
    deviations.forEach((value, j) => expect(digits(value, certified.sd[j])).toBeGreaterThan(8))
  })
})

describe('the joint fit has no bias where detrending first has one', () => {
  // reference.bias_table, computed with scipy: noise-free, A = 9″, P = 478.69 s, drift 0.02″/s, cadence 2 s, 72 phases.
  test.each([1436, 2000])('over %i s', (duration) => {
    const row = reference.bias_table.find((r) => r.T === duration && r.way === 'joint, degree 1')
    expect(row?.dP_max).toBeLessThan(1e-9)
    const timeSeconds = Float64Array.from({ length: duration / 2 + 1 }, (_, i) => 2 * i)
    let worst = 0
    let worstDetrended = 0
    for (let phase = 0; phase < 360; phase += 30) {
      const angle = (phase * Math.PI) / 180
      const raArcsec = timeSeconds.map((t) => 9 * Math.cos((2 * Math.PI * t) / 478.69 - angle) + 0.02 * t)
      const fitted = (values: Float64Array, driftDegree: number): JointFit =>
        unwrap(
          fitJointly({
            track: { timeSeconds, raArcsec: values },
            driftDegree,
            worm: { orders: [1], frequencyHz: 1 / 480, isFree: true },
            lines: [],
            highestFrequencyHz: 0.25,
            isPolished: true,
          }),
        )
      worst = Math.max(worst, Math.abs(1 / fitted(raArcsec, 1).frequencies.wormHz - 478.69))
      const line = unwrap(solveLeastSquares([new Float64Array(timeSeconds.length).fill(1), timeSeconds], raArcsec))
      worstDetrended = Math.max(worstDetrended, Math.abs(1 / fitted(line.residual, 0).frequencies.wormHz - 478.69))
    }
    expect(worst).toBeLessThan(1e-7)
    expect(worstDetrended).toBeGreaterThan(1)
  })
})

describe('refusals', () => {
  const short = { timeSeconds: track.timeSeconds.slice(0, 20), raArcsec: track.raArcsec.slice(0, 20) }
  test('fewer than p + 10 samples', () => {
    expect(fitJointly({ ...request, track: short })).toEqual({ ok: false, reason: 'few-points', needed: 23, got: 20 })
  })

  test('two lines of one frequency depend on each other', () => {
    const twice = [0, 1].map(() => ({ frequencyHz: 1 / 61.3, isFree: false }))
    expect(fitJointly({ ...request, lines: twice })).toEqual({ ok: false, reason: 'singular' })
  })

  test('a line with nothing at its frequency runs to the edge of its box or stays harmless, and is told', () => {
    const fit = unwrap(fitJointly({ ...request, lines: [{ frequencyHz: 1 / 20, isFree: true }] }))
    for (const value of [...fit.coefficients, fit.rss, fit.frequencies.linesHz[0]])
      expect(Number.isFinite(value)).toBe(true)
    const span = 2 * fit.time.halfSpanSeconds
    expect(Math.abs(fit.frequencies.linesHz[0] - 1 / 20)).toBeLessThanOrEqual(1.001 / span)
  })
})

test('the AR(1) factor by hand is close to the limit (1 + r)/(1 − r) for the drift', () => {
  const factor = handAutoregressiveFactor({
    lagOne: 0.6,
    frequencyHz: 0,
    cadenceSeconds: 2.5,
    sampleCount: 766,
    parameterCount: 9,
  })
  expect(relative(factor, 4.1479452055)).toBeLessThan(1e-9)
})

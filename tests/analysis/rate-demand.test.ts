import { describe, expect, test } from 'vitest'
import { longestInterval, rateDemand, shareOfFramesKept, type RateDemandInput } from '@/lib/analysis/rate-demand'
import checks from '../reference/checks.json'
import rehearsal from '../reference/rehearsal.json'

const periodSeconds = rehearsal.period_s
const worm = rehearsal.north_a.map((cosArcsec, i) => ({ order: i + 1, cosArcsec, sinArcsec: rehearsal.north_b[i] }))
const line = [{ order: 1, cosArcsec: 9, sinArcsec: 0 }]

const input: RateDemandInput = {
  harmonics: worm,
  periodSeconds,
  driftArcsecPerSecond: 0,
  lines: [],
  toleranceSkyArcsec: 0.5,
  declinationDegrees: null,
  pictureExposureSeconds: 60,
}

// Closed forms and brute force in Python; the handful of numbers stands in checks.json.
describe('steepest rate', () => {
  test('9″ at 478.69 s: 0.1181321268″/s', () => {
    const expected = checks.values['13.max_rate_9_478.69']
    expect(rateDemand({ ...input, harmonics: line }).steepestArcsecPerSecond).toBeCloseTo(expected, 12)
  })

  test('worm 9/1.6/0.7: 0.1477199236″/s, 0.98211 % of sidereal; drift and lines are added', () => {
    const rate = rateDemand({
      ...input,
      driftArcsecPerSecond: -0.02,
      lines: [{ amplitudeArcsec: 0.5, frequencyHz: 1 / 61.3 }],
    })
    expect(rate.steepestArcsecPerSecond).toBeCloseTo(checks.values['13.max_rate_worm_9_1.6_0.7'], 9)
    expect(rate.percentOfSidereal).toBeCloseTo(0.98211, 5)
    expect(rate.steepestWithDriftArcsecPerSecond).toBeCloseTo(rate.steepestArcsecPerSecond + 0.02 + Math.PI / 61.3, 14)
  })
})

describe('longest time between corrections', () => {
  test('one line exactly (P/π)·asin(q/2A) = 4.2330933711 s', () => {
    const expected = checks.values['13.longest_exposure_0.5_exact']
    expect(longestInterval({ ...input, harmonics: line }, 0.5)).toBeCloseTo(expected, 9)
    expect(longestInterval({ ...input, harmonics: line }, 15)).toBeCloseTo(
      (periodSeconds / Math.PI) * Math.asin(15 / 18),
      8,
    )
  })

  test('worm 9/1.6/0.7 exactly 3.3855518 s', () => {
    // The reference scans 200 001 phases: good to about 1e-8.
    expect(longestInterval(input, 0.5)).toBeCloseTo(checks.values['13.longest_exposure_worm_0.5_exact'], 7)
  })

  test('with drift 0.02″/s a little above the small-angle 2.98116 s', () => {
    const seconds = longestInterval({ ...input, driftArcsecPerSecond: 0.02 }, 0.5) ?? 0
    const smallAngle = checks.values['13.with_drift_0.02']
    expect(seconds).toBeGreaterThan(smallAngle)
    expect(seconds / smallAngle).toBeLessThan(1.0005)
  })

  test('a tolerance above the peak-to-peak is never reached without drift', () => {
    expect(longestInterval(input, 20)).toBeNull()
    expect(longestInterval({ ...input, harmonics: line }, 18.001)).toBeNull()
    expect(longestInterval({ ...input, harmonics: [] }, 1)).toBeNull()
    expect(longestInterval({ ...input, harmonics: [], driftArcsecPerSecond: 0.01 }, 1)).toBeCloseTo(100, 9)
  })

  test('a tolerance on the sky is q/cos δ on the axis', () => {
    const rate = rateDemand({ ...input, harmonics: line, declinationDegrees: 60 })
    expect(rate.toleranceAxisArcsec).toBeCloseTo(1, 14)
    expect(rate.longestCorrectionIntervalSeconds).toBeCloseTo((periodSeconds / Math.PI) * Math.asin(1 / 18), 9)
  })
})

describe('share of frames kept at 60 s', () => {
  const share = (change: Partial<Parameters<typeof shareOfFramesKept>[0]>) =>
    shareOfFramesKept({
      harmonics: worm,
      periodSeconds,
      driftArcsecPerSecond: 0,
      pictureExposureSeconds: 60,
      toleranceArcsec: 2,
      ...change,
    })

  test('one line by the closed form: 2″ 0.1820096, 4″ 0.3932639', () => {
    // 7200 phases resolve four edges per turn to 1/7200 each
    expect(share({ harmonics: line })).toBeCloseTo(checks.values['13.share_kept_9_60s_2'], 3)
    expect(share({ harmonics: line, toleranceArcsec: 4 })).toBeCloseTo(checks.values['13.share_kept_9_60s_4'], 3)
  })

  test('worm 9/1.6/0.7: 0.125 and 0.413', () => {
    // printed to three decimals
    expect(Math.abs(share({}) - checks.values['13.share_kept_worm_60s_2'])).toBeLessThan(0.001)
    expect(Math.abs(share({ toleranceArcsec: 4 }) - checks.values['13.share_kept_worm_60s_4'])).toBeLessThan(0.001)
  })

  test('limits: all, none, drift alone, exposures of many turns', () => {
    expect(share({ toleranceArcsec: 20 })).toBe(1)
    expect(share({ toleranceArcsec: 20, pictureExposureSeconds: 36_000 })).toBe(1)
    expect(share({ toleranceArcsec: 19, pictureExposureSeconds: 36_000 })).toBe(0)
    expect(share({ harmonics: [], driftArcsecPerSecond: -0.03 })).toBe(1)
    expect(share({ harmonics: [], driftArcsecPerSecond: -0.04 })).toBe(0)
  })
})

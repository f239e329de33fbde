import { describe, expect, test } from 'vitest'
import {
  curveExtrema,
  curvePeakToPeak,
  curveRms,
  harmonicSlope,
  harmonicValue,
  shiftHarmonics,
  steepestPoint,
} from '@/lib/analysis/harmonic-curve'
import type { HarmonicCoefficients } from '@/lib/analysis/types'
import rehearsal from '../reference/rehearsal.json'

/** Amplitudes 9, 1.6, 0.7 and phases 35°, 250°, 110° of rehearsal.json. */
const worm: HarmonicCoefficients[] = rehearsal.north_a.map((cosArcsec, i) => ({
  order: i + 1,
  cosArcsec,
  sinArcsec: rehearsal.north_b[i],
}))

describe('the curve of rehearsal.json', () => {
  // The reference scans 720 720 points, so its extrema are low by up to (2π/720720)²/8 · max|e''| < 2e-10.
  test('peak-to-peak 19.3973301″, rms 6.4826692″', () => {
    expect(curvePeakToPeak(worm)).toBeCloseTo(rehearsal.raw_peak_to_peak, 9)
    expect(curveRms(worm)).toBeCloseTo(rehearsal.raw_rms, 12)
  })

  test('steepest rate 0.1477199236″/s at P = 478.69 s', () => {
    const rate = (Math.abs(steepestPoint(worm).value) * 2 * Math.PI) / rehearsal.period_s
    expect(rate).toBeCloseTo(rehearsal.max_rate_arcsec_per_s, 10)
  })

  test('the slope vanishes at both extrema and is the difference quotient elsewhere', () => {
    const { highest, lowest } = curveExtrema(worm)
    expect(harmonicSlope(worm, highest.angleRadians)).toBeCloseTo(0, 10)
    expect(harmonicSlope(worm, lowest.angleRadians)).toBeCloseTo(0, 10)
    for (const angle of [0, 1, 2.5, 4]) {
      const quotient = (harmonicValue(worm, angle + 1e-6) - harmonicValue(worm, angle - 1e-6)) / 2e-6
      expect(harmonicSlope(worm, angle)).toBeCloseTo(quotient, 7)
    }
  })
})

test('one line of amplitude 9 and phase 35° peaks at 35°, is lowest at 215° and steepest by 9 per radian', () => {
  const line = [worm[0]]
  const { highest, lowest } = curveExtrema(line)
  expect((highest.angleRadians * 180) / Math.PI).toBeCloseTo(35, 10)
  expect((lowest.angleRadians * 180) / Math.PI).toBeCloseTo(215, 10)
  expect(highest.value).toBeCloseTo(9, 12)
  expect(Math.abs(steepestPoint(line).value)).toBeCloseTo(9, 12)
})

test('shifting the origin by an angle moves the curve by that angle', () => {
  const shifted = shiftHarmonics(worm, 0.8)
  for (const angle of [0, 0.3, 2, 5])
    expect(harmonicValue(shifted, angle)).toBeCloseTo(harmonicValue(worm, angle + 0.8), 12)
})

test('no harmonics: a flat curve', () => {
  expect(curvePeakToPeak([])).toBe(0)
  expect(steepestPoint([]).value).toBeCloseTo(0, 15)
  expect(harmonicValue([], 1)).toBe(0)
})

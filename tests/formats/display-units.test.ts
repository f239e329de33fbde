import { describe, expect, test } from 'vitest'
import { toTrack } from '@/lib/analysis/convert'
import {
  acrossTheAxis,
  displayOf,
  formatDisplacement,
  formatSwing,
  isWithoutPixels,
  PLAIN_DISPLAY,
  scaledValues,
  shownDisplacement,
  shownSwing,
  sizedDisplacement,
  sizedSwing,
  swingColumn,
  type Display,
} from '@/lib/display-units'
import { exampleRecipe } from '../support/example-outcome'

const { conversion } = exampleRecipe()
const PIXELS = { swingMeasure: 'amplitude', displacementUnit: 'px' } as const
const PEAK: Display = { ...PLAIN_DISPLAY, swingMeasure: 'peak-to-peak' }

describe('a swing', () => {
  const amplitude = { value: 0.25, stderr: 0.03 }

  test('of 0.25 ± 0.03″ amplitude is 0.50 ± 0.06″ from peak to peak', () => {
    expect(shownSwing(amplitude, PEAK)).toEqual({ value: 0.5, stderr: 0.06 })
    expect(formatSwing(amplitude, PLAIN_DISPLAY)).toBe('0.250 ± 0.030″')
    expect(formatSwing(amplitude, PEAK)).toBe('0.500 ± 0.060″')
    expect(sizedSwing(4, PEAK)).toBe('8.0″')
  })

  test('without a standard error stays without one', () => {
    expect(shownSwing({ value: 0.25, stderr: null }, PEAK)).toEqual({ value: 0.5, stderr: null })
  })

  test('in pixels of 2″ is half as large, and twice that from peak to peak', () => {
    const px: Display = { ...PLAIN_DISPLAY, arcsecPerPx: 2 }
    expect(formatSwing(amplitude, px)).toBe('0.125 ± 0.015\u202fpx')
    expect(formatSwing(amplitude, { ...px, swingMeasure: 'peak-to-peak' })).toBe('0.250 ± 0.030\u202fpx')
  })
})

test('a displacement is never doubled', () => {
  expect(shownDisplacement({ value: 16, stderr: 0.1 }, PEAK)).toEqual({ value: 16, stderr: 0.1 })
  expect(sizedDisplacement(16, PEAK)).toBe('16.0″')
  expect(formatDisplacement({ value: 16, stderr: 0.1 }, PEAK)).toBe('16.00 ± 0.10″')
})

describe('a pixel', () => {
  test('on the sky is image scale over cos δ on the axis: the pixels of the recording again', () => {
    const display = displayOf(PIXELS, conversion)
    expect(display.arcsecPerPx).toBeCloseTo(1.55 / Math.cos((8.9 * Math.PI) / 180), 12)
    const columns = {
      timeSeconds: Float64Array.of(0, 1),
      displacement: Float64Array.of(3, -2),
      declinationDisplacement: null,
      wormAngleDegrees: null,
    }
    const converted = toTrack(columns, { ...conversion, positiveMeans: 'ahead' })
    if (!converted.ok) throw new Error(converted.reason)
    const shown = [...converted.track.raArcsec].map(
      (value) => shownDisplacement({ value, stderr: null }, display).value,
    )
    expect(shown[0]).toBeCloseTo(3, 12)
    expect(shown[1]).toBeCloseTo(-2, 12)
  })

  test('measured on the axis, and across it, cos δ plays no part', () => {
    expect(displayOf(PIXELS, { ...conversion, frame: 'axis', declinationDegrees: null }).arcsecPerPx).toBe(1.55)
    expect(acrossTheAxis(displayOf(PIXELS, conversion)).arcsecPerPx).toBe(1.55)
  })

  test.each([
    ['recorded in arc seconds', { displacementUnit: 'arcsec' as const }],
    ['recorded in seconds of right ascension', { displacementUnit: 'ra-seconds' as const }],
    ['without a scale', { imageScaleArcsecPerPx: null }],
    ['with a scale of zero', { imageScaleArcsecPerPx: 0 }],
    ['on the sky of an unknown declination', { declinationDegrees: null }],
    ['beside the pole', { declinationDegrees: 89.5 }],
  ])('is of no known size in a run %s: arc seconds', (_, change) => {
    const display = displayOf(PIXELS, { ...conversion, ...change })
    expect(display).toEqual(PLAIN_DISPLAY)
    expect(isWithoutPixels(PIXELS, display)).toBe(true)
    expect(sizedDisplacement(16, display)).toBe('16.0″')
  })

  test('is neither shown in lists nor to those who did not ask for it', () => {
    expect(displayOf(PIXELS, null)).toEqual(PLAIN_DISPLAY)
    const arcsec = { ...PIXELS, displacementUnit: 'arcsec' } as const
    expect(displayOf(arcsec, conversion)).toEqual(PLAIN_DISPLAY)
    expect(isWithoutPixels(arcsec, PLAIN_DISPLAY)).toBe(false)
  })
})

test('heads of columns name measure and unit', () => {
  const px: Display = { swingMeasure: 'peak-to-peak', arcsecPerPx: 2, declinationArcsecPerPx: 2 }
  expect([swingColumn(PLAIN_DISPLAY), swingColumn(px), swingColumn(px, 'stderr')]).toEqual([
    'amplitude_arcsec',
    'peak_to_peak_px',
    'peak_to_peak_stderr_px',
  ])
})

test('the plain display hands the core’s own arrays on', () => {
  const values = Float64Array.of(1, NaN)
  expect(scaledValues(values, 1)).toBe(values)
  expect([...scaledValues(values, 2)]).toEqual([2, NaN])
})

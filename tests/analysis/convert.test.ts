import { describe, expect, test } from 'vitest'
import { SIDEREAL_RATE_ARCSEC_PER_SECOND } from '@/lib/analysis/constants'
import { imageScale, scaleUncertaintyPercent, toTrack } from '@/lib/analysis/convert'
import type { Conversion, RunColumns } from '@/lib/analysis/types'
import checks from '../reference/checks.json'

const conversion: Conversion = {
  displacementUnit: 'arcsec',
  imageScaleArcsecPerPx: null,
  imageScaleUncertaintyPercent: null,
  declinationDegrees: 60,
  declinationUncertaintyDegrees: null,
  frame: 'sky',
  positiveMeans: 'ahead',
  senseBasis: 'assumed',
  exposureSeconds: 2,
  timeStamp: 'mid',
}

const columns = (displacement: number[]): RunColumns => ({
  timeSeconds: Float64Array.from(displacement, (_, i) => 10 * i),
  displacement: Float64Array.from(displacement),
  declinationDisplacement: null,
  wormAngleDegrees: null,
})

function converted(displacement: number[], change: Partial<Conversion>) {
  const outcome = toTrack(columns(displacement), { ...conversion, ...change })
  if (!outcome.ok) throw new Error(outcome.reason)
  return outcome
}

// IAU value of the mean sidereal day in UT: Aoki et al. (1982), A&A 105, 359.
test('sidereal rate 15.041068645644″/s', () => {
  expect(SIDEREAL_RATE_ARCSEC_PER_SECOND).toBeCloseTo(checks.values['1.sidereal_rate'], 11)
})

test('imageScale of 3.75 µm at 240 mm is 3.22288759375″/px, of 2.9 µm binned by 2 at 1000 mm 1.1963358748″/px', () => {
  const first = imageScale({ pixelSizeMicrometres: 3.75, binning: 1, focalLengthMillimetres: 240 })
  const second = imageScale({ pixelSizeMicrometres: 2.9, binning: 2, focalLengthMillimetres: 1000 })
  // The reference uses the constant as printed, 206.264806, which is low by 1.2e-9.
  expect(first.ok && first.arcsecPerPx / 3.22288759375 - 1).toBeCloseTo(0, 8)
  expect(second.ok && second.arcsecPerPx / 1.1963358748 - 1).toBeCloseTo(0, 8)
})

test.each([0, -1, NaN, Infinity])('imageScale with focal length %f is out of range', (focalLengthMillimetres) => {
  expect(imageScale({ pixelSizeMicrometres: 3.75, binning: 1, focalLengthMillimetres })).toEqual({
    ok: false,
    reason: 'out-of-range',
  })
})

describe('toTrack', () => {
  test('5″ on the sky at δ = 60° are 10″ of axis', () => {
    expect(converted([5], {}).track.raArcsec[0]).toBeCloseTo(10, 12)
  })

  test('5″ said to be on the axis stay 5″, whatever the declination', () => {
    expect(converted([5], { frame: 'axis', declinationDegrees: null }).track.raArcsec[0]).toBe(5)
  })

  test('pixels take the image scale', () => {
    const { track } = converted([2], { displacementUnit: 'px', imageScaleArcsecPerPx: 1.5, declinationDegrees: 0 })
    expect(track.raArcsec[0]).toBe(3)
  })

  // RA falls while the axis gains: a column of right ascension grows when the axis is behind.
  test('one second more of right ascension is −15″ of axis, without cos δ', () => {
    const { track } = converted([1], {
      displacementUnit: 'ra-seconds',
      positiveMeans: 'behind',
      declinationDegrees: 75,
    })
    expect(track.raArcsec[0]).toBe(-15)
  })

  test('stamps at the start or end of a 2 s exposure are moved to its middle', () => {
    expect(Array.from(converted([0, 0], { timeStamp: 'start' }).track.timeSeconds)).toEqual([1, 11])
    expect(Array.from(converted([0, 0], { timeStamp: 'end' }).track.timeSeconds)).toEqual([-1, 9])
    const unknown = converted([0], { timeStamp: 'start', exposureSeconds: null })
    expect([unknown.timeShiftSeconds, unknown.isTimeStampUncorrected]).toEqual([0, true])
  })

  test('declination displacement is scaled but never divided by cos δ', () => {
    const outcome = toTrack(
      { ...columns([1]), declinationDisplacement: Float64Array.of(4) },
      { ...conversion, displacementUnit: 'px', imageScaleArcsecPerPx: 2 },
    )
    expect(outcome.ok && outcome.declinationArcsec?.[0]).toBe(8)
  })

  test.each<Partial<Conversion>>([
    { displacementUnit: 'px', imageScaleArcsecPerPx: null },
    { displacementUnit: 'px', imageScaleArcsecPerPx: 0 },
    { declinationDegrees: null },
    { declinationDegrees: 89 },
    { declinationDegrees: -89.5 },
  ])('%o is out of range', (change) => {
    expect(toTrack(columns([1]), { ...conversion, ...change })).toEqual({ ok: false, reason: 'out-of-range' })
  })

  test('no rows are too few', () => {
    expect(toTrack(columns([]), conversion)).toMatchObject({ ok: false, reason: 'few-points' })
  })
})

test('scale 0.2 % and σ_δ 0.1° at 40° give 0.24789 %', () => {
  const percent = scaleUncertaintyPercent({
    ...conversion,
    declinationDegrees: 40,
    imageScaleUncertaintyPercent: 0.2,
    declinationUncertaintyDegrees: 0.1,
  })
  expect(percent).toBeCloseTo(100 * checks.values['1.type_b_scale_0.2pc_dec40_0.1deg'], 12)
  expect(scaleUncertaintyPercent(conversion)).toBeNull()
})

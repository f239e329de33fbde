import { describe, expect, test } from 'vitest'
import {
  aliasFrequency,
  exposureAttenuation,
  finestSplitOrders,
  highestDriftDegree,
  highestFrequency,
  jitterAliasShare,
  medianCadence,
  periodInterval,
  resolution,
  runLengthRule,
  startStampPhaseErrorDegrees,
} from '@/lib/analysis/sampling'
import checks from '../reference/checks.json'

describe('exposure averaging (sinc of the exposure, any textbook of signal processing)', () => {
  test('2 s at 8 s leave 0.9003163162, 5 s at 478.69 s 0.9998205446', () => {
    expect(exposureAttenuation(1 / 8, 2).factor).toBeCloseTo(checks.values['3.sinc_2s_at_8s'], 13)
    expect(1 / exposureAttenuation(1 / 8, 2).factor).toBeCloseTo(checks.values['3.sinc_correction_2s_at_8s'], 12)
    expect(exposureAttenuation(1 / 478.69, 5).factor).toBeCloseTo(checks.values['3.sinc_5s_at_478.69s'], 13)
  })

  test('correctable up to f·T_exp = 0.6034; turned by 180° beyond 1; no exposure leaves all', () => {
    expect(exposureAttenuation(0.6033, 1).isCorrectable).toBe(true)
    expect(exposureAttenuation(0.6035, 1).isCorrectable).toBe(false)
    expect(exposureAttenuation(1.5, 1).factor).toBeLessThan(0)
    expect(exposureAttenuation(0.01, null)).toEqual({ factor: 1, isCorrectable: true })
  })

  test('start stamps of 2 s exposures make the phase at 61.3 s too small by 5.8727569°', () => {
    const expected = checks.values['3.phase_lag_deg_start_stamp_2s_at_61.3s']
    expect(startStampPhaseErrorDegrees(1 / 61.3, 2)).toBeCloseTo(expected, 12)
  })
})

test('4 s sampled every 3 s shows at 12 s', () => {
  expect(1 / aliasFrequency(1 / 4, 3)).toBeCloseTo(checks.values['3.alias_period_of_4s_at_3s_cadence'], 12)
  expect(aliasFrequency(0.1, 3)).toBeCloseTo(0.1, 15)
})

test('jitter of a tenth and three tenths of the cadence leaves 82 % and 17 % of an alias', () => {
  expect(jitterAliasShare(0.1, 1)).toBeCloseTo(checks.values['3.jitter_alias_factor_gauss_0.1'], 13)
  expect(jitterAliasShare(0.3, 1)).toBeCloseTo(checks.values['3.jitter_alias_factor_gauss_0.3'], 13)
})

test('478.69 s in 2000 s: 427.52680 … 543.76354 s; under half a turn no interval', () => {
  const interval = periodInterval(478.69, 2000)
  const [low, high] = checks.values['3.period_interval_at_half_rayleigh']
  expect(Array.isArray(interval) && interval[0]).toBeCloseTo(low, 9)
  expect(Array.isArray(interval) && interval[1]).toBeCloseTo(high, 9)
  expect(periodInterval(478.69, 200)).toEqual({ ok: false, reason: 'short-run' })
})

test('limits: the longer of cadence and exposure; 1/T and 1.5/T; P/T', () => {
  expect(highestFrequency(2.5, null)).toBe(0.2)
  expect(highestFrequency(2.5, 4)).toBe(0.125)
  expect(resolution(2000)).toEqual({ rayleighHz: 0.0005, twoPeaksHz: 0.00075 })
  expect(finestSplitOrders(500, 2000)).toBe(0.25)
})

test('run-length rules (common practice, no source)', () => {
  expect([0.9, 1, 2.99, 3].map(runLengthRule)).toEqual([
    'no-worm',
    'period-from-gear',
    'period-from-gear',
    'period-free',
  ])
  expect([2.9, 3].map(highestDriftDegree)).toEqual([1, 3])
})

test('medianCadence ignores a gap', () => {
  expect(medianCadence(Float64Array.of(0, 2, 4, 6, 100, 102))).toBe(2)
  expect(medianCadence(Float64Array.of(5))).toBe(0)
})

import { describe, expect, test } from 'vitest'
import {
  bearingOrders,
  huntingMeshes,
  matchOrder,
  predictedOrders,
  stepperOrders,
  wormPeriod,
} from '@/lib/analysis/gear-train'
import type { DriveTrain } from '@/lib/analysis/types'
import checks from '../reference/checks.json'
import published from '../reference/published.json'

const train: DriveTrain = {
  axisKind: 'worm',
  wheelTeeth: 152,
  wormStarts: 1,
  stages: [
    { kind: 'belt', name: 'Belt', drivenTeeth: 60, drivingTeeth: 20, beltTeeth: 90 },
    { kind: 'gear-pair', name: 'Pinion', drivenTeeth: 48, drivingTeeth: 12 },
  ],
}

// The sidereal day of Aoki et al. (1982) over the teeth of the wheel.
test.each([
  [180, 478.68939167],
  [144, 598.36173958],
  [130, 662.80069615],
  [360, 239.34469583],
  [435, 198.07836897],
])('a wheel of %i teeth: worm period %f s', (wheelTeeth, seconds) => {
  const period = wormPeriod({ wheelTeeth, wormStarts: 1 })
  expect(period.ok && period.seconds).toBeCloseTo(seconds, 8)
})

test('a worm of two starts turns half as often; unknown or odd teeth give a reason', () => {
  const period = wormPeriod({ wheelTeeth: 360, wormStarts: 2 })
  expect(period.ok && period.seconds).toBeCloseTo(checks.values['2.worm_period_180'], 10)
  expect(wormPeriod({ wheelTeeth: null, wormStarts: 1 })).toEqual({ ok: false, reason: 'no-period' })
  expect(wormPeriod({ wheelTeeth: 0, wormStarts: 1 })).toEqual({ ok: false, reason: 'out-of-range' })
  expect(wormPeriod({ wheelTeeth: 12.5, wormStarts: 1 })).toEqual({ ok: false, reason: 'out-of-range' })
})

describe('predictedOrders of a belt of 90 teeth and a 48:12 pair', () => {
  // Kinematics; the reference walks the same train by hand.
  test.each([
    ['Worm', checks.values['2.train_order_worm'], checks.values['2.train_period_worm']],
    ['Belt', checks.values['2.train_order_belt'], checks.values['2.train_period_belt']],
    [
      'Belt, teeth',
      checks.values['2.train_order_pulley_tooth_mesh'],
      checks.values['2.train_period_pulley_tooth_mesh'],
    ],
    [
      'Shaft driving Belt',
      checks.values['2.train_order_intermediate_shaft'],
      checks.values['2.train_period_intermediate_shaft'],
    ],
    ['Pinion, tooth mesh', checks.values['2.train_order_gear_mesh'], checks.values['2.train_period_gear_mesh']],
    ['Motor shaft', checks.values['2.train_order_motor'], checks.values['2.train_period_motor']],
  ])('%s', (name, order, periodSeconds) => {
    const part = predictedOrders(train).find((candidate) => candidate.name === name)
    expect(part?.order).toBeCloseTo(order, 12)
    expect(part?.periodSeconds).toBeCloseTo(periodSeconds, 9)
  })

  test('both pulleys and both gears mesh at the same order', () => {
    const orders = Object.fromEntries(predictedOrders(train).map(({ name, order }) => [name, order]))
    expect(orders['Belt, teeth']).toBeCloseTo(20 * orders['Shaft driving Belt'], 10)
    expect(orders['Pinion, tooth mesh']).toBeCloseTo(12 * orders['Motor shaft'], 10)
  })

  test('another worm period scales the periods, not the orders; no teeth, no parts', () => {
    expect(predictedOrders(train, 570)[1].periodSeconds).toBeCloseTo(855, 10)
    expect(predictedOrders({ ...train, wheelTeeth: null })).toEqual([])
    expect(predictedOrders({ ...train, wheelTeeth: null }, 500)).toHaveLength(6)
    expect(predictedOrders({ ...train, stages: [{ ...train.stages[0], drivingTeeth: 0 }] })).toEqual([])
  })
})

test('matchOrder takes the nearest part within max(3σ, half of P/T), or none', () => {
  const parts = predictedOrders(train)
  expect(matchOrder({ value: 0.7, stderr: 0.002 }, parts, 0.25)?.name).toBe('Belt')
  expect(matchOrder({ value: 0.8, stderr: 0.002 }, parts, 0.25)).toBeNull()
  expect(matchOrder({ value: 0.8, stderr: 0.05 }, parts, 0.25)?.name).toBe('Belt')
  expect(matchOrder({ value: 0.84, stderr: null }, parts, 2)?.name).toBe('Worm')
})

test('stepper of 200 steps on order 12: full steps 2400, electrical cycle 600 (Kenjo & Sugawara 1994)', () => {
  expect(stepperOrders(12, 200)).toEqual({
    fullStep: checks.values['2.train_order_motor_full_step'],
    electrical: checks.values['2.train_order_motor_electrical_cycle'],
  })
})

test('a 60:22 pair repeats after 660 meshes', () => {
  expect(huntingMeshes(60, 22)).toBe(660)
})

describe('bearingOrders (Randall & Antoni 2011)', () => {
  test('nine balls of 3.175 on 14.5', () => {
    const orders = bearingOrders({
      shaftOrder: 1,
      ballCount: 9,
      ballDiameter: 3.175,
      pitchDiameter: 14.5,
      contactAngleDegrees: 0,
    })
    if (!orders.ok) throw new Error(orders.reason)
    expect(orders.cage).toBeCloseTo(checks.values['2.bearing_FTF'], 12)
    expect(orders.outerRace).toBeCloseTo(checks.values['2.bearing_BPFO'], 12)
    expect(orders.innerRace).toBeCloseTo(checks.values['2.bearing_BPFI'], 12)
    expect(orders.ball).toBeCloseTo(checks.values['2.bearing_BSF'], 12)
  })

  test('as printed with a public bearing data set: outer 3.5848, inner 5.4152, twice the ball 4.7135', () => {
    const { m, d, D, printed } = published.bearing_orders
    const orders = bearingOrders({
      shaftOrder: 1,
      ballCount: m,
      ballDiameter: d,
      pitchDiameter: D,
      contactAngleDegrees: 0,
    })
    if (!orders.ok) throw new Error(orders.reason)
    expect(Math.abs(orders.outerRace - printed.outer)).toBeLessThan(1e-4)
    expect(Math.abs(orders.innerRace - printed.inner)).toBeLessThan(1e-4)
    expect(Math.abs(2 * orders.ball - printed.twice_ball)).toBeLessThan(1e-4)
  })

  test('balls as large as the pitch circle are out of range', () => {
    expect(
      bearingOrders({ shaftOrder: 1, ballCount: 9, ballDiameter: 2, pitchDiameter: 2, contactAngleDegrees: 0 }),
    ).toEqual({ ok: false, reason: 'out-of-range' })
  })
})

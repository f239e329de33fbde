import { describe, expect, test } from 'vitest'
import { SIDEREAL_RATE_ARCSEC_PER_SECOND } from '@/lib/analysis/constants'
import {
  makeCorrectionTable,
  originFromWormAngle,
  playedTable,
  tableNodes,
  tableRates,
  type TableInput,
} from '@/lib/analysis/correction-table'
import { leaveOneTurnOut } from '@/lib/analysis/fold'
import { harmonicValue } from '@/lib/analysis/harmonic-curve'
import { playAt } from '@/lib/analysis/table-playback'
import type { TableResult, TableSettings } from '@/lib/analysis/types'
import checks from '../reference/checks.json'
import rehearsal from '../reference/rehearsal.json'
import { referenceRun } from '../support/reference-run'

const worm = rehearsal.north_a.map((cosArcsec, i) => ({ order: i + 1, cosArcsec, sinArcsec: rehearsal.north_b[i] }))

const settings: TableSettings = {
  binCount: 25,
  quantity: 'position',
  unit: 'arcsec',
  meaning: 'correction',
  angleDirection: 'increasing',
  origin: { kind: 'run-start' },
  offsetDegrees: 0,
  orders: 'default',
  gain: 1,
  playback: 'interpolated',
}

const input: TableInput = {
  harmonics: worm,
  periodSeconds: rehearsal.period_s,
  firstUsedTimeSeconds: 12,
  settings,
  defaultOrders: [1, 2, 3],
  wormAngleOriginSeconds: null,
  heldOutReduction: null,
}

function made(change: Partial<TableSettings> = {}, inputChange: Partial<TableInput> = {}): TableResult {
  const outcome = makeCorrectionTable({ ...input, ...inputChange, settings: { ...settings, ...change } })
  if ('ok' in outcome) throw new Error(outcome.reason)
  return outcome
}

const values = (table: TableResult) => table.bins.map(({ value }) => value)

// rehearsal.json: the same model and nodes computed in Python, closed forms confirmed by a dense FFT.
describe.each(rehearsal.cases.filter((item) => 'nodes_arcsec' in item))('$name', (item) => {
  const nodes = item.nodes_arcsec as number[]
  const percent = item.rate_percent_sidereal as number[]

  test('positions', () => {
    const table = made({ binCount: item.nodes })
    values(table).forEach((value, j) => expect(value).toBeCloseTo(nodes[j], 11))
    expect(values(table).reduce((a, b) => a + b)).toBeCloseTo(0, 11)
    expect(Math.abs(table.closureError)).toBeLessThan(1e-12)
  })

  test('rates in percent of sidereal and in ″/s, which add up to nothing', () => {
    const table = made({ binCount: item.nodes, quantity: 'rate', unit: 'percent-sidereal' })
    values(table).forEach((value, j) => expect(value).toBeCloseTo(percent[j], 11))
    expect(Math.abs(table.closureError)).toBeLessThan(1e-13)
    const perSecond = made({ binCount: item.nodes, quantity: 'rate', unit: 'arcsec-per-second' })
    values(perSecond).forEach((value, j) =>
      expect(value).toBeCloseTo((percent[j] * SIDEREAL_RATE_ARCSEC_PER_SECOND) / 100, 12),
    )
    expect(perSecond.largestRateArcsecPerSecond).toBeCloseTo(
      Math.max(...values(perSecond).map((value) => Math.abs(value))),
      15,
    )
  })
})

describe('a table at every setting', () => {
  test.each([8, 11, 240, 4096])('%i bins close exactly and have no mean', (binCount) => {
    for (const quantity of ['position', 'rate'] as const) {
      const table = made({ binCount, quantity, unit: 'arcsec-per-second' })
      expect(table.bins).toHaveLength(binCount)
      expect(Math.abs(table.closureError)).toBeLessThan(1e-12)
    }
    const nodes = tableNodes(worm, { binCount, gain: 1 })
    expect(Math.abs(nodes.reduce((a, b) => a + b) / binCount)).toBeLessThan(1e-13)
    expect(tableRates(nodes, 478.69).reduce((a, b) => a + b)).toBeCloseTo(0, 11)
  })

  test('meaning: what the axis does wrong is the negative of what it should do', () => {
    const correction = values(made())
    values(made({ meaning: 'error' })).forEach((value, j) => expect(value).toBe(-correction[j] + 0))
    // e > 0: the axis is ahead; the error listed at node 0 is the model there
    expect(values(made({ meaning: 'error' }))[0]).toBeCloseTo(harmonicValue(worm, 0), 1)
  })

  test('direction and offset change the listed angle, not the values', () => {
    const table = made({ binCount: 8, angleDirection: 'decreasing', offsetDegrees: 90 })
    expect(table.bins.map(({ angleDegrees }) => angleDegrees)).toEqual([90, 45, 0, 315, 270, 225, 180, 135])
    expect(values(table)).toEqual(values(made({ binCount: 8 })))
  })

  test('a rate listed by a falling angle keeps its sign: the worm still runs forwards', () => {
    const rate = { binCount: 8, quantity: 'rate', unit: 'percent-sidereal' } as const
    expect(values(made({ ...rate, angleDirection: 'decreasing' }))).toEqual(values(made(rate)))
  })

  test('a later origin turns the table by as much worm angle', () => {
    const quarter = rehearsal.period_s / 4
    const plain = values(made({ binCount: 240 }))
    const table = made({ binCount: 240, origin: { kind: 'index-time', timeSeconds: 12 + quarter } })
    expect(table.originTimeSeconds).toBe(12 + quarter)
    values(table).forEach((value, j) => expect(value).toBeCloseTo(plain[(j + 60) % 240], 10))
    // an index a whole turn later or two turns before is the same index
    const other = made({ binCount: 240, origin: { kind: 'index-time', timeSeconds: 12 - 2 * rehearsal.period_s } })
    values(other).forEach((value, j) => expect(value).toBeCloseTo(plain[j], 10))
  })

  test('only the wanted orders enter; the gain scales', () => {
    const table = made({ orders: [2], gain: 0.5 })
    expect(table.orders).toEqual([2])
    values(table).forEach((value, j) =>
      expect(value).toBeCloseTo(-0.5 * harmonicValue([worm[1]], (2 * Math.PI * j) / 25), 12),
    )
  })

  test('the unit follows the quantity', () => {
    expect(made({ unit: 'percent-sidereal' }).settings.unit).toBe('arcsec')
    expect(made({ quantity: 'rate', unit: 'arcsec' }).settings.unit).toBe('arcsec-per-second')
  })
})

describe('refusals', () => {
  const outcome = (change: Partial<TableSettings>, inputChange: Partial<TableInput> = {}) =>
    makeCorrectionTable({ ...input, ...inputChange, settings: { ...settings, ...change } })

  test('no worm angle, no included order, one bin, no period', () => {
    expect(outcome({ origin: { kind: 'worm-angle-column' } })).toEqual({ ok: false, reason: 'no-index' })
    expect(outcome({ orders: [9] })).toEqual({ ok: false, reason: 'singular' })
    expect(outcome({ binCount: 1 })).toEqual({ ok: false, reason: 'out-of-range' })
    expect(outcome({}, { periodSeconds: 0 })).toEqual({ ok: false, reason: 'out-of-range' })
  })
})

describe('originFromWormAngle', () => {
  const timeSeconds = Float64Array.from({ length: 400 }, (_, i) => 5 + 3 * i)
  const recorded = (sign: 1 | -1) =>
    timeSeconds.map((t) => {
      const degrees = (sign * 360 * (t - 200)) / 478.69
      return ((degrees % 360) + 360) % 360
    })

  test.each([
    [1, 'increasing'],
    [-1, 'decreasing'],
  ] as const)('angle that passes zero at 200 s, sign %i', (sign, direction) => {
    const wormAngleDegrees = recorded(sign)
    wormAngleDegrees[7] = NaN
    const origin = originFromWormAngle({ timeSeconds, wormAngleDegrees, periodSeconds: 478.69 })
    if (!origin.ok) throw new Error(origin.reason)
    expect(origin.direction).toBe(direction)
    expect(origin.originSeconds).toBeCloseTo(200, 8)
    expect(made({ origin: { kind: 'worm-angle-column' } }, { wormAngleOriginSeconds: 200 }).originTimeSeconds).toBe(200)
  })

  test('no angles, or angles that do not follow the period, are no index', () => {
    const none = new Float64Array(400).fill(NaN)
    expect(originFromWormAngle({ timeSeconds, wormAngleDegrees: none, periodSeconds: 478.69 })).toEqual({
      ok: false,
      reason: 'no-index',
    })
    expect(originFromWormAngle({ timeSeconds, wormAngleDegrees: recorded(1), periodSeconds: 300 })).toEqual({
      ok: false,
      reason: 'no-index',
    })
  })
})

// A table from the other turns removes as much as their harmonics do, less what bins lose (0.5 % of order 1 at 25).
test('on left-out turns of the reference run: 92.9 % by harmonics, little less by 25 bins', () => {
  const run = referenceRun()
  const fold = {
    timeSeconds: run.timeSeconds,
    values: run.raArcsec.map((y, i) => y - run.drift[i] - run.lineArcsec[i]),
    periodSeconds: run.periodSeconds,
    originSeconds: run.referenceSeconds,
  }
  const reduction = (binCount: number) => {
    const outcome = leaveOneTurnOut(fold, [1, 2, 3], (harmonics) => {
      const table = playedTable(tableNodes(harmonics, { binCount, gain: 1 }), settings)
      return (angle) => -playAt(table, angle / (2 * Math.PI))
    })
    return outcome.ok ? outcome.heldOutReduction : NaN
  }
  expect(reduction(4096)).toBeCloseTo(checks.values['9.held_out_reduction'], 6)
  expect(reduction(25)).toBeLessThan(reduction(4096))
  expect(reduction(25)).toBeGreaterThan(reduction(4096) - 0.005)
})

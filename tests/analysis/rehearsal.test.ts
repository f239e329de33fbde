import { describe, expect, test } from 'vitest'
import { tableNodes } from '@/lib/analysis/correction-table'
import { harmonicValue } from '@/lib/analysis/harmonic-curve'
import {
  playOverTrack,
  playedResidual,
  rehearseTable,
  residualOfOrder,
  slipCurve,
  turnsUntilTenPercent,
} from '@/lib/analysis/rehearsal'
import { playAt, playedCoefficients, type PlayedTable } from '@/lib/analysis/table-playback'
import reference from '../reference/rehearsal.json'

const worm = reference.north_a.map((cosArcsec, i) => ({ order: i + 1, cosArcsec, sinArcsec: reference.north_b[i] }))
const allOrders = [1, 2, 3]

const tableOf = (binCount: number, playback: PlayedTable['playback'] = 'interpolated', gain = 1): PlayedTable => ({
  nodes: tableNodes(worm, { binCount, gain }),
  playback,
})

// rehearsal.json: 720 720 points and an FFT, and the closed form A|1 − g sinc²(k/N) e^(−ikd)|, agree to 1e-7.
describe.each(reference.cases.filter((item) => !('quantum' in item)))('$name', (item) => {
  const table = tableOf(item.nodes, 'interpolated', item.gain)
  const slip = 2 * Math.PI * item.slip_turn

  test('what is left of orders 1, 2, 3', () => {
    worm.forEach((harmonic, i) =>
      expect(residualOfOrder(table, harmonic, slip)).toBeCloseTo(item.residual_order_1_2_3[i], 7),
    )
    // the closed form leaves images out, which fall on orders 1 to 3 only with very few nodes
    worm.forEach((harmonic, i) =>
      expect(residualOfOrder(table, harmonic, slip)).toBeCloseTo(item.closed_form_1_2_3[i], 10),
    )
  })

  test('peak-to-peak and RMS', () => {
    const residual = playedResidual(table, worm, slip)
    // our scan has 7200 points a turn: low by up to max|e''|·(2π/7200)²/8 = 2e-6
    expect(Math.abs(residual.peakToPeakArcsec - item.residual_peak_to_peak)).toBeLessThan(1e-5)
    expect(Math.abs(residual.rmsArcsec - item.residual_rms)).toBeLessThan(1e-6)
  })
})

describe.each(reference.hold)('a stair of $nodes steps, values at $values_at', (item) => {
  test('what is left of orders 1, 2, 3', () => {
    const table = tableOf(item.nodes, item.values_at === 'bin start' ? 'held-from-start' : 'held-at-centre')
    worm.forEach((harmonic, i) =>
      expect(residualOfOrder(table, harmonic) / reference.A[i]).toBeCloseTo(item.left_of_order_1_2_3[i], 10),
    )
  })
})

test.each(['interpolated', 'held-from-start', 'held-at-centre'] as const)(
  'playedCoefficients is the Fourier integral of playAt (%s, nine nodes, orders 1 to 12)',
  (playback) => {
    const table: PlayedTable = { nodes: Float64Array.of(3, -1, 4, -1, -5, 9, -2, -6, -1), playback }
    const count = 90_000
    for (let order = 1; order <= 12; order++) {
      let [a, b] = [0, 0]
      for (let i = 0; i < count; i++) {
        const value = playAt(table, (i + 0.5) / count)
        a += (2 * value * Math.cos((2 * Math.PI * order * (i + 0.5)) / count)) / count
        b += (2 * value * Math.sin((2 * Math.PI * order * (i + 0.5)) / count)) / count
      }
      const played = playedCoefficients(table, order)
      // midpoint rule over 10 000 points a node: error below (π·12/90000)²·Σ
      expect(played.cosArcsec).toBeCloseTo(a, 5)
      expect(played.sinArcsec).toBeCloseTo(b, 5)
    }
  },
)

describe('rehearseTable', () => {
  const rehearsed = (table: PlayedTable, includedOrders = allOrders, gain = 1) =>
    rehearseTable({ table, all: worm, includedOrders, gain, heldOutReduction: 0.9 })

  test('a fine table: nearly nothing left, a tenth back at 5.732°, no help from 60° on', () => {
    const result = rehearsed(tableOf(4096))
    expect(result.slipForTenPercentDegrees).toBeCloseTo(reference.slip_at_which_10_percent_is_back_deg, 4)
    expect(result.slipForNoHelpDegrees).toBeCloseTo(60, 4)
    expect(result.peakToPeakBeforeArcsec).toBeCloseTo(reference.raw_peak_to_peak, 8)
    expect(result.peakToPeakAfterArcsec).toBeLessThan(1e-4)
    expect(result.binningLossShare).toBeLessThan(1e-5)
    expect(result.heldOutReduction).toBe(0.9)
  })

  test('the slip found leaves just a tenth, and just all, of the fundamental', () => {
    for (const table of [tableOf(25), tableOf(25, 'held-at-centre'), tableOf(240, 'interpolated', 0.95)]) {
      const result = rehearsed(table)
      const left = (degrees: number) => residualOfOrder(table, worm[0], (degrees * Math.PI) / 180) / reference.A[0]
      expect(left(result.slipForTenPercentDegrees)).toBeCloseTo(0.1, 10)
      expect(left(result.slipForNoHelpDegrees)).toBeCloseTo(1, 10)
    }
  })

  test('a stair from its nodes is late by itself: it has less slip to spare, on the late side', () => {
    const table = tableOf(100, 'held-from-start')
    const result = rehearsed(table)
    const left = residualOfOrder(table, worm[0], (result.slipForTenPercentDegrees * Math.PI) / 180)
    expect(left / reference.A[0]).toBeCloseTo(0.1, 10)
    expect(result.slipForTenPercentDegrees).toBeCloseTo(5.732 - 1.8, 2)
  })

  test('a gain of 0.8 leaves a fifth at once: no slip keeps it under a tenth', () => {
    expect(rehearsed(tableOf(240, 'interpolated', 0.8), allOrders, 0.8).slipForTenPercentDegrees).toBe(0)
  })

  test('orders that are not in the table stay as they are', () => {
    const nodes = tableNodes([worm[0]], { binCount: 240, gain: 1 })
    const result = rehearsed({ nodes, playback: 'interpolated' }, [1])
    expect(result.orders.map(({ isIncluded }) => isIncluded)).toEqual([true, false, false])
    expect(result.orders[1].afterArcsec).toBeCloseTo(result.orders[1].beforeArcsec, 12)
    expect(result.orders[0].afterArcsec).toBeCloseTo(9 * 5.711e-5, 6) // 1 − sinc²(1/240)
    expect(result.binningLossShare).toBeCloseTo(1 - (Math.sin(Math.PI / 240) / (Math.PI / 240)) ** 2, 12)
  })

  test('without the fundamental the slip is that of the strongest order, in worm angle', () => {
    const nodes = tableNodes(worm.slice(1), { binCount: 4096, gain: 1 })
    const result = rehearsed({ nodes, playback: 'interpolated' }, [2, 3])
    expect(result.slipForTenPercentDegrees).toBeCloseTo(5.732 / 2, 3)
  })
})

test('slip by one order: 2|sin(kd/2)| of it is left', () => {
  for (const { slip_turn, order, factor } of reference.slip_factors) {
    const table = tableOf(4096)
    const left = residualOfOrder(table, worm[order - 1], 2 * Math.PI * slip_turn) / reference.A[order - 1]
    expect(left).toBeCloseTo(factor, 5) // 4096 nodes lose up to 1.8e-6 of order 3
  }
})

test('slipCurve: nearly 0 without slip, above 1 beyond 60°, symmetric for straight lines', () => {
  const { shareLeft } = slipCurve(tableOf(240), worm, Float64Array.of(0, 30, -30, 60, 180))
  expect(shareLeft[0]).toBeLessThan(1e-4)
  expect(shareLeft[1]).toBeCloseTo(shareLeft[2], 10)
  // rehearsal.json, slip of 1/6 and of half a turn: rms over the raw rms
  const rms = (name: string) => reference.cases.find((item) => item.name === name)?.residual_rms ?? NaN
  expect(shareLeft[3]).toBeCloseTo(rms('slip 1/6 turn') / reference.raw_rms, 6)
  expect(shareLeft[4]).toBeCloseTo(rms('slip half a turn') / reference.raw_rms, 6)
  expect(slipCurve(tableOf(8), [], Float64Array.of(0)).shareLeft[0]).toBe(0)
})

test.each(['interpolated', 'held-from-start', 'held-at-centre'] as const)(
  'slipCurve equals the scan of the played residual (%s, nine nodes)',
  (playback) => {
    const table = tableOf(9, playback)
    const slipDegrees = Float64Array.of(-70, -10, 0, 3, 41)
    const { shareLeft } = slipCurve(table, worm, slipDegrees)
    slipDegrees.forEach((degrees, i) => {
      const { rmsArcsec } = playedResidual(table, worm, (degrees * Math.PI) / 180)
      // the scan has some 7200 points; a stair's nine jumps are each met to within one of them
      expect(shareLeft[i]).toBeCloseTo(rmsArcsec / reference.raw_rms, playback === 'interpolated' ? 6 : 3)
    })
  },
)

test.each(reference.wrong_period)(
  'a period off by $dP s: a tenth is back after $turns_until_10_percent turns',
  (item) => {
    expect(turnsUntilTenPercent(reference.period_s, item.dP)).toBeCloseTo(item.turns_until_10_percent, 10)
    expect(turnsUntilTenPercent(reference.period_s, 0)).toBeNull()
  },
)

test('playOverTrack leaves the drift and takes the worm', () => {
  const timeSeconds = Float64Array.from({ length: 800 }, (_, i) => 2.5 * i)
  const angle = (t: number) => (2 * Math.PI * (t - 50)) / reference.period_s
  const raArcsec = timeSeconds.map((t) => harmonicValue(worm, angle(t)) + 0.02 * t)
  const played = playOverTrack(
    { timeSeconds, raArcsec },
    { table: tableOf(240), periodSeconds: reference.period_s, originSeconds: 50 },
  )
  // a chord misses the curve by at most max|e''|·(2π/240)²/8, max|e''| ≤ 9 + 4·1.6 + 9·0.7
  const chord = (21.7 * (2 * Math.PI) ** 2) / 240 ** 2 / 8
  played.raArcsec.forEach((left, i) => expect(Math.abs(left - 0.02 * timeSeconds[i])).toBeLessThan(chord))
})

import { describe, expect, test } from 'vitest'
import {
  binCountFor,
  explainByPhase,
  foldPhases,
  foldTurns,
  leaveOneTurnOut,
  ordersUsefulOnLeftOutTurns,
  turnCurves,
  turnNumbers,
  turnScatter,
  type FoldInput,
} from '@/lib/analysis/fold'
import { createRandom } from '@/lib/analysis/random'
import checks from '../reference/checks.json'
import { referenceRun } from '../support/reference-run'

const run = referenceRun()
const input: FoldInput = {
  timeSeconds: run.timeSeconds,
  values: run.raArcsec.map((y, i) => y - run.drift[i] - run.lineArcsec[i]),
  periodSeconds: run.periodSeconds,
  originSeconds: run.referenceSeconds,
}

describe('the reference run, 24 bins, phase from the middle, turns from the first sample', () => {
  test('variance explained by phase (Stellingwerf 1978)', () => {
    const explained = explainByPhase(foldPhases(input), input.values, 24)
    if ('ok' in explained) throw new Error(explained.reason)
    expect(explained.share).toBeCloseTo(checks.values['9.eta2'], 10)
    expect(explained.adjustedShare).toBeCloseTo(checks.values['9.eta2_adjusted'], 10)
    expect(explained.means.every((value) => value !== null)).toBe(true)
  })

  test('each turn foretold by the others (Stone 1974)', () => {
    const outcome = leaveOneTurnOut(input, [1, 2, 3])
    if (!outcome.ok) throw new Error(outcome.reason)
    const expected = checks.values['9.loto_rms_per_turn']
    expect(outcome.predictions.map(({ turnNumber }) => turnNumber)).toEqual([1, 2, 3, 4])
    outcome.predictions.forEach(({ rmsLeftArcsec }, i) => expect(rmsLeftArcsec).toBeCloseTo(expected[i], 8))
    expect(outcome.predictiveShare).toBeCloseTo(checks.values['9.loto_Q2'], 10)
    expect(outcome.heldOutReduction).toBeCloseTo(checks.values['9.held_out_reduction'], 9)
  })

  test('scatter of the fundamental from turn to turn', () => {
    expect(turnScatter(input, [1, 2, 3])).toBeCloseTo(checks.values['9.fundamental_scatter_over_mean'], 9)
    expect(turnScatter(input, [1, 2, 3], 5)).toBeNull()
  })

  test('foldTurns puts them together', () => {
    const result = foldTurns(input, [1, 2, 3])
    if ('ok' in result) throw new Error(result.reason)
    expect(result.completeTurns).toBe(4)
    // 187.6 samples a turn make 23 bins
    const explained = explainByPhase(foldPhases(input), input.values, 23)
    if ('ok' in explained) throw new Error(explained.reason)
    expect(result.repeatability).toBe(explained.adjustedShare)
    expect(result.rmsShareLeft).toBeCloseTo(Math.sqrt(1 - result.repeatability), 14)
    expect(result.predictions).toHaveLength(4)
    expect(result.heldOutReduction).toBeCloseTo(checks.values['9.held_out_reduction'], 9)
    expect(result.scatter).toBeCloseTo(checks.values['9.fundamental_scatter_over_mean'], 9)
  })

  test("orders that help on left-out turns: the worm's own, and no other whose lack foretells better", () => {
    const useful = ordersUsefulOnLeftOutTurns(input, [1, 2, 3, 7, 11])
    expect(useful).toEqual(expect.arrayContaining([1, 2, 3]))
    const share = (orders: number[]) => {
      const outcome = leaveOneTurnOut(input, orders)
      return outcome.ok ? outcome.predictiveShare : NaN
    }
    expect(useful.includes(7)).toBe(share([1, 2, 3, 11]) < share([1, 2, 3, 7, 11]))
    expect(useful.includes(11)).toBe(share([1, 2, 3, 7]) < share([1, 2, 3, 7, 11]))
    expect(useful).not.toHaveLength(5)
  })
})

// Folding 480 s at 478 s: the fundamental's phase runs, so that the turn scatter grows.
test('a wrong period shows as scatter', () => {
  const timeSeconds = Float64Array.from({ length: 1600 }, (_, i) => 2.5 * i)
  const values = timeSeconds.map((t) => 9 * Math.cos((2 * Math.PI * t) / 480))
  const at = (periodSeconds: number) => turnScatter({ timeSeconds, values, periodSeconds, originSeconds: 0 }, [1]) ?? 0
  expect(at(480)).toBeLessThan(1e-10)
  expect(at(478)).toBeGreaterThan(0.05)
})

test('repeatability of pure noise is near 0, never below', () => {
  const { normal } = createRandom(2)
  const timeSeconds = Float64Array.from({ length: 2000 }, (_, i) => i)
  const result = foldTurns(
    { timeSeconds, values: timeSeconds.map(() => normal()), periodSeconds: 480, originSeconds: 0 },
    [1],
  )
  if ('ok' in result) throw new Error(result.reason)
  expect(result.repeatability).toBeGreaterThanOrEqual(0)
  expect(result.repeatability).toBeLessThan(0.1)
})

describe('limits', () => {
  test('phase lies in [0, 1), turns count from 1', () => {
    const timeSeconds = Float64Array.of(-1e-17, 0, 250, 499.999, 500, 1250)
    const phases = foldPhases({ timeSeconds, periodSeconds: 500, originSeconds: 0 })
    phases.forEach((phase) => expect(phase >= 0 && phase < 1).toBe(true))
    expect(Array.from(turnNumbers(timeSeconds, 500))).toEqual([1, 1, 1, 1, 2, 3])
  })

  test('bins: clip(⌊N_turn/8⌋, 12, 60)', () => {
    expect([10, 96, 200, 800].map(binCountFor)).toEqual([12, 12, 25, 60])
  })

  test('under one turn, fewer than three turns, equal values', () => {
    const short: FoldInput = {
      timeSeconds: Float64Array.from({ length: 100 }, (_, i) => i),
      values: new Float64Array(100),
      periodSeconds: 480,
      originSeconds: 0,
    }
    expect(foldTurns(short, [1])).toMatchObject({ ok: false, reason: 'short-run' })
    expect(leaveOneTurnOut({ ...short, periodSeconds: 45 }, [1])).toMatchObject({
      ok: false,
      reason: 'short-run',
      got: 2,
    })
    expect(foldTurns({ ...short, periodSeconds: 45 }, [1])).toMatchObject({ ok: false, reason: 'singular' })
    expect(explainByPhase(Float64Array.of(0, 0.5), Float64Array.of(1, 2), 12)).toMatchObject({ reason: 'few-points' })
  })
})

test('turnCurves cut at phase 0 and average down to the wanted number of points', () => {
  const curves = turnCurves(input, 60)
  expect(curves.length).toBe(6) // origin in the middle of the run: 4.17 turns touch six passages of phase 0
  curves.forEach(({ angleDegrees, arcsec }) => {
    expect(angleDegrees.length).toBeLessThanOrEqual(60)
    angleDegrees.forEach((angle, i) => expect(i === 0 || angle > angleDegrees[i - 1]).toBe(true))
    arcsec.forEach((value) => expect(Math.abs(value)).toBeLessThan(13))
  })
})

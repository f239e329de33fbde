import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { analyseAtOnce } from '@/lib/analysis/analyse'
import { matchOrder } from '@/lib/analysis/gear-train'
import type { AnalysisResult, Recipe, RunColumns } from '@/lib/analysis/types'
import { defaultRecipe } from '@/lib/schemas/recipe'
import { axisArcsecConversion, simulationOptions } from '@/lib/simulate/options'
import { simulateRun } from '@/lib/simulate/simulate-run'

/*
 * What a change of the record must do to the figures, whatever the record. Runs are drawn by fast-check from a fixed
 * seed: the same ones every time, shrunk when one fails.
 */

const RUNS = { seed: 20261201, numRuns: 5 }

/** Four to six turns of a worm with a second harmonic and another gear, seen through correlated seeing. */
const anyRun = fc
  .record({
    turns: fc.double({ min: 4, max: 6, noNaN: true }),
    amplitude: fc.double({ min: 3, max: 15, noNaN: true }),
    phase: fc.integer({ min: 0, max: 359 }),
    gearOrder: fc.double({ min: 2.3, max: 6.7, noNaN: true }),
    drift: fc.double({ min: -0.03, max: 0.03, noNaN: true }),
    correlated: fc.double({ min: 0.05, max: 0.4, noNaN: true }),
    jitter: fc.constantFrom(0, 0.05),
    seed: fc.integer({ min: 1, max: 2 ** 31 - 1 }),
  })
  .map(
    ({ turns, amplitude, phase, gearOrder, drift, correlated, jitter, seed }) =>
      simulateRun(
        simulationOptions({
          wheelTeeth: 180,
          harmonics: [
            { order: 1, amplitudeArcsec: amplitude, phaseDegrees: phase },
            { order: 2, amplitudeArcsec: amplitude / 4, phaseDegrees: 2 * phase },
          ],
          gears: [{ name: 'pinion', order: gearOrder, amplitudeArcsec: 0.9, phaseDegrees: 50 }],
          driftCoefficients: [drift],
          seeing: { whiteSkyArcsec: 0.2, correlatedSkyArcsec: correlated, correlationSeconds: 6 },
          cadenceSeconds: 4,
          cadenceJitterSeconds: jitter,
          durationSeconds: 478.69 * turns,
          seed,
        }),
      ).columns,
  )

function figures(columns: RunColumns, change: Partial<Recipe> = {}): AnalysisResult {
  // The degree is held: whether a drift is there at all is a matter of its size, which some of the changes change.
  const recipe = { ...defaultRecipe(), conversion: axisArcsecConversion(), driftDegree: 1 as const, ...change }
  const outcome = analyseAtOnce(columns, recipe)
  if (!outcome.ok) throw new Error(outcome.reason)
  return outcome.result
}

interface Change {
  /** Of all amplitudes, spans and rates; below 0 the sense is turned, and phases by half a turn. */
  factor?: number
  /** Added to the drift rate, in ″/s. */
  slope?: number
  /** Seconds by which all times are later. */
  later?: number
}

/**
 * Everything of `changed` against what the change must make of `before`. The tolerance is relative; of figures that can
 * be near zero, relative to the scale of the record.
 */
function expectChanged(before: AnalysisResult, changed: AnalysisResult, change: Change, tolerance: number): void {
  const { factor = 1, slope = 0, later = 0 } = change
  const size = Math.abs(factor)
  const near = (value: number, expected: number, scale = Math.abs(expected)) =>
    expect(Math.abs(value - expected), `${value} for ${expected}`).toBeLessThanOrEqual(tolerance * scale)
  const nearAngle = (value: number, expected: number) => near(((((value - expected) % 360) + 540) % 360) - 180, 0, 360)
  const turned = factor < 0 ? 180 : 0
  const { worm, drift, lines, spans, residual, turn, run } = changed

  expect(changed.used).toBe(before.used)
  near(run.firstUsedTimeSeconds, before.run.firstUsedTimeSeconds + later, run.durationSeconds)
  near(run.turns!, before.run.turns!)
  near(worm!.periodSeconds.value, before.worm!.periodSeconds.value)
  near(worm!.periodSeconds.stderr!, before.worm!.periodSeconds.stderr!)
  near(worm!.peakToPeakArcsec.value, size * before.worm!.peakToPeakArcsec.value)
  near(worm!.peakToPeakArcsec.stderr!, size * before.worm!.peakToPeakArcsec.stderr!)
  near(worm!.steepestRateArcsecPerSecond.value, size * before.worm!.steepestRateArcsecPerSecond.value)
  const [ahead, behind] = [before.worm!.furthestAheadArcsec, before.worm!.furthestBehindArcsec]
  near(worm!.furthestAheadArcsec, factor * (factor < 0 ? behind : ahead))
  near(worm!.furthestBehindArcsec, factor * (factor < 0 ? ahead : behind))
  expect(worm!.harmonics.map(({ order }) => order)).toEqual(before.worm!.harmonics.map(({ order }) => order))
  worm!.harmonics.forEach(({ amplitudeArcsec, phaseDegrees }, i) => {
    const old = before.worm!.harmonics[i]
    near(amplitudeArcsec.value, size * old.amplitudeArcsec.value)
    near(amplitudeArcsec.stderr!, size * old.amplitudeArcsec.stderr!)
    nearAngle(phaseDegrees.value, old.phaseDegrees.value + turned)
    near(phaseDegrees.stderr!, old.phaseDegrees.stderr!)
  })
  expect(lines.length).toBe(before.lines.length)
  lines.forEach((line, i) => {
    const old = before.lines[i]
    near(line.periodSeconds.value, old.periodSeconds.value)
    near(line.amplitudeArcsec.value, size * old.amplitudeArcsec.value)
    nearAngle(line.phaseDegrees.value, old.phaseDegrees.value + turned)
    near(line.signalToNoise, old.signalToNoise)
  })
  const rate = before.drift.coefficients[0]
  near(drift.coefficients[0].value, factor * rate.value + slope, Math.abs(slope) + size * rate.stderr! * 10)
  near(drift.coefficients[0].stderr!, size * rate.stderr!)
  near(spans.afterDriftArcsec, size * before.spans.afterDriftArcsec)
  near(spans.afterWormArcsec, size * before.spans.afterWormArcsec)
  near(spans.afterLinesArcsec, size * before.spans.afterLinesArcsec)
  near(
    spans.driftArcsec,
    Math.abs(factor * rate.value + slope) * run.durationSeconds,
    size * spans.afterDriftArcsec + Math.abs(slope) * run.durationSeconds,
  )
  if (slope === 0) {
    near(spans.rawArcsec, size * before.spans.rawArcsec)
    near(spans.rawWithoutWormArcsec, size * before.spans.rawWithoutWormArcsec)
  }
  near(residual.rmsArcsec, size * before.residual.rmsArcsec)
  near(residual.lagOneCorrelation, before.residual.lagOneCorrelation, 1)
  near(residual.seeingFloorArcsec, size * before.residual.seeingFloorArcsec)
  near(turn!.repeatability, before.turn!.repeatability)
  near(turn!.heldOutReduction!, before.turn!.heldOutReduction!)
}

function changedColumns(columns: RunColumns, change: Partial<RunColumns>): RunColumns {
  return { ...columns, ...change }
}

describe('what a change of the record does to the figures', { timeout: 60_000 }, () => {
  test('later times: the same figures', () => {
    let lineCount = 0
    // Times of 1e5 s keep 1e-11 s of their own; what that moves is far below a part in 1e7.
    const property = fc.property(anyRun, fc.integer({ min: -100_000, max: 100_000 }), (columns, later) => {
      const shifted = changedColumns(columns, { timeSeconds: columns.timeSeconds.map((t) => t + later) })
      const before = figures(columns)
      lineCount += before.lines.length
      expectChanged(before, figures(shifted), { later }, 1e-7)
    })
    fc.assert(property, RUNS)
    // Every run has a pinion, and in most it is far enough from a harmonic to be a line.
    expect(lineCount).toBeGreaterThan(RUNS.numRuns / 2)
  })

  test('a scaled amplitude: amplitudes, spans and rates scaled, period and phases as before', () => {
    // The fit stops where its step no longer shrinks, near rounding: a part in 1e7 is far above, and far below any error.
    const property = fc.property(anyRun, fc.double({ min: 0.01, max: 100, noNaN: true }), (columns, factor) => {
      const scaled = changedColumns(columns, { displacement: columns.displacement.map((value) => factor * value) })
      expectChanged(figures(columns), figures(scaled), { factor }, 1e-7)
    })
    fc.assert(property, RUNS)
  })

  test('a constant: nothing', () => {
    // 1e5″ added to some 10″ cost four of sixteen digits.
    const property = fc.property(anyRun, fc.double({ min: -1e5, max: 1e5, noNaN: true }), (columns, constant) => {
      const moved = changedColumns(columns, { displacement: columns.displacement.map((value) => value + constant) })
      expectChanged(figures(columns), figures(moved), {}, 1e-7)
    })
    fc.assert(property, RUNS)
  })

  test('a slope: the drift has it, all else is as before', () => {
    // The filter for stray points looks at what was recorded, slope and all, so it is off.
    const plain = { isStrayPointFilterOn: false }
    const property = fc.property(anyRun, fc.double({ min: -0.2, max: 0.2, noNaN: true }), (columns, slope) => {
      const tilted = changedColumns(columns, {
        displacement: columns.displacement.map((value, i) => value + slope * columns.timeSeconds[i]),
      })
      expectChanged(figures(columns, plain), figures(tilted, plain), { slope }, 1e-7)
    })
    fc.assert(property, RUNS)
  })

  test('the sign reversed: ahead and behind exchanged, phases half a turn on, drift the other way', () => {
    const property = fc.property(anyRun, (columns) => {
      const reversed = changedColumns(columns, { displacement: columns.displacement.map((value) => -value) })
      const figuresOfReversed = figures(reversed)
      expectChanged(figures(columns), figuresOfReversed, { factor: -1 }, 1e-7)
      // And saying that a growing value means behind is the same as writing it the other way round, to the last bit.
      const conversion = { ...axisArcsecConversion(), positiveMeans: 'behind' as const }
      expect(figures(columns, { conversion })).toEqual(figuresOfReversed)
    })
    fc.assert(property, RUNS)
  })

  test('other names for the parts of the drive train: other names, nothing else', () => {
    const property = fc.property(
      anyRun,
      fc.uniqueArray(fc.string({ minLength: 1, maxLength: 8 }), { minLength: 2, maxLength: 2 }),
      (columns, [first, second]) => {
        const withNames = (names: [string, string]): AnalysisResult => {
          const stage = { kind: 'gear-pair' as const, drivenTeeth: 60, drivingTeeth: 17 }
          const stages = names.map((name) => ({ ...stage, name }))
          return figures(columns, { driveTrain: { axisKind: 'worm', wheelTeeth: 180, wormStarts: 1, stages } })
        }
        const unnamed = ({ lines, ...rest }: AnalysisResult) => ({
          lines: lines.map(({ source, ...line }) => ({ ...line, isNamed: source !== null })),
          worm: rest.worm,
          drift: rest.drift,
          spans: rest.spans,
        })
        expect(unnamed(withNames([first, second]))).toEqual(unnamed(withNames(['pinion', 'motor'])))
      },
    )
    fc.assert(property, { ...RUNS, numRuns: 3 })
  })
})

test('a line finds its part whatever order the parts are listed in', () => {
  const part = fc.record({ order: fc.double({ min: 0.3, max: 60, noNaN: true }) })
  const parts = fc.uniqueArray(part, { minLength: 1, maxLength: 8, selector: ({ order }) => order })
  const shuffledParts = parts.chain((list) => {
    const named = list.map(({ order }, i) => ({ name: `part ${i}`, order, periodSeconds: 478.69 / order }))
    return fc.tuple(fc.constant(named), fc.shuffledSubarray(named, { minLength: named.length }))
  })
  const line = fc.record({ pick: fc.nat(7), offset: fc.double({ min: -0.1, max: 0.1, noNaN: true }) })
  let matches = 0
  const property = fc.property(shuffledParts, line, ([listed, shuffled], { pick, offset }) => {
    const order = { value: listed[pick % listed.length].order + offset, stderr: 0.02 }
    const found = matchOrder(order, listed, 0.01)
    if (found !== null) matches++
    expect(matchOrder(order, shuffled, 0.01)).toEqual(found)
  })
  fc.assert(property, { seed: RUNS.seed, numRuns: 300 })
  expect(matches).toBeGreaterThan(100)
})

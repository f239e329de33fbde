import { describe, expect, test } from 'vitest'
import { analyseAtOnce } from '@/lib/analysis/analyse'
import { wormPeriod } from '@/lib/analysis/gear-train'
import { runLengthRule } from '@/lib/analysis/sampling'
import type { AnalysisResult } from '@/lib/analysis/types'
import { defaultRecipe } from '@/lib/schemas/recipe'
import { axisArcsecConversion, simulationOptions } from '@/lib/simulate/options'
import { simulateRun, type SimulationTruth } from '@/lib/simulate/simulate-run'

// 86164.0905 s / 180 (mean sidereal day of Aoki et al. 1982, A&A 105, 359). A wheel of 180 teeth and 18″ of peak to peak
// are what is usual for a mid-priced mount: common practice, no source.
const PERIOD_SECONDS = 478.6893916666667
const AMPLITUDE_ARCSEC = 9
const DRIFT_ARCSEC_PER_SECOND = 0.02

/** 2000 s of it in 0.4″ of seeing; white, or correlated as seeing is. */
function analysed(seed: number, correlatedShare: number): { result: AnalysisResult; truth: SimulationTruth } {
  const run = simulateRun(
    simulationOptions({
      wheelTeeth: 180,
      harmonics: [{ order: 1, amplitudeArcsec: AMPLITUDE_ARCSEC, phaseDegrees: 77 }],
      driftCoefficients: [DRIFT_ARCSEC_PER_SECOND],
      seeing: {
        whiteSkyArcsec: 0.4 * Math.sqrt(1 - correlatedShare),
        correlatedSkyArcsec: 0.4 * Math.sqrt(correlatedShare),
        correlationSeconds: 5,
      },
      cadenceSeconds: 2.5,
      durationSeconds: 2000,
      conversion: axisArcsecConversion(2),
      seed,
    }),
  )
  const conversion = run.truth.options.conversion
  const outcome = analyseAtOnce(run.columns, { ...defaultRecipe(), conversion })
  if (!outcome.ok) throw new Error(outcome.reason)
  return { result: outcome.result, truth: run.truth }
}

describe.each([
  ['white seeing', 1, 0],
  ['white seeing, another night', 2, 0],
  ['seeing half correlated', 3, 0.5],
  ['seeing half correlated, another night', 4, 0.5],
])('2000 s of a 180-tooth mount, 18″ peak to peak, 0.02″/s of drift, 0.4″ of %s', (_, seed, share) => {
  const { result, truth } = analysed(seed, share)
  const worm = result.worm!
  const fundamental = worm.harmonics[0]
  const drift = result.drift.rateArcsecPerSecond

  test('worm period within 0.3 %', () => {
    expect(Math.abs(worm.periodSeconds.value / PERIOD_SECONDS - 1)).toBeLessThan(0.003)
  })

  test('fundamental within 1 %', () => {
    expect(fundamental.order).toBe(1)
    expect(Math.abs(fundamental.amplitudeArcsec.value / AMPLITUDE_ARCSEC - 1)).toBeLessThan(0.01)
  })

  test('drift within 1 %', () => {
    expect(Math.abs(drift.value / DRIFT_ARCSEC_PER_SECOND - 1)).toBeLessThan(0.01)
  })

  test('each within four of its own standard errors', () => {
    const away = ({ value, stderr }: { value: number; stderr: number | null }, truth: number) =>
      Math.abs(value - truth) / stderr!
    expect(away(worm.periodSeconds, PERIOD_SECONDS)).toBeLessThan(4)
    expect(away(fundamental.amplitudeArcsec, AMPLITUDE_ARCSEC)).toBeLessThan(4)
    expect(away(drift, DRIFT_ARCSEC_PER_SECOND)).toBeLessThan(4)
  })

  test('the table takes 90 % off the fundamental (a good correction: common practice, no source)', () => {
    // The table's own fundamental against the one that was put in, which it never saw.
    const { bins } = result.table!
    const part = (of: (angle: number) => number) =>
      bins.reduce(
        (sum, { angleDegrees, value }) => sum + (2 * value * of((angleDegrees * Math.PI) / 180)) / bins.length,
        0,
      )
    const left = Math.hypot(
      truth.harmonics[0].cosArcsec + part(Math.cos),
      truth.harmonics[0].sinArcsec + part(Math.sin),
    )
    expect(left / AMPLITUDE_ARCSEC).toBeLessThan(0.1)
    expect(result.table!.rehearsal.heldOutReduction).toBeGreaterThan(0.9)
  })
})

test('1500 s are three turns of such a worm, enough for a period of its own (common practice, no source)', () => {
  const period = wormPeriod({ wheelTeeth: 180, wormStarts: 1 })
  if (!period.ok) throw new Error(period.reason)
  expect(Math.abs(period.seconds - PERIOD_SECONDS)).toBeLessThan(1e-9)
  expect(Math.floor(1500 / period.seconds)).toBe(3)
  expect(runLengthRule(1500 / period.seconds)).toBe('period-free')
  expect(runLengthRule(1400 / period.seconds)).toBe('period-from-gear')
})

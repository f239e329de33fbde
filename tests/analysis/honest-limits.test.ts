import { describe, expect, test } from 'vitest'
import { analyseAtOnce } from '@/lib/analysis/analyse'
import type { AnalysisResult, Estimate, Recipe } from '@/lib/analysis/types'
import { defaultRecipe } from '@/lib/schemas/recipe'
import { axisArcsecConversion, simulationOptions, type SimulationOptions } from '@/lib/simulate/options'
import { simulateRun } from '@/lib/simulate/simulate-run'

// Records that hold too little for a figure: what is known of each is what the simulator put in.

const WORM_180 = 86164.0905 / 180 // sidereal day of UT: Aoki et al. 1982, A&A 105, 359

type Given = Parameters<typeof simulationOptions>[0]

function analysed(
  given: Partial<SimulationOptions> & Pick<Given, 'harmonics' | 'durationSeconds'>,
  wheelTeeth: number | null,
  change: Partial<Recipe> = {},
): AnalysisResult {
  const run = simulateRun(
    simulationOptions({
      wheelTeeth: 180,
      cadenceSeconds: 2.5,
      conversion: axisArcsecConversion(2),
      seeing: { whiteSkyArcsec: 0.3, correlatedSkyArcsec: 0, correlationSeconds: 5 },
      ...given,
    }),
  )
  const base = defaultRecipe()
  const { conversion } = run.truth.options
  const outcome = analyseAtOnce(run.columns, {
    ...base,
    conversion,
    driveTrain: { ...base.driveTrain, wheelTeeth },
    ...change,
  })
  if (!outcome.ok) throw new Error(outcome.reason)
  return outcome.result
}

const codes = (result: AnalysisResult) => result.warnings.map(({ code }) => code)
const away = ({ value, stderr }: Estimate, truth: number) => Math.abs(value - truth) / stderr!

describe('a strong second harmonic, 5″ beside a fundamental of 0.7″', { timeout: 60_000 }, () => {
  const harmonics = [
    { order: 1, amplitudeArcsec: 0.7, phaseDegrees: 65 },
    { order: 2, amplitudeArcsec: 5, phaseDegrees: 122 },
  ]

  test('eight turns show the slower worm, with and without the teeth', () => {
    for (const teeth of [null, 180]) {
      const result = analysed({ harmonics, durationSeconds: 8 * WORM_180, seed: 5 }, teeth)
      expect(away(result.worm!.periodSeconds, WORM_180)).toBeLessThan(4)
      expect(away(result.worm!.harmonics[0].amplitudeArcsec, 0.7)).toBeLessThan(4)
      expect(away(result.worm!.harmonics[1].amplitudeArcsec, 5)).toBeLessThan(4)
      expect(codes(result)).not.toContain('period-may-be-harmonic')
      expect(codes(result).includes('sub-harmonic-taken')).toBe(teeth === null)
    }
  })

  test('2.6 turns without teeth show a period of half a turn, and say that it may be just that', () => {
    const result = analysed({ harmonics, durationSeconds: 2.6 * WORM_180, seed: 678 }, null)
    expect(result.worm!.periodSeconds.value).toBeCloseTo(WORM_180 / 2, -1)
    expect(codes(result)).toContain('period-may-be-harmonic')
  })

  test('2.6 turns with the teeth keep the worm’s period', () => {
    const result = analysed({ harmonics, durationSeconds: 2.6 * WORM_180, seed: 678 }, 180)
    expect(result.worm!.periodSeconds).toEqual({ value: WORM_180, stderr: null })
    expect(away(result.worm!.harmonics[1].amplitudeArcsec, 5)).toBeLessThan(4)
    expect(codes(result)).not.toContain('period-may-be-harmonic')
  })
})

describe('a bent drift', { timeout: 60_000 }, () => {
  // At its largest in mid-run, where a parabola is.
  const harmonics = [{ order: 1, amplitudeArcsec: 5, phaseDegrees: 270 }]
  // Twice 0.03″/s at the end of the run.
  const bent = (turns: number) => ({
    harmonics,
    durationSeconds: turns * WORM_180,
    driftCoefficients: [0.03, 0.03 / (turns * WORM_180)],
    seed: 9,
  })

  test('over one turn and a half passes for more than a fifth of the worm, which is told', () => {
    for (const wormPeriod of ['fitted', 'gear'] as const) {
      const result = analysed(bent(1.5), 180, { wormPeriod })
      expect(Math.abs(result.worm!.harmonics[0].amplitudeArcsec.value - 5)).toBeGreaterThan(1)
      expect(codes(result)).toContain('drift-taken-straight')
      expect(codes(result)).toContain('errors-may-be-small')
    }
  })

  test('over four turns is fitted as bent, and the worm is right', () => {
    const result = analysed(bent(4), 180)
    expect(result.drift.degree).toBeGreaterThanOrEqual(2)
    expect(away(result.worm!.harmonics[0].amplitudeArcsec, 5)).toBeLessThan(4)
    expect(away(result.worm!.periodSeconds, WORM_180)).toBeLessThan(4)
    expect(codes(result)).not.toContain('drift-taken-straight')
  })
})

describe('fast motion', { timeout: 60_000 }, () => {
  const harmonics = [{ order: 1, amplitudeArcsec: 6, phaseDegrees: 35 }]
  // AR(1) with r = 0.9 at 2.5 s: correlation time −2.5 s/ln 0.9.
  const seeing = { whiteSkyArcsec: 0, correlatedSkyArcsec: 0.4, correlationSeconds: -2.5 / Math.log(0.9) }

  test.each([300, 301, 302, 303, 304, 305, 306, 307])('is not seen in seeing that lingers, seed %i', (seed) => {
    expect(codes(analysed({ harmonics, seeing, durationSeconds: 5 * WORM_180, seed }, 180))).not.toContain(
      'fast-motion',
    )
  })

  test('is seen where a gear swings within a dozen frames and no line is looked for', () => {
    const gears = [{ name: 'x', order: WORM_180 / 30, amplitudeArcsec: 3, phaseDegrees: 20 }]
    const given = { harmonics, gears, durationSeconds: 5 * WORM_180, seed: 3 }
    expect(codes(analysed(given, 180, { isLineSearchOn: false }))).toContain('fast-motion')
  })
})

describe('lines', { timeout: 60_000 }, () => {
  test('a line that the others explain once all are in the fit is not told', () => {
    // Three turns with a cloud of 181 s and two further gears: a line of 402 s was found on the way, and was 0.06 ± 0.06″ at last.
    const result = analysed(
      {
        wheelTeeth: 144,
        harmonics: [
          { order: 1, amplitudeArcsec: 4.82093133647456, phaseDegrees: 21.446965830637957 },
          { order: 2, amplitudeArcsec: 0.5275828278529399, phaseDegrees: 315.16775852350645 },
          { order: 3, amplitudeArcsec: 0.5, phaseDegrees: 352.9059085192532 },
        ],
        gears: [
          { name: 'pulley', order: 60 / 22, amplitudeArcsec: 0.8, phaseDegrees: 20 },
          { name: 'belt', order: 2 / 3, amplitudeArcsec: 0.6, phaseDegrees: 120 },
        ],
        driftCoefficients: [2 / 60],
        seeing: { whiteSkyArcsec: 0.4, correlatedSkyArcsec: 0, correlationSeconds: 1 },
        cadenceJitterSeconds: 0.02,
        startWormAngleDegrees: 19.500448434506378,
        gaps: [{ startSeconds: 542.1157360625, endSeconds: 722.8209814166668 }],
        conversion: {
          ...axisArcsecConversion(8),
          displacementUnit: 'px',
          imageScaleArcsecPerPx: 1.55,
          declinationDegrees: -45,
          frame: 'sky',
          timeStamp: 'start',
        },
        quantum: 0.06451612903225806,
        durationSeconds: 1807.0524535416669,
        seed: 602,
      },
      null,
    )
    expect(result.lines.length).toBeGreaterThan(0)
    for (const { amplitudeArcsec } of result.lines) {
      expect(amplitudeArcsec.value).toBeGreaterThan(3 * amplitudeArcsec.stderr!)
    }
  })

  test('a swing beside a harmonic, too close to be told apart, is warned of', () => {
    // Order 3.03 beside order 3: only 33 turns would part them, and in eight it draws the worm's period with it.
    const gears = [{ name: 'x', order: 3.03, amplitudeArcsec: 0.9, phaseDegrees: 20 }]
    const harmonics = [
      { order: 1, amplitudeArcsec: 2.5, phaseDegrees: 35 },
      { order: 3, amplitudeArcsec: 0.5, phaseDegrees: 110 },
    ]
    const beside = analysed({ harmonics, gears, durationSeconds: 8 * WORM_180, seed: 819 }, null)
    expect(away(beside.worm!.periodSeconds, WORM_180)).toBeGreaterThan(5)
    expect(codes(beside)).toContain('swing-beside-worm')
    const alone = analysed({ harmonics, durationSeconds: 8 * WORM_180, seed: 819 }, null)
    expect(away(alone.worm!.periodSeconds, WORM_180)).toBeLessThan(4)
    expect(codes(alone)).not.toContain('swing-beside-worm')
  })

  test.each([1, 2, 3, 4, 5])('nothing slower than the record is called a line, seed %i', (seed) => {
    const result = analysed(
      {
        harmonics: [
          { order: 1, amplitudeArcsec: 9, phaseDegrees: 70 * seed },
          { order: 2, amplitudeArcsec: 1.2, phaseDegrees: 200 },
        ],
        driftCoefficients: [0.03],
        durationSeconds: 0.9 * WORM_180,
        seed,
      },
      180,
    )
    expect(result.worm).toBeNull()
    expect(result.wormReason).toBe('short-run')
    for (const { periodSeconds } of result.lines) expect(periodSeconds.value).toBeLessThan(0.9 * WORM_180)
  })
})

import { describe, expect, test } from 'vitest'
import { analyseAtOnce, createAnalyser } from '@/lib/analysis/analyse'
import { drain } from '@/lib/analysis/drain'
import { createRandom } from '@/lib/analysis/random'
import { rootMeanSquare } from '@/lib/analysis/statistics'
import type { AnalysisOutcome, AnalysisSuccess, Recipe, RunColumns } from '@/lib/analysis/types'
import { defaultRecipe } from '@/lib/schemas/recipe'
import co2 from '@/tests/reference/co2.json'
import reference from '@/tests/reference/jointfit.json'

const relative = (value: number, expected: number) => Math.abs(value / expected - 1)

function unwrap(outcome: AnalysisOutcome): AnalysisSuccess {
  if (!outcome.ok) throw new Error(`unexpected failure: ${outcome.reason}`)
  return outcome
}

function columnsOf(time: ArrayLike<number>, values: ArrayLike<number>): RunColumns {
  return {
    timeSeconds: Float64Array.from(time),
    displacement: Float64Array.from(values),
    declinationDisplacement: null,
    wormAngleDegrees: null,
  }
}

function recipe(change: Partial<Recipe> = {}, wheelTeeth: number | null = null): Recipe {
  const base = defaultRecipe()
  return {
    ...base,
    conversion: { ...base.conversion, frame: 'axis' },
    driveTrain: { ...base.driveTrain, wheelTeeth },
    ...change,
  }
}

interface Signal {
  duration: number
  cadence: number
  periodSeconds: number
  amplitudes: number[]
  drift: number
  /** Standard deviation of AR(1) noise with this lag-one correlation. */
  noise: number
  correlation?: number
  lines?: { periodSeconds: number; amplitude: number }[]
  seed: number
}

/** A run with known truth: harmonics with phases 35°, 250°, 110° …, straight drift, AR(1) noise. */
function simulate({
  duration,
  cadence,
  periodSeconds,
  amplitudes,
  drift,
  noise,
  correlation = 0,
  lines = [],
  seed,
}: Signal) {
  const random = createRandom(seed)
  const phases = [35, 250, 110, 20].map((degrees) => (degrees * Math.PI) / 180)
  let lingering = noise * random.normal()
  const time = Float64Array.from({ length: Math.floor(duration / cadence) + 1 }, (_, i) => i * cadence)
  const values = time.map((t, i) => {
    if (i > 0) lingering = correlation * lingering + Math.sqrt(1 - correlation ** 2) * noise * random.normal()
    let value = 3 + drift * t + lingering
    amplitudes.forEach((A, k) => {
      value += A * Math.cos(((k + 1) * 2 * Math.PI * t) / periodSeconds - phases[k])
    })
    for (const line of lines) value += line.amplitude * Math.cos((2 * Math.PI * t) / line.periodSeconds - 1)
    return value
  })
  return columnsOf(time, values)
}

/** No NaN and no infinity anywhere in what is stored; pictures may hold NaN where a line breaks. */
function expectFinite(value: unknown, path = 'result'): void {
  if (typeof value === 'number') expect(Number.isFinite(value), path).toBe(true)
  else if (typeof value === 'object' && value !== null) {
    for (const [key, part] of Object.entries(value)) expectFinite(part, `${path}.${key}`)
  }
}

// A worm of 180 teeth turns in 86164.0905 s/180 (sidereal day of UT: Aoki et al. 1982).
const WORM_180 = 86164.0905 / 180

describe('a simulated run of known truth', { timeout: 60_000 }, () => {
  const truth = { duration: 2000, cadence: 2, periodSeconds: WORM_180, amplitudes: [9], drift: 0.02, noise: 0.4 }
  test.each([1, 2, 3, 4])('seed %i: period within 3 in 1000, fundamental and drift within 1 in 100', (seed) => {
    for (const wheelTeeth of [null, 180]) {
      const { result } = unwrap(analyseAtOnce(simulate({ ...truth, seed }), recipe({}, wheelTeeth)))
      expect(relative(result.worm?.periodSeconds.value ?? 0, WORM_180)).toBeLessThan(0.003)
      expect(relative(result.worm?.harmonics[0].amplitudeArcsec.value ?? 0, 9)).toBeLessThan(0.01)
      expect(relative(result.worm?.peakToPeakArcsec.value ?? 0, 18)).toBeLessThan(0.02)
      expect(relative(result.drift.rateArcsecPerSecond.value, 0.02)).toBeLessThan(0.01)
      expectFinite(result)
    }
  })

  test('truth lies within 4 standard errors, in white and in lingering noise', () => {
    for (const correlation of [0, 0.6]) {
      for (const seed of [11, 12, 13]) {
        const signal = { ...truth, amplitudes: [9, 1.6, 0.7], correlation, seed }
        const { result } = unwrap(analyseAtOnce(simulate(signal), recipe({}, 180)))
        const worm = result.worm
        if (worm === null) throw new Error('no worm')
        const within = (estimate: { value: number; stderr: number | null }, expected: number) =>
          expect(Math.abs(estimate.value - expected)).toBeLessThan(4 * (estimate.stderr ?? 0))
        within(worm.periodSeconds, WORM_180)
        within(worm.harmonics[0].amplitudeArcsec, 9)
        within(worm.harmonics[0].phaseDegrees, 35)
        within(worm.harmonics[1].phaseDegrees, 250)
        within(result.drift.rateArcsecPerSecond, 0.02)
        if (correlation > 0) expect(result.errorModel).not.toBe('white')
      }
    }
  })

  test('a line of another gear is found and named by the drive train', () => {
    const period = 86164.0905 / 152
    const columns = simulate({
      duration: 3400,
      cadence: 2.5,
      periodSeconds: period,
      amplitudes: [7, 1.2],
      drift: 0.01,
      noise: 0.35,
      lines: [{ periodSeconds: (period * 22) / 60, amplitude: 0.9 }],
      seed: 5,
    })
    const base = recipe({}, 152)
    const stages: Recipe['driveTrain']['stages'] = [
      { kind: 'belt', name: 'Belt', drivenTeeth: 60, drivingTeeth: 22, beltTeeth: 90 },
    ]
    const { result } = unwrap(analyseAtOnce(columns, { ...base, driveTrain: { ...base.driveTrain, stages } }))
    const line = result.lines.find(({ source }) => source === 'Motor shaft')
    expect(line?.order?.value).toBeCloseTo(60 / 22, 2)
    expect(relative(line?.amplitudeArcsec.value ?? 0, 0.9)).toBeLessThan(0.1)
  })

  test('a swing at an integer order above the chosen harmonics joins the worm', () => {
    const signal = { ...truth, lines: [{ periodSeconds: WORM_180 / 15, amplitude: 0.6 }], seed: 8 }
    const { result } = unwrap(analyseAtOnce(simulate(signal), recipe({}, 180)))
    expect(result.worm?.harmonics.map(({ order }) => order)).toContain(15)
    expect(result.lines.filter(({ order }) => Math.abs((order?.value ?? 0) - 15) < 0.1)).toEqual([])
  })
})

// Computed outside this project (tests/reference/jointfit.json), degree 2, three harmonics and one line.
describe('the reference run through the whole pipeline', { timeout: 60_000 }, () => {
  const settings = recipe({ isStrayPointFilterOn: false })
  const outcome = unwrap(analyseAtOnce(columnsOf(reference.t, reference.y), settings))
  const { result, views } = outcome

  test('gives the parameters of the outside fit', () => {
    expect(result.drift.degree).toBe(2)
    expect(result.worm?.harmonics).toHaveLength(3)
    expect(result.lines).toHaveLength(1)
    expect(relative(result.worm?.periodSeconds.value ?? 0, reference.value[11])).toBeLessThan(1e-7)
    expect(relative(result.lines[0].periodSeconds.value, reference.value[12])).toBeLessThan(1e-7)
    expect(relative(result.worm?.peakToPeakArcsec.value ?? 0, reference.peak_to_peak)).toBeLessThan(1e-7)
    expect(relative(result.worm?.harmonics[0].phaseDegrees.value ?? 0, 66.1806026811)).toBeLessThan(1e-7)
    expect(relative(result.drift.rateArcsecPerSecond.value, reference.drift_rate_at_tref_arcsec_per_s)).toBeLessThan(
      1e-7,
    )
    expect(relative(result.residual.rmsArcsec, Math.sqrt(reference.rss / reference.N))).toBeLessThan(1e-8)
  })

  test('default errors are at least those of the AR(1) sandwich', () => {
    // Outside value of the sandwich: σ_P 0.1715840043 s.
    expect(result.worm?.periodSeconds.stderr ?? 0).toBeGreaterThan(0.1715840043 * (1 - 1e-6))
    expect(result.worm?.periodSeconds.stderr ?? 0).toBeLessThan(0.1715840043 * 1.3)
  })

  test('pictures are whole: curves, turns, spectrum before and after, chance level', () => {
    expect(views.track.timeSeconds).toHaveLength(views.track.recordedArcsec.length)
    expect(views.turn?.turns).toHaveLength(5)
    expect(views.turn?.tableArcsec).toHaveLength(views.turn?.angleDegrees.length ?? 0)
    expect(views.slip?.slipDegrees).toHaveLength(views.slip?.shareLeft.length ?? 0)
    const { frequencyHz, beforeArcsec, afterArcsec, chanceArcsec } = views.spectrum
    const nearWorm = frequencyHz.findIndex((f) => f > 1 / 500)
    expect(Math.max(...beforeArcsec.slice(Math.max(0, nearWorm - 5), nearWorm + 20))).toBeGreaterThan(7)
    // Nothing that is left passes the level of chance 0.001 by more than a trifle: the search would have taken it.
    afterArcsec.forEach((value, i) => expect(value).toBeLessThan(1.2 * chanceArcsec[i]))
    expect(chanceArcsec.every((value) => value > 0)).toBe(true)
    expect(views.track.turnStartSeconds).toHaveLength(5)
  })

  test('a Kaiser window’s β changes the drawn spectrum and no figure', () => {
    const analyser = createAnalyser(columnsOf(reference.t, reference.y))
    const run = (beta: number) =>
      unwrap(drain(analyser.run(recipe({ spectrumWindow: { kind: 'kaiser', beta }, isLineSearchOn: false }))))
    const [narrow, wide] = [run(2), run(9)]
    expect(wide.views.spectrum.beforeArcsec).not.toEqual(narrow.views.spectrum.beforeArcsec)
    expect(wide.result).toEqual(narrow.result)
  })

  test('equal input gives equal output, and a kept stage the same as a fresh one', () => {
    const analyser = createAnalyser(columnsOf(reference.t, reference.y))
    expect(drain(analyser.run(settings))).toEqual(outcome)
    const other = { ...settings, table: { ...settings.table, binCount: 25 }, toleranceSkyArcsec: 4 }
    expect(drain(analyser.run(other))).toEqual(analyseAtOnce(columnsOf(reference.t, reference.y), other))
    expect(drain(analyser.run(settings))).toEqual(outcome)
  })

  test('late settings recompute nothing of the fit', () => {
    const analyser = createAnalyser(columnsOf(reference.t, reference.y))
    drain(analyser.run(settings))
    const stages = new Set<string>()
    const steps = analyser.run({ ...settings, table: { ...settings.table, gain: 0.8 }, toleranceSkyArcsec: 3 })
    for (let step = steps.next(); !step.done; step = steps.next()) stages.add(step.value.stage)
    expect([...stages]).toEqual(['correcting'])
  })

  test('a tooth count that is off is told', () => {
    const { result: other } = unwrap(
      analyseAtOnce(columnsOf(reference.t, reference.y), recipe({ wormPeriod: 'gear' }, 176)),
    )
    expect(other.worm?.periodSource).toBe('gear')
    expect(other.worm?.periodSeconds.stderr).toBeNull()
    expect(other.warnings.map(({ code }) => code)).toContain('period-differs-from-gear')
    expect(relative(other.worm?.fittedPeriodSeconds?.value ?? 0, 478.69)).toBeLessThan(0.01)
  })
})

// Keeling & Whorf 2004 (Mauna Loa): a year of 365.2425 days on a strongly bent drift; one day is taken for one second.
describe('atmospheric CO₂ at Mauna Loa as a run', { timeout: 120_000 }, () => {
  const settings = recipe({ isStrayPointFilterOn: false })
  const { result } = unwrap(
    analyseAtOnce(
      columnsOf(
        co2.day.map((day) => day - co2.day[0]),
        co2.co2,
      ),
      settings,
    ),
  )

  test('the year is 365.2 ± 0.5 days and stands on a bent drift', () => {
    expect(Math.abs((result.worm?.periodSeconds.value ?? 0) - 365.2)).toBeLessThan(0.5)
    expect(result.drift.degree).toBeGreaterThanOrEqual(2)
  })

  test('annual and semiannual amplitudes within 2 % of the outside fit', () => {
    const [annual, semiannual] = result.worm?.harmonics ?? []
    expect(annual.order).toBe(1)
    expect(relative(annual.amplitudeArcsec.value, co2.annual_amplitude)).toBeLessThan(0.02)
    expect(semiannual.order).toBe(2)
    expect(relative(semiannual.amplitudeArcsec.value, co2.semiannual_amplitude)).toBeLessThan(0.02)
  })
})

describe('short, empty and strange runs', { timeout: 60_000 }, () => {
  const truth = { cadence: 2, periodSeconds: WORM_180, amplitudes: [9, 1.6], drift: 0.02, noise: 0.3, seed: 21 }

  test('under one turn there is no worm figure', () => {
    for (const period of ['fitted', 'gear'] as const) {
      const { result } = unwrap(
        analyseAtOnce(simulate({ ...truth, duration: 400 }), recipe({ wormPeriod: period }, 180)),
      )
      expect(result.worm).toBeNull()
      expect(result.wormReason).toBe('short-run')
      expect(result.table).toBeNull()
      expectFinite(result)
    }
  })

  test('between one and three turns the gear gives the period', () => {
    const { result } = unwrap(analyseAtOnce(simulate({ ...truth, duration: 1000 }), recipe({}, 180)))
    expect(result.worm?.periodSource).toBe('gear')
    expect(result.worm?.periodSeconds).toEqual({ value: WORM_180, stderr: null })
    expect(relative(result.worm?.harmonics[0].amplitudeArcsec.value ?? 0, 9)).toBeLessThan(0.03)
    expect(result.drift.degree).toBeLessThanOrEqual(1)
    expect(result.warnings.map(({ code }) => code)).toContain('short-run')
    expectFinite(result)
  })

  test('between one and three turns without a gear only the interval is given, and it holds the truth', () => {
    const { result } = unwrap(analyseAtOnce(simulate({ ...truth, duration: 1000 }), recipe()))
    expect(result.worm).toBeNull()
    expect(result.wormReason).toBe('short-run')
    const [shortest, longest] = result.wormPeriodIntervalSeconds ?? [0, 0]
    expect(shortest).toBeLessThan(WORM_180)
    expect(longest).toBeGreaterThan(WORM_180)
    expectFinite(result)
  })

  test('a constant signal is singular', () => {
    const outcome = analyseAtOnce(
      columnsOf(
        Array.from({ length: 200 }, (_, i) => 2 * i),
        new Array(200).fill(4),
      ),
      recipe(),
    )
    expect(outcome).toEqual({ ok: false, reason: 'singular' })
  })

  test('few points, time going back, too many gaps in the numbers', () => {
    expect(analyseAtOnce(columnsOf([0, 1, 2], [1, 2, 4]), recipe())).toMatchObject({ ok: false, reason: 'few-points' })
    const times = Array.from({ length: 60 }, (_, i) => i)
    const values = times.map((t) => Math.sin(t))
    const swapped = times.with(30, 10)
    expect(analyseAtOnce(columnsOf(swapped, values), recipe())).toMatchObject({ ok: false, reason: 'not-increasing' })
    const holes = values.map((value, i) => (i % 3 === 0 ? NaN : value))
    expect(analyseAtOnce(columnsOf(times, holes), recipe())).toMatchObject({ ok: false, reason: 'not-finite' })
  })

  test('a straight line, a noise-free sine and pure noise give finite figures', () => {
    const times = Array.from({ length: 900 }, (_, i) => 2 * i)
    const random = createRandom(3)
    const series = [
      times.map((t) => 0.03 * t),
      times.map((t) => 5 * Math.cos((2 * Math.PI * t) / 300)),
      times.map(() => 0.4 * random.normal()),
    ]
    for (const values of series) {
      for (const wheelTeeth of [null, 180]) {
        const outcome = analyseAtOnce(columnsOf(times, values), recipe({}, wheelTeeth))
        if (outcome.ok) expectFinite(outcome.result)
        else expect(['singular', 'no-period']).toContain(outcome.reason)
      }
    }
  })

  test('pure noise has no period of its own: the gear’s is held, without a gear there is none', () => {
    const random = createRandom(3)
    const times = Array.from({ length: 900 }, (_, i) => 2 * i)
    const columns = columnsOf(
      times,
      times.map(() => 0.4 * random.normal()),
    )
    const alone = unwrap(analyseAtOnce(columns, recipe())).result
    expect(alone.worm).toBeNull()
    expect(alone.wormReason).toBe('no-period')
    const geared = unwrap(analyseAtOnce(columns, recipe({}, 180))).result
    expect(geared.worm?.periodSource).toBe('gear')
    expect(geared.worm?.harmonics.some(({ isPhaseMeaningful }) => isPhaseMeaningful)).toBe(false)
    expect(geared.table).toBeNull()
    expect(geared.tableReason).toBe('singular')
  })

  test('every fixed degree and count is kept to', () => {
    const columns = simulate({ ...truth, duration: 2400 })
    const { result } = unwrap(
      analyseAtOnce(columns, recipe({ driftDegree: 3, harmonicCount: 5, isLineSearchOn: false })),
    )
    expect(result.drift.degree).toBe(3)
    expect(result.worm?.harmonics).toHaveLength(5)
    expect(result.lines).toEqual([])
    expect(result.modelChoice).toMatchObject({ isDegreeChosenByEvidence: false, isCountChosenByEvidence: false })
  })

  test('excluded spans and a typed period are kept to', () => {
    const columns = simulate({ ...truth, duration: 2400 })
    const excludedSpans = [{ startSeconds: 500, endSeconds: 599 }]
    const { result } = unwrap(
      analyseAtOnce(columns, recipe({ excludedSpans, wormPeriod: 'typed', typedPeriodSeconds: 479 })),
    )
    expect(result.leftOut).toContainEqual({ reason: 'excluded', count: 50 })
    expect(result.worm?.periodSeconds).toEqual({ value: 479, stderr: null })
    expect(result.worm?.fittedPeriodSeconds?.value).toBeCloseTo(WORM_180, 0)
  })
})

describe('facts of the trade', { timeout: 60_000 }, () => {
  test('1500 s are about three turns of a 180-tooth worm: enough for a free period', () => {
    // common practice, no source
    const signal = {
      duration: 1500,
      cadence: 2,
      periodSeconds: WORM_180,
      amplitudes: [9],
      drift: 0.01,
      noise: 0.4,
      seed: 31,
    }
    const { result } = unwrap(analyseAtOnce(simulate(signal), recipe()))
    expect(result.worm?.periodSource).toBe('fitted')
    expect(Math.floor(result.run.turns ?? 0)).toBe(3)
  })

  test('18″ peak-to-peak is a fundamental of 9″; a good correction leaves about a tenth of it', () => {
    // common practice, no source
    const truth = { duration: 2000, cadence: 2, periodSeconds: WORM_180, drift: 0.02, noise: 0.4 }
    const before = unwrap(analyseAtOnce(simulate({ ...truth, amplitudes: [9], seed: 41 }), recipe({}, 180))).result
    const after = unwrap(analyseAtOnce(simulate({ ...truth, amplitudes: [0.9], seed: 42 }), recipe({}, 180))).result
    expect(before.worm?.peakToPeakArcsec.value ?? 0).toBeCloseTo(18, 0)
    const share =
      (after.worm?.harmonics[0].amplitudeArcsec.value ?? 0) / (before.worm?.harmonics[0].amplitudeArcsec.value ?? 1)
    expect(Math.abs(share - 0.1)).toBeLessThan(0.01)
  })

  test('errors of both axes add in quadrature: hypot(0.51, 0.25) = 0.57', () => {
    // common practice, no source. Two independent series of that RMS, and the distance of each pair from the middle.
    const random = createRandom(6)
    const series = (rms: number) => {
      const values = Float64Array.from({ length: 4000 }, () => random.normal())
      const size = rootMeanSquare(values)
      return values.map((value) => (rms * value) / size)
    }
    const [ra, declination] = [series(0.51), series(0.25)]
    const total = rootMeanSquare(ra.map((value, i) => Math.hypot(value, declination[i])))
    expect(Number(total.toFixed(2))).toBe(0.57)
    // and through the analysis: both columns of one recording, without a worm or a drift
    const time = Float64Array.from(ra, (_, i) => 2 * i)
    const { result } = unwrap(
      analyseAtOnce(
        { ...columnsOf(time, ra), declinationDisplacement: declination },
        recipe({ isStrayPointFilterOn: false, isLineSearchOn: false }),
      ),
    )
    const both = Math.hypot(result.residual.rmsArcsec, result.declination?.rmsArcsec ?? 0)
    expect(Number(both.toFixed(2))).toBe(0.57)
  })
})

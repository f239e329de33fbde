import { createHash } from 'node:crypto'
import { chmodSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, describe, expect, test } from 'vitest'
import { createAnalyser } from '@/lib/analysis/analyse'
import { drain } from '@/lib/analysis/drain'
import type { AnalysisResult, Conversion } from '@/lib/analysis/types'
import { CliFault } from '@/lib/cli/cli-fault'
import { runAnalyse } from '@/lib/cli/run-analyse'
import { parseTable } from '@/lib/formats/parse-table'
import { defaultRecipe } from '@/lib/schemas/recipe'
import { axisArcsecConversion } from '@/lib/simulate/options'
import { SAMPLE_CONVERSION, SAMPLE_IMPORT, sampleRun } from '@/lib/simulate/sample'
import type { SimulatedRun } from '@/lib/simulate/simulate-run'
import { recording } from './recordings'
import { reportSchema, type Report } from './report-schema'

const folder = mkdtempSync(join(tmpdir(), 'turnwright-cli-'))
afterAll(() => rmSync(folder, { recursive: true, force: true }))

function fileOf(name: string, content: string | Uint8Array): string {
  const path = join(folder, name)
  writeFileSync(path, content)
  return path
}

async function reportOf(path: string, ...options: string[]): Promise<Report> {
  return reportSchema.parse(JSON.parse(await runAnalyse([path, ...options])))
}

const SAMPLE = new URL('../../public/sample-run.csv', import.meta.url).pathname

/** Distance in standard errors. */
function away({ value, stderr }: { value: number; stderr: number | null }, truth: number): number {
  return Math.abs(value - truth) / stderr!
}

function phaseAway(phase: { value: number; stderr: number }, truth: number): number {
  const turned = (((phase.value - truth) % 360) + 540) % 360
  return Math.abs(turned - 180) / phase.stderr
}

/** Period, drift and the two harmonics that were put in, each within four of its own standard errors. */
function expectTruth({ worm, drift }: Report, { truth }: SimulatedRun): void {
  expect(away(worm!.periodSeconds, truth.wormPeriodSeconds)).toBeLessThan(4)
  expect(away(drift.coefficients[0], truth.options.driftCoefficients[0])).toBeLessThan(4)
  expect(worm!.harmonics.length).toBeGreaterThanOrEqual(truth.harmonics.length)
  truth.harmonics.forEach(({ cosArcsec, sinArcsec }, i) => {
    const found = worm!.harmonics[i]
    expect(away(found.amplitudeArcsec, Math.hypot(cosArcsec, sinArcsec))).toBeLessThan(4)
    expect(phaseAway(found.phaseDegrees!, (Math.atan2(sinArcsec, cosArcsec) * 180) / Math.PI)).toBeLessThan(4)
  })
}

const onSky = (changes: Partial<Conversion>): Conversion => ({
  ...axisArcsecConversion(2),
  frame: 'sky',
  declinationDegrees: -12,
  ...changes,
})

describe('the truth of a simulated run comes back', () => {
  test.each([
    [
      'px, comma, on the sky, south of the equator',
      { conversion: onSky({ displacementUnit: 'px', imageScaleArcsecPerPx: 1.55 }) },
      { hasUnits: true },
      ['--scale', '1.55', '--declination', '-12', '--exposure', '2'],
    ],
    [
      'arcsec, semicolon and decimal comma, falling when ahead',
      { conversion: { ...axisArcsecConversion(2), positiveMeans: 'behind' as const } },
      { delimiter: ';' as const, decimalMark: ',' as const },
      ['--on', 'axis', '--positive', 'behind', '--exposure', '2'],
    ],
    [
      'seconds of right ascension, stamps at the start',
      {
        conversion: {
          ...axisArcsecConversion(2),
          displacementUnit: 'ra-seconds' as const,
          timeStamp: 'start' as const,
        },
      },
      { delimiter: '\t' as const, hasUnits: true },
      ['--exposure', '2', '--stamp', 'start'],
    ],
    [
      'no heads, times as Julian Dates',
      {},
      { hasHeader: false, timeUnit: 'julian-date' as const, startedAtMs: Date.UTC(2026, 10, 14, 21) },
      ['--on', 'axis', '--unit', 'arcsec', '--exposure', '2'],
    ],
  ])('%s', async (name, given, layout, options) => {
    const { run, text } = recording(given, layout)
    const report = await reportOf(fileOf(`${name.length}.csv`, text), ...options)
    expectTruth(report, run)
    expect(report.file.sha256).toBe(createHash('sha256').update(text).digest('hex'))
    expect(report.file.rows).toBe(run.columns.timeSeconds.length)
  })

  test('missing cells are left out and counted', async () => {
    const missingCells = [{ atSeconds: 301 }, { atSeconds: 304 }, { atSeconds: 1500 }]
    const { run, text } = recording({ missingCells })
    const report = await reportOf(fileOf('missing.csv', text), '--on', 'axis', '--exposure', '2')
    expect(report.file.leftOut).toEqual([{ reason: 'missing', count: 3 }])
    expect(report.file.used).toBe(report.file.rows - 3)
    expectTruth(report, run)
  })

  test('the sample run that is delivered, whose preamble tells the rest', async () => {
    const report = await reportOf(SAMPLE)
    // Its harmonics wander by 0.08″ from turn to turn, beyond what standard errors of one run can know.
    const { truth } = sampleRun()
    const { worm, drift } = report
    expect(away(worm!.periodSeconds, truth.wormPeriodSeconds)).toBeLessThan(4)
    expect(away(drift.coefficients[0], truth.options.driftCoefficients[0])).toBeLessThan(4)
    expect(away(worm!.peakToPeakArcsec, truth.wormPeakToPeakArcsec)).toBeLessThan(4)
    truth.harmonics.slice(0, 3).forEach(({ cosArcsec, sinArcsec }, i) => {
      expect(away(worm!.harmonics[i].amplitudeArcsec, Math.hypot(cosArcsec, sinArcsec))).toBeLessThan(4)
    })
    const gearOrders = truth.options.gears.map(({ order }) => order)
    expect(report.lines.length).toBe(gearOrders.length)
    for (const { periodSeconds } of report.lines) {
      const nearest = Math.min(...gearOrders.map((order) => away(periodSeconds, truth.wormPeriodSeconds / order)))
      expect(nearest).toBeLessThan(4)
    }
    const told = report.warnings.map(({ code }) => code)
    expect(told).toEqual(expect.arrayContaining(['declination-from-file', 'scale-from-file', 'exposure-from-file']))
  })
})

test('figures are those of the core on the same columns, bit by bit', async () => {
  const report = await reportOf(SAMPLE, '--teeth', '152', '--drift', '1', '--harmonics', '3')
  const parsed = drain(parseTable(readFileSync(SAMPLE), SAMPLE_IMPORT))
  if (!parsed.ok) throw new Error(parsed.fault.message)
  const recipe = defaultRecipe()
  const outcome = drain(
    createAnalyser(parsed.columns).run({
      ...recipe,
      conversion: { ...SAMPLE_CONVERSION },
      driftDegree: 1,
      harmonicCount: 3,
      driveTrain: { ...recipe.driveTrain, wheelTeeth: 152 },
      wormPeriod: 'gear',
    }),
  )
  if (!outcome.ok) throw new Error(outcome.reason)
  const { result } = outcome
  const { worm } = result
  expect(report.drift).toEqual({ degree: 1, coefficients: result.drift.coefficients })
  expect(report.worm).toEqual({
    periodSeconds: worm!.periodSeconds,
    peakToPeakArcsec: worm!.peakToPeakArcsec,
    steepestRateArcsecPerSecond: worm!.steepestRateArcsecPerSecond,
    harmonics: worm!.harmonics.map(({ order, amplitudeArcsec, phaseDegrees }) => ({
      order,
      amplitudeArcsec,
      phaseDegrees,
    })),
  })
  expect(report.lines.map(({ periodSeconds }) => periodSeconds)).toEqual(
    result.lines.map(({ periodSeconds }) => periodSeconds),
  )
  expect(report.residual).toEqual(pick(result.residual, ['rmsArcsec', 'lagOneCorrelation', 'seeingFloorArcsec']))
  expect(report.turn).toEqual(pick(result.turn!, ['repeatability', 'heldOutReduction', 'scatter']))
  expect(report.spans).toEqual(pick(result.spans, Object.keys(report.spans) as (keyof Report['spans'])[]))
  expect(report.run).toEqual(pick(result.run, ['durationSeconds', 'medianCadenceSeconds', 'turns']))
})

function pick<Whole extends object, Key extends keyof Whole>(whole: Whole, keys: Key[]): Pick<Whole, Key> {
  return Object.fromEntries(keys.map((key) => [key, whole[key]])) as Pick<Whole, Key>
}

describe('what is held, and what cannot be had', () => {
  test('a typed period is held: no standard error', async () => {
    const { text } = recording()
    const report = await reportOf(fileOf('typed.csv', text), '--on', 'axis', '--worm-period', '478.7')
    expect(report.worm!.periodSeconds).toEqual({ value: 478.7, stderr: null })
  })

  test('a run of less than a turn has no worm, and a warning with the reason word', async () => {
    const { text } = recording({ durationSeconds: 400 })
    const path = fileOf('short.csv', text)
    for (const options of [['--teeth', '180'], []]) {
      const report = await reportOf(path, '--on', 'axis', ...options)
      expect(report.worm).toBeNull()
      expect(report.turn).toBeNull()
      expect(report.run.turns).toBeNull()
      const reasons = report.warnings.filter(({ code }) => code === 'short-run')
      expect(reasons.length).toBeGreaterThan(0)
    }
  })

  test('two turns without teeth give an interval that holds the truth', async () => {
    const { text } = recording({ durationSeconds: 1000 })
    const report = await reportOf(fileOf('two-turns.csv', text), '--on', 'axis')
    expect(report.worm).toBeNull()
    const interval = report.warnings.find(({ code }) => code === 'period-interval')!
    const [from, to] = [...interval.message.matchAll(/\d+\.\d/g)].map(Number)
    expect(from).toBeLessThan(478.69)
    expect(to).toBeGreaterThan(478.69)
  })

  test('a phase below three standard errors is null, and told', async () => {
    const { text } = recording({ harmonics: [{ order: 1, amplitudeArcsec: 9, phaseDegrees: 77 }] })
    const report = await reportOf(fileOf('weak.csv', text), '--on', 'axis', '--teeth', '180', '--harmonics', '6')
    const silent = report.worm!.harmonics.filter(({ phaseDegrees }) => phaseDegrees === null)
    expect(silent.length).toBeGreaterThan(0)
    for (const { order, amplitudeArcsec } of silent) {
      expect(amplitudeArcsec.value).toBeLessThan(3 * amplitudeArcsec.stderr!)
      expect(report.warnings.some(({ message }) => message.includes(`phase of order ${order} `))).toBe(true)
    }
  })

  test('every assumption is told, and none that was settled', async () => {
    const { text } = recording()
    const path = fileOf('assumed.csv', text)
    const codes = async (...options: string[]) => (await reportOf(path, ...options)).warnings.map(({ code }) => code)
    expect(await codes('--declination', '10')).toEqual([
      ...['time-column-guessed', 'ra-column-guessed', 'unit-guessed', 'frame-assumed', 'positive-assumed'],
      ...['exposure-unknown', 'stamp-assumed', 'sense-assumed', 'period-may-be-harmonic'],
    ])
    const settled = ['--time', '1', '--ra', 'RA displacement', '--unit', 'arcsec', '--on', 'axis']
    expect(
      await codes(...settled, '--positive', 'ahead', '--exposure', '2', '--stamp', 'mid', '--teeth', '180'),
    ).toEqual([])
  })
})

describe('named columns', () => {
  const text = [
    'Minutes,A,B [px],B2',
    ...Array.from(
      { length: 400 },
      (_, i) => `${i / 10},${Math.sin(i / 10).toFixed(4)},${(9 * Math.cos(i / 13)).toFixed(4)},${i % 7}`,
    ),
  ].join('\n')

  test('a column that was named keeps its own unit', async () => {
    const options = ['--ra', 'b', '--on', 'axis', '--scale', '2']
    const report = await reportOf(fileOf('columns.csv', text), ...options, '--time', 'minutes')
    expect(report.run.medianCadenceSeconds).toBeCloseTo(6, 9)
    // 9 px of 2″ on both sides.
    expect(report.spans.rawArcsec).toBeCloseTo(36, 0)
  })

  test.each([
    [['--time', 'Clock'], 'There is no column “Clock”. There are 1 “Minutes”, 2 “A”'],
    [['--ra', '9'], 'There is no column “9”'],
    [['--time', '1', '--ra', 'Minutes'], '--time and --ra name the same column, “Minutes”'],
    [['--ra', '2', '--dec', 'A'], '--ra and --dec name the same column, “A”'],
    [['--ra', '2', '--on', 'axis', '--time', '4'], 'Row'],
  ])('%j is refused', async (options, told) => {
    await expect(runAnalyse([fileOf('columns.csv', text), ...options])).rejects.toThrow(told)
  })
})

const flat = ['Time,RA displacement', ...Array.from({ length: 100 }, (_, i) => `${2 * i},1.25`)].join('\n')
const plain = recording({ durationSeconds: 300 }).text

describe('faults name the place and the remedy', () => {
  test.each([
    ['constant.csv', flat, [], '(one that never changes is passed over): name it with --ra'],
    ['named.csv', flat, ['--ra', '2', '--on', 'axis'], 'named.csv: '],
    ['binary.csv', Uint8Array.from({ length: 3000 }, (_, i) => (i * 37) % 256), [], 'binary.csv: The file is not text'],
    ['empty.csv', '', [], 'empty.csv: The file is empty'],
    ['words.csv', 'There is nothing here to read.\n', [], 'No table of numbers was found'],
    ['sky.csv', plain, ['--unit', 'arcsec'], '--declination DEG (or --on axis)'],
    ['px.csv', plain, ['--unit', 'px', '--on', 'axis'], '--scale ARCSEC_PER_PX'],
    ['ra.csv', plain, ['--unit', 'ra-seconds', '--on', 'sky'], 'leave out --on sky'],
    ['few.csv', plain.split('\n').slice(0, 12).join('\n'), ['--on', 'axis'], 'few.csv: '],
  ] as [string, string | Uint8Array, string[], string][])('%s', async (name, content, options, told) => {
    const faulty = runAnalyse([fileOf(name, content), ...options])
    await expect(faulty).rejects.toThrow(CliFault)
    await expect(faulty).rejects.toThrow(told)
  })

  test('a missing file and a folder', async () => {
    await expect(runAnalyse([join(folder, 'none.csv')])).rejects.toThrow('none.csv: there is no such file')
    await expect(runAnalyse([folder])).rejects.toThrow('this is a folder; name a file in it')
  })

  test.skipIf(process.getuid?.() === 0)('a file that may not be read', async () => {
    const path = fileOf('locked.csv', plain)
    chmodSync(path, 0o000)
    await expect(runAnalyse([path])).rejects.toThrow('this user may not read it')
  })
})

test('the schema refuses a figure that is none', () => {
  const figures: Pick<AnalysisResult['residual'], 'rmsArcsec'> = { rmsArcsec: NaN }
  expect(
    reportSchema.shape.residual.safeParse({ ...figures, lagOneCorrelation: 0, seeingFloorArcsec: 1 }).success,
  ).toBe(false)
})

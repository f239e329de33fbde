import { describe, expect, test } from 'vitest'
import { createAnalyser } from '@/lib/analysis/analyse'
import { drain } from '@/lib/analysis/drain'
import type { Conversion, Recipe, RunColumns, TableResult, TableSettings } from '@/lib/analysis/types'
import { defaultRecipe } from '@/lib/schemas/recipe'
import { axisArcsecConversion, simulationOptions } from '@/lib/simulate/options'
import { simulateRun } from '@/lib/simulate/simulate-run'

// From a recording to a table to a mount that plays it: the written rows are read back here by their meaning alone (listed
// angle, unit, sense, direction, where zero stands) by a player that shares no code with the core, and are added to the
// error that the simulator put in. A right table leaves next to nothing; a wrong sign, origin or direction leaves as much as
// there was, or twice that.

const WORM_SECONDS = 86164.0905 / 180 // sidereal day of UT: Aoki et al. 1982, A&A 105, 359
const SIDEREAL_ARCSEC_PER_SECOND = 1296000 / 86164.0905
const TURN = 2 * Math.PI

const HARMONICS = [
  { order: 1, amplitudeArcsec: 7, phaseDegrees: 34 },
  { order: 2, amplitudeArcsec: 1.8, phaseDegrees: 201 },
  { order: 3, amplitudeArcsec: 0.6, phaseDegrees: 327 },
]

interface Night {
  columns: RunColumns
  conversion: Conversion
  /** Error of the worm, in arc seconds of axis, at a time on the analysis' clock (mid-exposure, first row's stamp 0). */
  trueError(seconds: number): number
  /** The angle in the file at that time, neither wrapped nor rounded. */
  columnDegrees(seconds: number): number
}

/** Five turns in quiet air; the fit's own error is then far below the tolerance of the playback. */
function night(change: Partial<Conversion>, column: 'rising' | 'falling'): Night {
  const conversion = { ...axisArcsecConversion(8), ...change }
  const startDegrees = 133
  const run = simulateRun(
    simulationOptions({
      wheelTeeth: 180,
      harmonics: HARMONICS,
      driftCoefficients: [0.012],
      seeing: { whiteSkyArcsec: 0.05, correlatedSkyArcsec: 0, correlationSeconds: 5 },
      cadenceSeconds: 8,
      durationSeconds: 5 * WORM_SECONDS,
      startWormAngleDegrees: startDegrees,
      wormAngleQuantumDegrees: 0,
      conversion,
      seed: 77,
    }),
  )
  const { wormAngleDegrees } = run.columns
  const recorded = column === 'rising' ? wormAngleDegrees : wormAngleDegrees!.map((degrees) => (360 - degrees) % 360)
  // The simulator counts its worm angle from the start of the first exposure; the analysis counts its time from the first stamp.
  const stampAt = { start: 0, mid: 4, end: 8 }[conversion.timeStamp]
  const trueDegrees = (seconds: number) => startDegrees + (360 * (seconds + stampAt)) / WORM_SECONDS
  return {
    columns: { ...run.columns, wormAngleDegrees: recorded },
    conversion,
    trueError: (seconds) => {
      const theta = (trueDegrees(seconds) * Math.PI) / 180
      return HARMONICS.reduce(
        (sum, { order, amplitudeArcsec, phaseDegrees }) =>
          sum + amplitudeArcsec * Math.cos(order * theta - (phaseDegrees * Math.PI) / 180),
        0,
      )
    },
    columnDegrees: (seconds) => (column === 'rising' ? 1 : -1) * trueDegrees(seconds),
  }
}

const wrap = (degrees: number) => degrees - 360 * Math.floor(degrees / 360)

const sortedRows = new WeakMap<TableResult, TableResult['bins']>()

function ascending(table: TableResult): TableResult['bins'] {
  const known = sortedRows.get(table) ?? [...table.bins].sort((a, b) => a.angleDegrees - b.angleDegrees)
  sortedRows.set(table, known)
  return known
}

/** What the axis is asked to do at a listed angle: between rows by straight lines, or each row about its own angle. */
function positionAt(table: TableResult, degrees: number): number {
  const { settings } = table
  const sorted = ascending(table)
  const width = 360 / sorted.length
  const place = wrap(degrees - sorted[0].angleDegrees) / width
  const before = Math.floor(place)
  const [row, next] = [sorted[before % sorted.length], sorted[(before + 1) % sorted.length]]
  const share = place - before
  const value =
    settings.playback === 'held-at-centre'
      ? share < 0.5
        ? row.value
        : next.value
      : row.value * (1 - share) + next.value * share
  return settings.meaning === 'correction' ? value : -value
}

/** ″/s at a listed angle: a row's rate holds from its own angle to the next one's in the direction the worm turns. */
function rateAt(table: TableResult, degrees: number): number {
  const { bins, settings } = table
  const width = 360 / bins.length
  const row = bins.find(({ angleDegrees }) => {
    const past = settings.angleDirection === 'increasing' ? wrap(degrees - angleDegrees) : wrap(angleDegrees - degrees)
    return past < width
  })
  if (row === undefined) throw new Error(`no row holds at ${degrees}°`)
  const perUnit = settings.unit === 'percent-sidereal' ? SIDEREAL_ARCSEC_PER_SECOND / 100 : 1
  return (settings.meaning === 'correction' ? 1 : -1) * perUnit * row.value
}

/** Peak-to-peak of the true error and of what is left of it while the table plays, over the third turn. */
function playedBack(from: Night, table: TableResult, angleAt: (seconds: number) => number) {
  const steps = 720
  const before: number[] = []
  const after: number[] = []
  let moved = 0
  for (let i = 0; i < steps; i++) {
    const t = 2 * WORM_SECONDS + (i * WORM_SECONDS) / steps
    const error = from.trueError(t)
    const half = WORM_SECONDS / steps / 2
    before.push(error)
    after.push(error + (table.settings.quantity === 'rate' ? moved : positionAt(table, angleAt(t))))
    if (table.settings.quantity === 'rate') moved += 2 * half * rateAt(table, angleAt(t + half))
  }
  const span = (values: number[]) => Math.max(...values) - Math.min(...values)
  return { before: span(before), after: span(after), creep: moved }
}

const NIGHTS: [string, Night][] = [
  ['ahead, arc seconds of axis, stamps at mid-exposure', night({}, 'rising')],
  [
    'behind, pixels at declination 60°, stamps at the start of the exposure',
    night(
      {
        displacementUnit: 'px',
        imageScaleArcsecPerPx: 1.55,
        declinationDegrees: 60,
        frame: 'sky',
        positiveMeans: 'behind',
        timeStamp: 'start',
      },
      'falling',
    ),
  ],
  [
    'behind, seconds of right ascension, stamps at the end',
    night({ displacementUnit: 'ra-seconds', positiveMeans: 'behind', timeStamp: 'end' }, 'rising'),
  ],
]

const FORMS: Partial<TableSettings>[] = [
  { quantity: 'position', unit: 'arcsec', meaning: 'correction' },
  { quantity: 'position', unit: 'arcsec', meaning: 'error' },
  { quantity: 'position', unit: 'arcsec', meaning: 'correction', playback: 'held-at-centre' },
  { quantity: 'rate', unit: 'arcsec-per-second', meaning: 'correction' },
  { quantity: 'rate', unit: 'percent-sidereal', meaning: 'error' },
]

describe.each(NIGHTS)('%s', (_, from) => {
  const analyser = createAnalyser(from.columns)
  const analysed = (settings: Partial<TableSettings>) => {
    const base = defaultRecipe()
    const recipe: Recipe = {
      ...base,
      conversion: from.conversion,
      driveTrain: { ...base.driveTrain, wheelTeeth: 180 },
      table: { ...base.table, ...settings },
    }
    const outcome = drain(analyser.run(recipe))
    if (!outcome.ok) throw new Error(outcome.reason)
    return outcome.result
  }
  const tableOf = (settings: Partial<TableSettings>) => {
    const { table, tableReason } = analysed(settings)
    if (table === null) throw new Error(tableReason ?? 'no table')
    return table
  }
  // Mid-exposure of the first row on the analysis' clock.
  const firstMid = { start: 4, mid: 0, end: -4 }[from.conversion.timeStamp]
  const columnDirection = from.columnDegrees(1) > from.columnDegrees(0) ? 'increasing' : 'decreasing'
  const origins: [TableSettings['origin'], (t: number, sign: 1 | -1) => number, boolean][] = [
    [{ kind: 'run-start' }, (t, sign) => (sign * 360 * (t - firstMid)) / WORM_SECONDS, false],
    [{ kind: 'index-time', timeSeconds: 700 }, (t, sign) => (sign * 360 * (t - 700)) / WORM_SECONDS, false],
    [{ kind: 'worm-angle-column' }, (t) => from.columnDegrees(t), true],
  ]

  for (const [origin, angleAt, isColumn] of origins) {
    const directions = isColumn ? ([columnDirection] as const) : (['increasing', 'decreasing'] as const)
    for (const angleDirection of directions) {
      test(`zero by ${origin.kind}, ${angleDirection} angle: every form takes the true error away`, () => {
        const sign = angleDirection === 'increasing' ? 1 : -1
        for (const form of FORMS) {
          for (const offsetDegrees of [0, 77]) {
            const table = tableOf({ ...form, origin, angleDirection, offsetDegrees })
            const { before, after, creep } = playedBack(from, table, (t) => angleAt(t, sign) + offsetDegrees)
            // Straight lines between 240 rows lose 1e-4 of an order; a stair's tread is 2π/240 of the amplitude to either side.
            const share = form.playback === 'held-at-centre' ? 0.03 : 0.01
            expect(after / before).toBeLessThan(share)
            // 720 steps are three to a row wherever the rows stand, so their sum over a turn is exact.
            if (form.quantity === 'rate') expect(Math.abs(creep)).toBeLessThan(1e-9)
          }
        }
      })
    }
  }

  test('half the gain leaves half the error', () => {
    const table = tableOf({ gain: 0.5, origin: { kind: 'index-time', timeSeconds: 700 } })
    const { before, after } = playedBack(from, table, (t) => (360 * (t - 700)) / WORM_SECONDS)
    expect(after / before).toBeGreaterThan(0.49)
    expect(after / before).toBeLessThan(0.51)
  })

  test('read with the wrong meaning the same rows double the error', () => {
    const table = tableOf({ meaning: 'error' })
    const misread = { ...table, settings: { ...table.settings, meaning: 'correction' as const } }
    const { before, after } = playedBack(from, misread, (t) => (360 * (t - firstMid)) / WORM_SECONDS)
    expect(after / before).toBeGreaterThan(1.98)
    expect(after / before).toBeLessThan(2.02)
  })

  test('a table listed against the recorded worm angle is told', () => {
    const other = columnDirection === 'increasing' ? 'decreasing' : 'increasing'
    const codes = (angleDirection: TableSettings['angleDirection'], origin: TableSettings['origin']) =>
      analysed({ angleDirection, origin }).warnings.map(({ code }) => code)
    expect(codes(other, { kind: 'worm-angle-column' })).toContain('angle-direction-differs')
    expect(codes(columnDirection, { kind: 'worm-angle-column' })).not.toContain('angle-direction-differs')
    expect(codes(other, { kind: 'run-start' })).not.toContain('angle-direction-differs')
  })

  test('a listed phase is the curve’s own: furthest ahead where the true error is largest', () => {
    const { worm } = analysed({})
    const phases = Array.from({ length: 3600 }, (__, i) => (i * WORM_SECONDS) / 3600)
    const ahead = phases.reduce((best, t) =>
      from.trueError(firstMid + t) > from.trueError(firstMid + best) ? t : best,
    )
    const apart = worm!.furthestAheadDegrees - (360 * ahead) / WORM_SECONDS
    expect(Math.abs(apart - 360 * Math.round(apart / 360))).toBeLessThan(1)
    worm!.harmonics.slice(0, 3).forEach(({ order, phaseDegrees }, k) => {
      const start = 133 + (360 * 4) / WORM_SECONDS // angle at mid-exposure of the first row
      const off = phaseDegrees.value - (HARMONICS[k].phaseDegrees - order * start)
      const turns = off / 360
      expect(Math.abs((turns - Math.round(turns)) * TURN)).toBeLessThan(0.03)
    })
  })
})

import { analyseAtOnce } from '@/lib/analysis/analyse'
import type { Estimate, Recipe, RunColumns } from '@/lib/analysis/types'
import { defaultRecipe } from '@/lib/schemas/recipe'
import { axisArcsecConversion } from '@/lib/simulate/options'
import { coverageNoise, type CoverageNoise } from './coverage-noise'

/** One kind of noise at one length of run. */
export interface CoverageCell {
  name: string
  noise: CoverageNoise
  turns: number
  /** Whether the shares are promised; the others are reported beside them. */
  isPromised: boolean
}

const TURNS = [3, 4, 8]

function cellsOf(name: string, noise: CoverageNoise, isPromised: boolean): CoverageCell[] {
  return TURNS.map((turns) => ({ name, noise, turns, isPromised }))
}

export const COVERAGE_CELLS: CoverageCell[] = [
  ...cellsOf('white', { kind: 'ar1', lagOne: 0 }, true),
  ...cellsOf('AR(1) 0.6', { kind: 'ar1', lagOne: 0.6 }, true),
  ...cellsOf('AR(1) 0.9', { kind: 'ar1', lagOne: 0.9 }, true),
  ...cellsOf('0.36 white + 0.64 AR(1) 0.95', { kind: 'mixture', whiteShare: 0.36, lagOne: 0.95 }, false),
  ...cellsOf('power law f^(−2/3)', { kind: 'power-law', exponent: 2 / 3 }, false),
]

export const COVERAGE_QUANTITIES = ['period', 'amplitude', 'drift'] as const
export type CoverageQuantity = (typeof COVERAGE_QUANTITIES)[number]

/** Per quantity and run, how many of its standard errors a figure lies from the truth; infinite where there is none. */
export type CoverageDistances = Record<CoverageQuantity, Float64Array>

/** Half widths of the 68 % and the 95 % interval of a normal distribution, in standard errors. */
export const HALF_WIDTH_68 = 0.9944578832097532
export const HALF_WIDTH_95 = 1.959963984540054

/** An invented mount of 180 teeth, a frame every 2.5 s, noise of 0.4″. */
const WHEEL_TEETH = 180
const PERIOD_SECONDS = 86164.0905 / WHEEL_TEETH
const HARMONICS_ARCSEC = [9, 1.6, 0.7]
const DRIFT_ARCSEC_PER_SECOND = 0.02
const NOISE_ARCSEC = 0.4
const CADENCE_SECONDS = 2.5
/** A run of three turns to the second has no figure whenever noise makes the period come out too long. */
const SPARE_TURNS = 0.05

/**
 * Period free, teeth known, drift of degree 1, three harmonics, no further lines: the errors are judged, not the choice of
 * a model or of the fundamental.
 */
const RECIPE: Recipe = {
  ...defaultRecipe(),
  driveTrain: { axisKind: 'worm', wheelTeeth: WHEEL_TEETH, wormStarts: 1, stages: [] },
  conversion: axisArcsecConversion(),
  isStrayPointFilterOn: false,
  driftDegree: 1,
  harmonicCount: 3,
  isLineSearchOn: false,
}

/** Runs of one cell, by seeds of its own: more runs are the same ones and some more. */
export function measureCoverage(cell: CoverageCell, runs: number): CoverageDistances {
  const distances = Object.fromEntries(
    COVERAGE_QUANTITIES.map((quantity) => [quantity, new Float64Array(runs).fill(Infinity)]),
  ) as CoverageDistances
  for (let run = 0; run < runs; run++) {
    const outcome = analyseAtOnce(simulatedColumns(cell, run), RECIPE)
    if (!outcome.ok) throw new Error(`a simulated run was refused: ${outcome.reason}`)
    const { worm, drift } = outcome.result
    const found: Record<CoverageQuantity, [Estimate | undefined, number]> = {
      period: [worm?.periodSeconds, PERIOD_SECONDS],
      amplitude: [worm?.harmonics[0].amplitudeArcsec, HARMONICS_ARCSEC[0]],
      drift: [drift.coefficients[0], DRIFT_ARCSEC_PER_SECOND],
    }
    for (const quantity of COVERAGE_QUANTITIES) {
      const [estimate, truth] = found[quantity]
      if (!estimate || estimate.stderr === null) continue
      distances[quantity][run] = Math.abs(estimate.value - truth) / estimate.stderr
    }
  }
  return distances
}

function simulatedColumns(cell: CoverageCell, run: number): RunColumns {
  const sampleCount = Math.floor(((cell.turns + SPARE_TURNS) * PERIOD_SECONDS) / CADENCE_SECONDS) + 1
  const seed = 100_000 * (1 + COVERAGE_CELLS.findIndex(({ name, turns }) => name === cell.name && turns === cell.turns))
  const noise = coverageNoise(cell.noise, sampleCount, seed + run)
  // Phases go round with the runs: a bias of one phase must not pass for scatter, nor hide behind another.
  const phase = 2 * Math.PI * ((run * 0.6180339887498949) % 1)
  const timeSeconds = Float64Array.from(noise, (_, i) => CADENCE_SECONDS * i)
  const displacement = noise.map((value, i) => {
    const theta = (2 * Math.PI * timeSeconds[i]) / PERIOD_SECONDS
    const worm = HARMONICS_ARCSEC.reduce((sum, size, k) => sum + size * Math.cos((k + 1) * (theta - phase) + k), 0)
    return worm + DRIFT_ARCSEC_PER_SECOND * timeSeconds[i] + NOISE_ARCSEC * value
  })
  return { timeSeconds, displacement, declinationDisplacement: null, wormAngleDegrees: null }
}

/** How many of the distances lie within the half width. */
export function countWithin(distances: Float64Array, halfWidth: number): number {
  return distances.reduce((count, distance) => (distance <= halfWidth ? count + 1 : count), 0)
}

import type { HarmonicCoefficients, RunColumns, Track } from '@/lib/analysis/types'
import { checkOptions } from './check-options'
import { CHANCE, gaussianStream, seeingSeries } from './noise'
import type { SimulationOptions } from './options'
import { averagedErrorParts, simulatedWormPeriodSeconds, type TurnWander } from './true-error'

const RADIANS_PER_DEGREE = Math.PI / 180

/** What a simulated run is really made of. Phases and times count from the first row, as those of an analysis do. */
export interface SimulationTruth {
  options: SimulationOptions
  wormPeriodSeconds: number
  /** First row's time stamp, from the start of the simulation; rows before it were lost. */
  firstRowSeconds: number
  /** Of the worm, for θ = 2π(t − t_1)/P, t_1 mid-exposure of the first row; without wander and exposure averaging. */
  harmonics: HarmonicCoefficients[]
  wormPeakToPeakArcsec: number
  /** Per row, averaged over the exposure, in arc seconds of axis. */
  wormArcsec: Float64Array
  gearsArcsec: Float64Array
  driftArcsec: Float64Array
  stepsArcsec: Float64Array
  seeingArcsec: Float64Array
  /** Rows that were hit by a stray point, and rows whose displacement is missing. */
  strayRows: number[]
  missingRows: number[]
  /** Frames that fell into gaps. */
  lostRowCount: number
}

export interface SimulatedRun {
  columns: RunColumns
  truth: SimulationTruth
  /** The error on the axis before units and quantisation, stray points and missing rows included; time mid-exposure. */
  track: Track
}

/**
 * Records a mount that does not exist: periodic error, drift, other gears, seeing, exposure, lost frames, stray points,
 * units and quantisation. Pure and deterministic: equal options give equal runs. Every source of chance has a stream of
 * its own, so that switching one off leaves the others as they were.
 *
 * @throws {RangeError} for options that describe no mount (see checkOptions)
 */
export function simulateRun(options: SimulationOptions): SimulatedRun {
  checkOptions(options)
  const exposure = options.conversion.exposureSeconds ?? 0
  const period = simulatedWormPeriodSeconds(options)
  const wander = turnWander(options, period)
  const { midSeconds, lostRowCount } = frameTimes(options, exposure)
  const rowCount = midSeconds.length
  if (rowCount === 0) throw new RangeError('gaps must leave at least one row')

  const stampShift = { start: -exposure / 2, mid: 0, end: exposure / 2 }[options.conversion.timeStamp]
  const firstRowSeconds = midSeconds[0] + stampShift
  const skyPerAxis = Math.cos((options.conversion.declinationDegrees ?? 0) * RADIANS_PER_DEGREE)
  const seeingSky = seeingSeries(options.seeing, midSeconds, options.seed, CHANCE.seeing)
  const strayRows = options.strayPoints.map(({ atSeconds }) => nearestRow(midSeconds, atSeconds))
  const missingRows = options.missingCells.map(({ atSeconds }) => nearestRow(midSeconds, atSeconds))

  const series = () => new Float64Array(rowCount)
  const [worm, gears, drift, steps, seeing, ra] = [series(), series(), series(), series(), series(), series()]
  for (let i = 0; i < rowCount; i++) {
    const parts = averagedErrorParts(options, wander, midSeconds[i], exposure)
    worm[i] = parts.worm
    gears[i] = parts.gears
    drift[i] = parts.drift
    steps[i] = parts.steps
    seeing[i] = seeingSky[i] / skyPerAxis
    ra[i] = parts.worm + parts.gears + parts.drift + parts.steps + seeing[i]
  }
  strayRows.forEach((row, i) => (ra[row] += options.strayPoints[i].offsetSkyArcsec / skyPerAxis))

  const displacement = ra.map((axisArcsec) => recorded(options, axisArcsec, skyPerAxis))
  for (const row of missingRows) displacement[row] = NaN
  const columns: RunColumns = {
    timeSeconds: midSeconds.map((t) => t + stampShift - firstRowSeconds),
    displacement,
    declinationDisplacement: recordedDeclination(options, midSeconds),
    wormAngleDegrees: recordedWormAngle(options, midSeconds, period),
  }
  const harmonics = harmonicsAtFirstRow(options, midSeconds[0], period)
  return {
    columns,
    track: { timeSeconds: midSeconds.map((t) => t - firstRowSeconds), raArcsec: ra },
    truth: {
      options,
      wormPeriodSeconds: period,
      firstRowSeconds,
      harmonics,
      wormPeakToPeakArcsec: peakToPeak(harmonics),
      wormArcsec: worm,
      gearsArcsec: gears,
      driftArcsec: drift,
      stepsArcsec: steps,
      seeingArcsec: seeing,
      strayRows,
      missingRows,
      lostRowCount,
    },
  }
}

/** Mid-exposure times of the frames that were not lost. */
function frameTimes(options: SimulationOptions, exposure: number) {
  const { cadenceSeconds, cadenceJitterSeconds, durationSeconds, gaps, seed } = options
  const jitter = gaussianStream(seed, CHANCE.cadence)
  const frameCount = Math.floor(durationSeconds / cadenceSeconds + 1e-9) + 1
  const limit = 0.4 * cadenceSeconds
  const kept: number[] = []
  for (let i = 0; i < frameCount; i++) {
    const late = cadenceJitterSeconds > 0 ? Math.min(Math.max(jitter() * cadenceJitterSeconds, -limit), limit) : 0
    const mid = i * cadenceSeconds + late + exposure / 2
    if (!gaps.some((gap) => mid >= gap.startSeconds && mid <= gap.endSeconds)) kept.push(mid)
  }
  return { midSeconds: Float64Array.from(kept), lostRowCount: frameCount - kept.length }
}

function turnWander(options: SimulationOptions, period: number): TurnWander {
  const next = gaussianStream(options.seed, CHANCE.wander)
  const exposure = options.conversion.exposureSeconds ?? 0
  const nodeCount = Math.ceil((options.durationSeconds + options.cadenceSeconds + exposure) / period) + 2
  const cosArcsec = new Float64Array(nodeCount)
  const sinArcsec = new Float64Array(nodeCount)
  for (let i = 0; i < nodeCount; i++) {
    cosArcsec[i] = options.turnWanderArcsec * next()
    sinArcsec[i] = options.turnWanderArcsec * next()
  }
  return { cosArcsec, sinArcsec }
}

/** The recorded number of an error on the axis: frame, scale, sense, and whole quanta (half up). */
function recorded({ conversion, quantum }: SimulationOptions, axisArcsec: number, skyPerAxis: number): number {
  const { displacementUnit, frame, positiveMeans } = conversion
  const sense = positiveMeans === 'ahead' ? 1 : -1
  if (displacementUnit === 'ra-seconds') return inQuanta((sense * axisArcsec) / 15, quantum)
  const arcsec = sense * axisArcsec * (frame === 'sky' ? skyPerAxis : 1)
  return inQuanta(displacementUnit === 'px' ? arcsec / scaleOf(conversion) : arcsec, quantum)
}

function recordedDeclination(options: SimulationOptions, midSeconds: Float64Array): Float64Array | null {
  const { declination, conversion, quantum, seed } = options
  if (!declination) return null
  const seeing = seeingSeries(declination.seeing, midSeconds, seed, CHANCE.declination)
  const perArcsec = { px: 1 / scaleOf(conversion), arcsec: 1, 'ra-seconds': 1 / 15 }[conversion.displacementUnit]
  return seeing.map((arcsec, i) =>
    inQuanta((arcsec + declination.driftSkyArcsecPerSecond * midSeconds[i]) * perArcsec, quantum),
  )
}

function recordedWormAngle(options: SimulationOptions, midSeconds: Float64Array, period: number): Float64Array | null {
  const quantum = options.wormAngleQuantumDegrees
  if (quantum === null) return null
  return midSeconds.map((t) => {
    const angle = inQuanta(options.startWormAngleDegrees + (360 * t) / period, quantum)
    return angle - 360 * Math.floor(angle / 360)
  })
}

function scaleOf({ imageScaleArcsecPerPx }: SimulationOptions['conversion']): number {
  return imageScaleArcsecPerPx ?? 1
}

function inQuanta(value: number, quantum: number): number {
  return quantum > 0 ? Math.floor(value / quantum + 0.5) * quantum : value
}

/** Coefficients for θ counted from the first row: its phase is earlier by k times the worm's angle there. */
function harmonicsAtFirstRow(options: SimulationOptions, firstMidSeconds: number, period: number) {
  const angle = options.startWormAngleDegrees * RADIANS_PER_DEGREE + (2 * Math.PI * firstMidSeconds) / period
  return options.harmonics.map(({ order, amplitudeArcsec, phaseDegrees }): HarmonicCoefficients => {
    const phase = phaseDegrees * RADIANS_PER_DEGREE - order * angle
    return { order, cosArcsec: amplitudeArcsec * Math.cos(phase), sinArcsec: amplitudeArcsec * Math.sin(phase) }
  })
}

/** Largest minus smallest value over one turn, from 3600 angles: short of the truth by less than 1e-5 of it. */
function peakToPeak(harmonics: HarmonicCoefficients[]): number {
  let [smallest, largest] = [Infinity, -Infinity]
  for (let i = 0; i < 3600; i++) {
    const theta = (2 * Math.PI * i) / 3600
    let value = 0
    for (const h of harmonics)
      value += h.cosArcsec * Math.cos(h.order * theta) + h.sinArcsec * Math.sin(h.order * theta)
    smallest = Math.min(smallest, value)
    largest = Math.max(largest, value)
  }
  return largest - smallest
}

function nearestRow(midSeconds: Float64Array, atSeconds: number): number {
  let nearest = 0
  for (let i = 1; i < midSeconds.length; i++) {
    if (Math.abs(midSeconds[i] - atSeconds) < Math.abs(midSeconds[nearest] - atSeconds)) nearest = i
  }
  return nearest
}

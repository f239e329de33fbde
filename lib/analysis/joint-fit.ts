import { levenbergMarquardt } from 'ml-levenberg-marquardt'
import {
  centreTime,
  derivativeColumn,
  derivativeProjection,
  driftColumns,
  lineBlock,
  linearColumns,
  wormBlock,
} from './fit-columns'
import type { CentredTime, FitFrequencies, FitShape, FrequencyBlock } from './fit-columns'
import {
  dot,
  factorQr,
  multiplyQ,
  multiplyQTransposed,
  solveLeastSquares,
  solveUpper,
  solveUpperTransposed,
  solveWithFactors,
} from './least-squares'
import type { LeastSquaresSolution, QrFactors } from './least-squares'
import { drain } from './drain'
import type { Failure, Track } from './types'

export interface JointFitRequest {
  track: Track
  driftDegree: number
  worm: { orders: readonly number[]; frequencyHz: number; isFree: boolean } | null
  lines: readonly { frequencyHz: number; isFree: boolean }[]
  /** Highest frequency a line may run to; the lowest is half a cycle per span. */
  highestFrequencyHz: number
  /** Gauss–Newton to the last digit; needed for reported figures, not for choosing among models. */
  isPolished: boolean
}

/** Where the parameters of a fit stand: linear ones first, then the free frequencies in `freeBlocks` order. */
export interface JointFit {
  ok: true
  time: CentredTime
  shape: FitShape
  frequencies: FitFrequencies
  /** Coefficients of the linear columns (lib/analysis/fit-columns.ts), referred to t_ref. */
  coefficients: Float64Array
  isWormFree: boolean
  /** Which lines have their frequency free. */
  freeLines: boolean[]
  /** Full Jacobian of the model: linear columns, then (∂B/∂f)c of each free frequency (worm first), per hertz. */
  jacobian: Float64Array[]
  /** values − model. */
  residual: Float64Array
  rss: number
  parameterCount: number
  isConverged: boolean
  /** Lines that ran out of their box; they should be dropped. */
  escapedLines: number[]
}

/** One free frequency: its block of columns and the interval it may move in. */
interface Unknown {
  block: FrequencyBlock
  /** −1: the worm; else the index of the line. */
  line: number
  startHz: number
  lowestHz: number
  highestHz: number
}

interface Projection {
  linear: Float64Array[]
  solution: LeastSquaresSolution
}

const LARGEST_ITERATION_COUNT = 200
const LARGEST_POLISH_COUNT = 60
/** A step this small against the largest scaled coefficient changes nothing but last digits. */
const ROUNDING = 2 ** -50
/** Relative step of the frequencies below which the damped iteration hands over to the polish, or ends without one. */
const STEP_TOLERANCE = 1e-6
/** Fits that only choose among models compare sums of squares, so they may stop where that no longer falls. */
const RSS_TOLERANCE = 1e-6

/**
 * Joint fit of drift, worm harmonics and free lines, e = Σ c_j τ^j + Σ (a_k cos kθ + b_k sin kθ) + Σ (α_l cos + β_l sin).
 *
 * Variable projection: only frequencies are iterated on, with the Jacobian of the projected residual
 * J_m = −[P⊥ D_m c + Q R^{−T} D_mᵀ r]. Each damped step is solved on the problem compressed by QR to one row per free
 * frequency. A polished fit never stops on the sum of squares, which is flat to rounding long before the parameters are;
 * undamped Gauss–Newton on all parameters goes on while its largest scaled step shrinks.
 *
 * Yields between steps, so that a long fit can be given up.
 *
 * @returns the fit; `few-points` with fewer than p + 10 samples; `singular` where columns depend on each other
 * @see Golub & Pereyra (1973), SIAM J. Numer. Anal. 10, 413; (2003), Inverse Problems 19, R1; Marquardt (1963), J. SIAM 11, 431
 */
export function* fitJointlyInSteps(request: JointFitRequest): Generator<void, JointFit | Failure> {
  const { track, driftDegree, worm, lines } = request
  const shape: FitShape = { driftDegree, wormOrders: worm?.orders ?? [], lineCount: lines.length }
  const time = centreTime(track.timeSeconds)
  const isWormFree = worm !== null && worm.isFree && shape.wormOrders.length > 0
  const freeLines = lines.map((line) => line.isFree)
  const linearCount = driftDegree + 1 + 2 * shape.wormOrders.length + 2 * lines.length
  const parameterCount = linearCount + (isWormFree ? 1 : 0) + freeLines.filter(Boolean).length
  const sampleCount = track.timeSeconds.length
  if (sampleCount < parameterCount + 10) {
    return { ok: false, reason: 'few-points', needed: parameterCount + 10, got: sampleCount }
  }
  if (!(time.halfSpanSeconds > 0)) return { ok: false, reason: 'singular' }

  const drift = driftColumns(time, driftDegree)
  const unknowns = listUnknowns(request, shape, time)
  const frequenciesOf = (scaled: Float64Array): FitFrequencies => {
    let wormHz = worm?.frequencyHz ?? 0
    const linesHz = lines.map((line) => line.frequencyHz)
    unknowns.forEach(({ line, startHz }, m) => {
      if (line < 0) wormHz = startHz * scaled[m]
      else linesHz[line] = startHz * scaled[m]
    })
    return { wormHz, linesHz }
  }
  const project = (scaled: Float64Array): Projection | Failure => {
    const linear = linearColumns(time, drift, shape, frequenciesOf(scaled))
    const solution = solveLeastSquares(linear, track.raArcsec)
    return solution.ok ? { linear, solution } : solution
  }

  const start = project(new Float64Array(unknowns.length).fill(1))
  if ('ok' in start) return start
  const damped = yield* iterateDamped({ start, unknowns, time, project, isPolished: request.isPolished })
  let scaled = damped.scaled
  let current = damped.projection
  if (request.isPolished && unknowns.length > 0 && damped.escaped.length === 0) {
    scaled = yield* polish({
      scaled,
      current,
      unknowns,
      time,
      track,
      columnsAt: (q) => linearColumns(time, drift, shape, frequenciesOf(q)),
    })
    const polished = project(scaled)
    if ('ok' in polished) return polished
    current = polished
  }
  const derivatives = unknowns.map(({ block }) =>
    derivativeColumn(time, current.linear, current.solution.coefficients, block),
  )
  return {
    ok: true,
    time,
    shape,
    frequencies: frequenciesOf(scaled),
    coefficients: current.solution.coefficients,
    isWormFree,
    freeLines,
    jacobian: [...current.linear, ...derivatives],
    residual: current.solution.residual,
    rss: current.solution.rss,
    parameterCount,
    isConverged: damped.isConverged,
    escapedLines: damped.escaped,
  }
}

/** The same in one go. */
export function fitJointly(request: JointFitRequest): JointFit | Failure {
  return drain(fitJointlyInSteps(request))
}

function listUnknowns(request: JointFitRequest, shape: FitShape, time: CentredTime): Unknown[] {
  const span = 2 * time.halfSpanSeconds
  const boxAround = (startHz: number) => ({
    startHz,
    lowestHz: Math.max(0.5 / span, startHz - 1 / span),
    highestHz: Math.min(Math.max(request.highestFrequencyHz, startHz), startHz + 1 / span),
  })
  const unknowns: Unknown[] = []
  if (request.worm?.isFree && shape.wormOrders.length > 0) {
    unknowns.push({ block: wormBlock(shape), line: -1, ...boxAround(request.worm.frequencyHz) })
  }
  request.lines.forEach((line, index) => {
    if (line.isFree) unknowns.push({ block: lineBlock(shape, index), line: index, ...boxAround(line.frequencyHz) })
  })
  return unknowns
}

interface DampedOptions {
  start: Projection
  unknowns: readonly Unknown[]
  time: CentredTime
  project: (scaled: Float64Array) => Projection | Failure
  isPolished: boolean
}

interface DampedResult {
  scaled: Float64Array
  projection: Projection
  isConverged: boolean
  escaped: number[]
}

function* iterateDamped({ start, unknowns, time, project, isPolished }: DampedOptions): Generator<void, DampedResult> {
  let scaled = new Float64Array(unknowns.length).fill(1)
  let projection = start
  if (unknowns.length === 0) return { scaled, projection, isConverged: true, escaped: [] }
  let damping = 1e-3
  let compressed = compressStep(projection, unknowns, time)
  for (let iteration = 0; iteration < LARGEST_ITERATION_COUNT; iteration++) {
    if (compressed === null) return { scaled, projection, isConverged: false, escaped: [] }
    const step = dampedStep(compressed, damping)
    let next = scaled.map((q, m) => q + step[m])
    let escaped = outside(next, unknowns)
    for (let halving = 0; escaped.length > 0 && halving < 40; halving++) {
      for (let m = 0; m < step.length; m++) step[m] /= 2
      next = scaled.map((q, m) => q + step[m])
      escaped = outside(next, unknowns)
    }
    const largest = step.reduce((most, value) => Math.max(most, Math.abs(value)), 0)
    const atEdge = nearEdge(scaled, unknowns, time)
    const lines = atEdge.filter((line) => line >= 0)
    if (largest < STEP_TOLERANCE) {
      return { scaled, projection, isConverged: atEdge.length === 0, escaped: lines }
    }
    yield
    const candidate = project(next)
    if (!('ok' in candidate) && candidate.solution.rss <= projection.solution.rss) {
      const fall = projection.solution.rss - candidate.solution.rss
      scaled = next
      projection = candidate
      if (!isPolished && fall < RSS_TOLERANCE * candidate.solution.rss) {
        return { scaled, projection, isConverged: true, escaped: lines }
      }
      compressed = compressStep(projection, unknowns, time)
      damping = Math.max(damping / 10, 1e-12)
    } else {
      damping *= 10
      if (damping > 1e12) return { scaled, projection, isConverged: true, escaped: lines }
    }
  }
  return { scaled, projection, isConverged: false, escaped: [] }
}

function outside(scaled: Float64Array, unknowns: readonly Unknown[]): number[] {
  return unknowns.flatMap(({ startHz, lowestHz, highestHz, line }, m) => {
    const f = startHz * scaled[m]
    return f < lowestHz || f > highestHz ? [line] : []
  })
}

function nearEdge(scaled: Float64Array, unknowns: readonly Unknown[], time: CentredTime): number[] {
  const margin = 1e-3 / (2 * time.halfSpanSeconds)
  return unknowns.flatMap(({ startHz, lowestHz, highestHz, line }, m) => {
    const f = startHz * scaled[m]
    return f - lowestHz < margin || highestHz - f < margin ? [line] : []
  })
}

interface CompressedStep {
  /** Upper triangle by columns of the Jacobian with columns of norm 1, and Qᵀr. */
  r: Float64Array[]
  head: Float64Array
  scale: Float64Array
}

/** Golub–Pereyra Jacobian of the projected residual, and its QR: all that a step needs, in as many rows as unknowns. */
function compressStep(projection: Projection, unknowns: readonly Unknown[], time: CentredTime): CompressedStep | null {
  const { linear, solution } = projection
  const { qr, coefficients, residual } = solution
  const columns = unknowns.map(({ block, startHz }) => {
    const rotated = multiplyQTransposed(qr, derivativeColumn(time, linear, coefficients, block))
    rotated.set(solveUpperTransposed(qr, derivativeProjection(time, linear, residual, block)))
    const column = multiplyQ(qr, rotated)
    for (let i = 0; i < column.length; i++) column[i] *= -startHz
    return column
  })
  const factors = factorQr(columns)
  if (!factors.ok) return null
  return {
    r: factors.r,
    head: multiplyQTransposed(factors, residual).slice(0, unknowns.length),
    scale: factors.scale,
  }
}

/** Solves (JᵀJ + λ diag JᵀJ)Δ = −Jᵀr on the compressed rows; with columns of norm 1 the damping is λ on the diagonal. */
function dampedStep({ r, head, scale }: CompressedStep, damping: number): Float64Array {
  const count = head.length
  const rowOf = (row: number) => Array.from({ length: count }, (_, j) => (row <= j && row < count ? r[j][row] : 0))
  const rows = Array.from({ length: count + 1 }, (_, row) => rowOf(row))
  const { parameterValues } = levenbergMarquardt(
    { x: rows.map((_, row) => row), y: [...Array.from(head, (value) => -value), 0] },
    (z) => (row) => rows[row].reduce((sum, entry, j) => sum + entry * z[j], 0),
    {
      initialValues: new Array<number>(count).fill(0),
      jacobianFunction: () => (row) => rows[row],
      damping,
      maxIterations: 2,
      errorTolerance: 0,
      // A step up between the two would undo the damping that our own loop asked for.
      dampingStepUp: 1,
      dampingStepDown: 1,
    },
  )
  return Float64Array.from(parameterValues, (z, j) => z / scale[j])
}

interface PolishOptions {
  scaled: Float64Array
  current: Projection
  unknowns: readonly Unknown[]
  time: CentredTime
  track: Track
  columnsAt: (scaled: Float64Array) => Float64Array[]
}

/**
 * Undamped Gauss–Newton on the full parameter set, without a test on RSS, while the largest scaled step shrinks and is not
 * yet rounding. R is that of the first step; the gradient Jᵀr is always the current one, so that what is reached is the
 * minimum itself.
 *
 * @see Björck (1987), Linear Algebra Appl. 88/89, 31 for steps from R and Jᵀr
 */
function* polish(options: PolishOptions): Generator<void, Float64Array> {
  const { scaled, current, unknowns, time, track, columnsAt } = options
  let q = scaled
  let linear = current.linear
  let coefficients = current.solution.coefficients
  let residual = current.solution.residual
  let previous = Infinity
  let qr: QrFactors | null = null
  for (let count = 0; count < LARGEST_POLISH_COUNT; count++) {
    yield
    const derivatives = unknowns.map(({ block, startHz }) => {
      const column = derivativeColumn(time, linear, coefficients, block)
      for (let i = 0; i < column.length; i++) column[i] *= startHz
      return column
    })
    const columns = [...linear, ...derivatives]
    let step: Float64Array
    if (qr === null) {
      const factors = factorQr(columns)
      if (!factors.ok) return q
      qr = factors
      step = solveWithFactors(qr, residual).coefficients
    } else {
      const gradient = Float64Array.from(columns, (column) => dot(column, residual))
      step = solveUpper(qr, solveUpperTransposed(qr, gradient))
    }
    const { scale } = qr
    const size = step.reduce((most, value, j) => Math.max(most, Math.abs(value) * scale[j]), 0)
    if (!(size < previous)) return q
    const rounding = ROUNDING * coefficients.reduce((most, value, j) => Math.max(most, Math.abs(value) * scale[j]), 0)
    previous = size
    const next = q.map((value, m) => value + step[linear.length + m])
    if (outside(next, unknowns).length > 0) return q
    q = next
    coefficients = coefficients.map((value, j) => value + step[j])
    linear = columnsAt(q)
    residual = track.raArcsec.slice()
    for (let j = 0; j < linear.length; j++) {
      const column = linear[j]
      const coefficient = coefficients[j]
      for (let i = 0; i < residual.length; i++) residual[i] -= coefficient * column[i]
    }
    if (size <= rounding) return q
  }
  return q
}

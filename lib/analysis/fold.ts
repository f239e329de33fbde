import { failure } from './failure'
import { compressProblem, solveLeastSquares } from './least-squares'
import { medianCadence } from './sampling'
import { fraction, mean, sum } from './statistics'
import type { Failure, HarmonicCoefficients, TurnPrediction, TurnResult } from './types'

/** A track minus drift, steps and lines of no integer order, and how to fold it; never the raw track. */
export interface FoldInput {
  timeSeconds: Float64Array
  values: Float64Array
  periodSeconds: number
  /** Where phase is 0. */
  originSeconds: number
}

/** Phase frac((t − t₀)/P) in [0, 1) of every sample. */
export function foldPhases({ timeSeconds, periodSeconds, originSeconds }: Omit<FoldInput, 'values'>): Float64Array {
  return timeSeconds.map((t) => fraction((t - originSeconds) / periodSeconds))
}

/** Turn of every sample, 1, 2, … counted from the first sample. */
export function turnNumbers(timeSeconds: Float64Array, periodSeconds: number): Int32Array {
  return Int32Array.from(timeSeconds, (t) => Math.floor((t - timeSeconds[0]) / periodSeconds) + 1)
}

export interface PhaseBins {
  /** η² = 1 − SSW/SST. */
  share: number
  /** 1 − (SSW/(N − M))/(SST/(N − 1)); 1 minus it is Stellingwerf's phase-dispersion statistic. */
  adjustedShare: number
  /** Mean and its standard error per bin; null where a bin is empty. */
  means: (number | null)[]
  standardErrors: (number | null)[]
}

/** Bins per turn that keep eight samples in each: clip(⌊N_turn/8⌋, 12, 60). */
export function binCountFor(samplesPerTurn: number): number {
  return Math.min(60, Math.max(12, Math.floor(samplesPerTurn / 8)))
}

/**
 * Share of variance explained by phase.
 *
 * @returns `few-points` when the samples do not outnumber the bins, `singular` when all values are equal
 * @see Stellingwerf (1978), ApJ 224, 953
 */
export function explainByPhase(phases: Float64Array, values: Float64Array, binCount: number): PhaseBins | Failure {
  const counts = new Uint32Array(binCount)
  const sums = new Float64Array(binCount)
  const binOf = (phase: number) => Math.min(Math.floor(phase * binCount), binCount - 1)
  phases.forEach((phase, i) => {
    counts[binOf(phase)]++
    sums[binOf(phase)] += values[i]
  })
  const occupied = counts.reduce((total, count) => total + (count > 0 ? 1 : 0), 0)
  if (values.length <= occupied) return failure('few-points', { needed: occupied + 1, got: values.length })
  const centre = mean(values)
  const squares = new Float64Array(binCount)
  let total = 0
  phases.forEach((phase, i) => {
    const bin = binOf(phase)
    squares[bin] += (values[i] - sums[bin] / counts[bin]) ** 2
    total += (values[i] - centre) ** 2
  })
  if (!(total > 0)) return failure('singular')
  const within = squares.reduce((a, b) => a + b, 0)
  return {
    share: 1 - within / total,
    adjustedShare: 1 - within / (values.length - occupied) / (total / (values.length - 1)),
    means: Array.from(counts, (count, bin) => (count > 0 ? sums[bin] / count : null)),
    standardErrors: Array.from(counts, (count, bin) =>
      count > 1 ? Math.sqrt(squares[bin] / (count - 1) / count) : null,
    ),
  }
}

/** A constant, then cosine and sine of each order at worm angles in radians. */
function harmonicColumns(angles: Float64Array, orders: readonly number[]): Float64Array[] {
  return [
    new Float64Array(angles.length).fill(1),
    ...orders.flatMap((order) => [
      angles.map((angle) => Math.cos(order * angle)),
      angles.map((angle) => Math.sin(order * angle)),
    ]),
  ]
}

/** Coefficients of those columns as harmonics. */
function harmonicsOf(coefficients: Float64Array, orders: readonly number[]): HarmonicCoefficients[] {
  return orders.map((order, i) => ({
    order,
    cosArcsec: coefficients[1 + 2 * i],
    sinArcsec: coefficients[2 + 2 * i],
  }))
}

/** What is foretold at a worm angle (radians from the origin) by harmonics fitted to other turns. */
export type Predictor = (harmonics: readonly HarmonicCoefficients[]) => (angleRadians: number) => number

export interface LeftOutTurns {
  ok: true
  predictions: TurnPrediction[]
  /** Q² = 1 − Σ(z − ẑ)²/Σ(z − z̄)² over the left-out turns. */
  predictiveShare: number
  /** 1 − √(1 − Q²): 1 minus rms after over rms before. */
  heldOutReduction: number
}

/** Turns with more than half of their samples take part. */
const SMALLEST_COVERAGE = 0.5

interface Turn {
  turnNumber: number
  angles: Float64Array
  values: Float64Array
}

function coveredTurns(input: FoldInput): Turn[] {
  const { timeSeconds, values, periodSeconds } = input
  if (timeSeconds.length < 2) return []
  const phases = foldPhases(input)
  const numbers = turnNumbers(timeSeconds, periodSeconds)
  const fewest = (SMALLEST_COVERAGE * periodSeconds) / medianCadence(timeSeconds)
  const turns: Turn[] = []
  for (let start = 0; start < numbers.length;) {
    let end = start
    while (end < numbers.length && numbers[end] === numbers[start]) end++
    if (end - start > fewest) {
      turns.push({
        turnNumber: numbers[start],
        angles: phases.slice(start, end).map((phase) => 2 * Math.PI * phase),
        values: values.slice(start, end),
      })
    }
    start = end
  }
  return turns
}

/** Columns of a linear problem, the last one standing for the values; any rows that give the same answers will do. */
type Problem = readonly Float64Array[]

/** One above the other, in as few rows as there are columns where that can be had. */
function stack(upper: Problem | null, lower: Problem): Problem {
  if (upper === null) return lower
  const both = upper.map((column, j) => {
    const joined = new Float64Array(column.length + lower[j].length)
    joined.set(column)
    joined.set(lower[j], column.length)
    return joined
  })
  const compressed = compressProblem(both.slice(0, -1), both[both.length - 1])
  return Array.isArray(compressed) ? compressed : both
}

interface PreparedTurns {
  turns: Turn[]
  /** Constant, cosine and sine of each order, values: per turn. */
  problems: Problem[]
  /** All turns but the one of this index. */
  others: Problem[]
}

/** Every turn as a small problem, and for each the other turns together, from turns before and turns after. */
function prepareTurns(turns: Turn[], orders: readonly number[]): PreparedTurns {
  const problems = turns.map(({ angles, values }): Problem => {
    const columns = harmonicColumns(angles, orders)
    const compressed = compressProblem(columns, values)
    return Array.isArray(compressed) ? compressed : [...columns, values]
  })
  const before: (Problem | null)[] = [null]
  for (const problem of problems.slice(0, -1)) before.push(stack(before[before.length - 1], problem))
  let after: Problem | null = null
  const others: Problem[] = []
  for (let i = problems.length - 1; i >= 0; i--) {
    const earlier = before[i]
    if (after === null) others[i] = earlier ?? problems[i]
    else others[i] = stack(earlier, after)
    after = stack(after, problems[i])
  }
  return { turns, problems, others }
}

/** Columns of some of the orders that a problem was made for. */
function chooseOrders(problem: Problem, all: readonly number[], chosen: readonly number[]): Float64Array[] {
  const columns = [problem[0]]
  all.forEach((order, k) => {
    if (chosen.includes(order)) columns.push(problem[1 + 2 * k], problem[2 + 2 * k])
  })
  return columns
}

/**
 * Each turn foretold by the harmonics of the others: how well a table from the other turns would have corrected this
 * one. The drift comes from all turns, so that it is slightly optimistic.
 *
 * @param predictor what is made of the harmonics; the curve itself when not given, a played table in a rehearsal
 * @returns `short-run` with fewer than three covered turns, else as least squares
 * @see Stone (1974), J. R. Stat. Soc. B 36, 111
 */
export function leaveOneTurnOut(
  input: FoldInput,
  orders: readonly number[],
  predictor: Predictor | null = null,
): LeftOutTurns | Failure {
  const turns = coveredTurns(input)
  if (turns.length < 3) return failure('short-run', { needed: 3, got: turns.length })
  return predictLeftOut(prepareTurns(turns, orders), { all: orders, chosen: orders, predictor })
}

function predictLeftOut(
  { turns, problems, others }: PreparedTurns,
  { all, chosen, predictor }: { all: readonly number[]; chosen: readonly number[]; predictor: Predictor | null },
): LeftOutTurns | Failure {
  const count = turns.reduce((total, turn) => total + turn.values.length, 0)
  const centre = turns.reduce((total, turn) => total + sum(turn.values), 0) / count
  let before = 0
  let left = 0
  const predictions: TurnPrediction[] = []
  for (const [i, turn] of turns.entries()) {
    const other = others[i]
    const fit = solveLeastSquares(chooseOrders(other, all, chosen), other[other.length - 1])
    if (!fit.ok) return fit
    const turnBefore = turn.values.reduce((total, value) => total + (value - centre) ** 2, 0)
    const turnLeft =
      predictor === null
        ? squaresLeft(problems[i], chooseOrders(problems[i], all, chosen), fit.coefficients)
        : squaresLeftByPredictor(turn, fit.coefficients[0], predictor(harmonicsOf(fit.coefficients, chosen)))
    predictions.push({
      turnNumber: turn.turnNumber,
      rmsBeforeArcsec: Math.sqrt(turnBefore / turn.values.length),
      rmsLeftArcsec: Math.sqrt(turnLeft / turn.values.length),
    })
    before += turnBefore
    left += turnLeft
  }
  if (!(before > 0)) return failure('singular')
  const shareLeft = left / before
  return { ok: true, predictions, predictiveShare: 1 - shareLeft, heldOutReduction: 1 - Math.sqrt(shareLeft) }
}

/** Σ(z − ẑ)² on a compressed problem: rotating the rows changes no norm. */
function squaresLeft(problem: Problem, columns: readonly Float64Array[], coefficients: Float64Array): number {
  const left = problem[problem.length - 1].slice()
  columns.forEach((column, j) => {
    for (let i = 0; i < left.length; i++) left[i] -= coefficients[j] * column[i]
  })
  return left.reduce((total, value) => total + value * value, 0)
}

function squaresLeftByPredictor(
  { angles, values }: Turn,
  constant: number,
  predict: (angle: number) => number,
): number {
  return values.reduce((total, value, i) => total + (value - constant - predict(angles[i])) ** 2, 0)
}

/**
 * Orders without which the left-out turns are foretold worse; all of them when fewer than three turns can be left out.
 */
export function ordersUsefulOnLeftOutTurns(input: FoldInput, orders: readonly number[]): number[] {
  const turns = coveredTurns(input)
  if (turns.length < 3) return [...orders]
  const prepared = prepareTurns(turns, orders)
  const whole = predictLeftOut(prepared, { all: orders, chosen: orders, predictor: null })
  if (!whole.ok) return [...orders]
  return orders.filter((order) => {
    const chosen = orders.filter((other) => other !== order)
    const without = predictLeftOut(prepared, { all: orders, chosen, predictor: null })
    return without.ok && without.predictiveShare < whole.predictiveShare
  })
}

/**
 * Scatter of one order from turn to turn, √(Σ|Z − Z̄|²/(m − 1))/|Z̄| with Z = a − ib fitted to each covered turn; null
 * with fewer than two turns or where a turn cannot be fitted.
 */
export function turnScatter(input: FoldInput, orders: readonly number[], order = 1): number | null {
  const turns = coveredTurns(input)
  const at = orders.indexOf(order)
  if (turns.length < 2 || at < 0) return null
  const vectors: HarmonicCoefficients[] = []
  for (const turn of turns) {
    const fit = solveLeastSquares(harmonicColumns(turn.angles, orders), turn.values)
    if (!fit.ok) return null
    vectors.push(harmonicsOf(fit.coefficients, orders)[at])
  }
  const meanCos = mean(vectors.map(({ cosArcsec }) => cosArcsec))
  const meanSin = mean(vectors.map(({ sinArcsec }) => sinArcsec))
  const size = Math.hypot(meanCos, meanSin)
  if (size === 0) return null
  const squares = vectors.map((z) => (z.cosArcsec - meanCos) ** 2 + (z.sinArcsec - meanSin) ** 2)
  return Math.sqrt(squares.reduce((a, b) => a + b, 0) / (vectors.length - 1)) / size
}

/**
 * The turn's figures from a track minus drift and lines.
 *
 * @returns `short-run` under one complete turn, else as explainByPhase
 */
export function foldTurns(input: FoldInput, orders: readonly number[]): TurnResult | Failure {
  const { timeSeconds, values, periodSeconds } = input
  const turns = (timeSeconds[timeSeconds.length - 1] - timeSeconds[0]) / periodSeconds
  if (!(turns >= 1)) return failure('short-run', { needed: 1, got: Math.floor(turns) })
  const explained = explainByPhase(foldPhases(input), values, binCountFor(values.length / turns))
  if ('ok' in explained) return explained
  const repeatability = Math.min(1, Math.max(0, explained.adjustedShare))
  const leftOut = leaveOneTurnOut(input, orders)
  return {
    completeTurns: Math.floor(turns + 1e-9),
    repeatability,
    rmsShareLeft: Math.sqrt(1 - repeatability),
    predictions: leftOut.ok ? leftOut.predictions : [],
    predictiveShare: leftOut.ok ? leftOut.predictiveShare : null,
    heldOutReduction: leftOut.ok ? leftOut.heldOutReduction : null,
    scatter: turnScatter(input, orders),
  }
}

export interface TurnCurve {
  turnNumber: number
  angleDegrees: Float64Array
  arcsec: Float64Array
}

/**
 * Every turn's own samples over worm angle for the picture, averaged to at most `largestCount` points a turn and never
 * re-centred. A turn here is one passage of phase 0 → 1, so that its curve runs from 0° to 360°.
 */
export function turnCurves(input: FoldInput, largestCount = 240): TurnCurve[] {
  const { timeSeconds, values, periodSeconds, originSeconds } = input
  const phases = foldPhases(input)
  const passageOf = (t: number) => Math.floor((t - originSeconds) / periodSeconds)
  const curves: TurnCurve[] = []
  for (let start = 0; start < timeSeconds.length;) {
    const passage = passageOf(timeSeconds[start])
    let end = start
    while (end < timeSeconds.length && passageOf(timeSeconds[end]) === passage) end++
    const group = Math.max(1, Math.ceil((end - start) / largestCount))
    const pointCount = Math.ceil((end - start) / group)
    const curve = {
      turnNumber: curves.length + 1,
      angleDegrees: new Float64Array(pointCount),
      arcsec: new Float64Array(pointCount),
    }
    for (let i = 0; i < pointCount; i++) {
      const [from, to] = [start + i * group, Math.min(start + (i + 1) * group, end)]
      curve.angleDegrees[i] = 360 * mean(phases.subarray(from, to))
      curve.arcsec[i] = mean(values.subarray(from, to))
    }
    curves.push(curve)
    start = end
  }
  return curves
}

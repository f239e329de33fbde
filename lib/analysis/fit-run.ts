import { amplitudeError, estimateErrorsInSteps, listOscillations } from './fit-covariance'
import type { FitErrors } from './fit-covariance'
import { orderOf } from './describe-fit'
import { matchOrder } from './gear-train'
import { fitJointlyInSteps } from './joint-fit'
import type { JointFit, JointFitRequest } from './joint-fit'
import { chooseModelInSteps, firstOrders } from './model-choice'
import type { ChosenModel } from './model-choice'
import { prewhiten } from './prewhiten'
import type { FoundLine } from './prewhiten'
import { highestDriftDegree, periodInterval, runLengthRule } from './sampling'
import type {
  AnalysisWarning,
  Estimate,
  Failure,
  ModelChoice,
  PredictedOrder,
  Progress,
  Reason,
  Recipe,
  Track,
} from './types'
import { warning } from './warnings'
import { findStrongestPeriod, findSubharmonic } from './worm-start'

export interface FitRunContext {
  track: Track
  cadenceSeconds: number
  highestFrequencyHz: number
  gearPeriodSeconds: number | null
}

/** What the worm's period starts from, or why there is none. */
export interface WormStart {
  frequencyHz: number | null
  isFree: boolean
  source: 'fitted' | 'gear' | 'typed'
  /** The period where it is held, null where it is free or there is none. */
  heldPeriodSeconds: number | null
  reason: Reason | null
  intervalSeconds: [number, number] | null
  warnings: AnalysisWarning[]
}

export interface WormModel {
  start: WormStart
  driftDegree: number
  orders: number[]
  wormHz: number | null
  choice: ModelChoice | null
}

export interface FittedRun {
  ok: true
  fit: JointFit
  errors: FitErrors
  found: FoundLine[]
  model: WormModel
  fittedPeriodSeconds: Estimate | null
  warnings: AnalysisWarning[]
}

const LARGEST_HARMONIC_COUNT = 12
/** A worm that turns half as fast as the strongest swing is looked for when it makes three turns itself. */
const TURNS_TO_HALVE = 6
const LARGEST_ORDER = 64
const LARGEST_LOCK_TOLERANCE = 0.2

/** The stage's progress, so that a caller can hand it on. */
const report = (stage: Progress['stage'], fraction: number): Progress => ({ stage, fraction })

/** Hands a part's steps on as progress of one stage. */
export function* during<Result>(progress: Progress, steps: Generator<unknown, Result>): Generator<Progress, Result> {
  for (;;) {
    const step = steps.next()
    if (step.done) return step.value
    yield progress
  }
}

/**
 * Where the worm's period comes from. Under one turn there is no worm figure; under three the period must be given (by
 * gear or hand), else only the interval that the record allows; from three it may be free.
 */
export function findWormStart(context: FitRunContext, recipe: Recipe): WormStart {
  const { track, gearPeriodSeconds } = context
  const span = track.timeSeconds[track.timeSeconds.length - 1] - track.timeSeconds[0]
  const warnings: AnalysisWarning[] = []
  const none = (reason: Reason, intervalSeconds: [number, number] | null = null): WormStart => ({
    frequencyHz: null,
    isFree: false,
    source: recipe.wormPeriod,
    heldPeriodSeconds: null,
    reason,
    intervalSeconds,
    warnings,
  })
  const held = (periodSeconds: number, source: 'gear' | 'typed'): WormStart => {
    const turns = span / periodSeconds
    if (turns < 1) {
      warnings.push(warning('short-run', { turns, neededTurns: 1 }))
      return none('short-run')
    }
    if (1 / periodSeconds > context.highestFrequencyHz) return none('out-of-range')
    const start = { frequencyHz: 1 / periodSeconds, isFree: false, source, heldPeriodSeconds: periodSeconds }
    return { ...start, reason: null, intervalSeconds: null, warnings }
  }
  if (recipe.wormPeriod === 'typed') {
    const typed = recipe.typedPeriodSeconds
    if (typed === null) return none('no-period')
    return typed > 0 && Number.isFinite(typed) ? held(typed, 'typed') : none('out-of-range')
  }
  if (recipe.wormPeriod === 'gear') {
    if (gearPeriodSeconds !== null) return held(gearPeriodSeconds, 'gear')
    warnings.push(warning('gear-unknown'))
    return none('no-period')
  }
  if (gearPeriodSeconds !== null) return freeNearGear(context, gearPeriodSeconds, span, held, warnings)

  // Nothing is known: the strongest swing under any drift, else under a straight one for a short record.
  const degree = recipe.driftDegree === 'auto' ? 3 : recipe.driftDegree
  const search = { ...context, driftDegree: degree }
  let found = findStrongestPeriod(search)
  if (found.ok && found.frequencyHz * span < 3 && degree > 1) {
    const straight = findStrongestPeriod({ ...search, driftDegree: 1 })
    if (straight.ok) found = straight
  }
  if (!found.ok) return none(found.reason === 'singular' ? 'no-period' : found.reason)
  const turns = found.frequencyHz * span
  if (runLengthRule(turns) !== 'period-free') {
    const interval = periodInterval(1 / found.frequencyHz, span)
    warnings.push(warning('short-run', { turns, neededTurns: 3 }))
    return none('short-run', Array.isArray(interval) ? interval : null)
  }
  const driftDegree = recipe.driftDegree === 'auto' ? Math.min(1, highestDriftDegree(turns)) : recipe.driftDegree
  const factor = findSubharmonic({ ...context, driftDegree, frequencyHz: found.frequencyHz })
  const frequencyHz = found.frequencyHz / factor
  if (factor > 1) warnings.push(warning('sub-harmonic-taken', { factor, periodSeconds: 1 / frequencyHz }))
  else if (turns < TURNS_TO_HALVE) {
    warnings.push(warning('period-may-be-harmonic', { turns, neededTurns: TURNS_TO_HALVE }))
  }
  return {
    frequencyHz,
    isFree: true,
    source: 'fitted',
    heldPeriodSeconds: null,
    reason: null,
    intervalSeconds: null,
    warnings,
  }
}

/** A free period with a gear known: the peak within one resolution element of it, never a stronger line elsewhere. */
function freeNearGear(
  context: FitRunContext,
  gearPeriodSeconds: number,
  span: number,
  held: (periodSeconds: number, source: 'gear') => WormStart,
  warnings: AnalysisWarning[],
): WormStart {
  const gearHz = 1 / gearPeriodSeconds
  const turns = span * gearHz
  if (turns < 3) {
    if (turns >= 1) warnings.push(warning('short-run', { turns, neededTurns: 3 }))
    return held(gearPeriodSeconds, 'gear')
  }
  const withinHz: [number, number] = [gearHz - 0.7 / span, gearHz + 0.7 / span]
  const near = findStrongestPeriod({ ...context, driftDegree: 1, withinHz })
  const frequencyHz = near.ok ? near.frequencyHz : gearHz
  return {
    frequencyHz,
    isFree: true,
    source: 'fitted',
    heldPeriodSeconds: null,
    reason: null,
    intervalSeconds: null,
    warnings,
  }
}

/** Drift degree and harmonics for the start; without a worm the drift alone. */
export function* chooseWormModel(
  context: FitRunContext,
  recipe: Recipe,
  start: WormStart,
): Generator<Progress, (WormModel & { ok: true; warnings: AnalysisWarning[] }) | Failure> {
  const { track, cadenceSeconds, highestFrequencyHz } = context
  const { frequencyHz } = start
  if (frequencyHz === null) {
    const driftDegree = recipe.driftDegree === 'auto' ? 1 : recipe.driftDegree
    return { ok: true, start, driftDegree, orders: [], wormHz: null, choice: null, warnings: [] }
  }
  const sampleCount = track.timeSeconds.length
  const span = track.timeSeconds[sampleCount - 1] - track.timeSeconds[0]
  const turns = span * frequencyHz
  const topDegree = highestDriftDegree(turns)
  const degrees = recipe.driftDegree === 'auto' ? [0, 1, 2, 3].filter((d) => d <= topDegree) : [recipe.driftDegree]
  const perTurn = Math.floor(sampleCount / turns / 4)
  const allowed = Math.max(1, Math.min(perTurn, Math.floor(highestFrequencyHz / frequencyHz), LARGEST_HARMONIC_COUNT))
  const wanted = recipe.harmonicCount
  const chosen: ChosenModel | Failure = yield* during(
    report('fitting', 0.2),
    chooseModelInSteps({
      track,
      cadenceSeconds,
      worm: { frequencyHz, isFree: start.isFree },
      lines: [],
      highestFrequencyHz,
      degrees,
      largestHarmonicCount: allowed,
      fixedHarmonicCount: wanted === 'auto' ? null : Math.min(wanted, allowed),
    }),
  )
  if (!chosen.ok) return chosen
  const warnings =
    wanted !== 'auto' && chosen.harmonicCount < wanted
      ? [warning('harmonics-dropped', { wanted, kept: chosen.harmonicCount })]
      : []
  return {
    ok: true,
    start,
    driftDegree: chosen.driftDegree,
    orders: firstOrders(chosen.harmonicCount),
    wormHz: chosen.wormHz,
    choice: chosen.choice,
    warnings,
  }
}

/** Lines beside the worm's harmonics. */
export function* findLines(
  context: FitRunContext,
  recipe: Recipe,
  model: WormModel,
): Generator<Progress, { ok: true; found: FoundLine[]; warnings: AnalysisWarning[] } | Failure> {
  if (!recipe.isLineSearchOn) return { ok: true, found: [], warnings: [] }
  const result = yield* during(
    report('lines', 0.45),
    prewhiten({
      ...context,
      driftDegree: model.driftDegree,
      worm: wormOf(model, model.orders),
      chanceLevel: recipe.chanceLevel,
    }),
  )
  if (!result.ok) return result
  const warnings = result.stoppedBy === 'line-limit' ? [warning('line-limit', { count: result.lines.length })] : []
  if (model.wormHz !== null && result.unresolvedHz !== null) {
    warnings.push(warning('swing-beside-worm', { periodSeconds: 1 / result.unresolvedHz }))
  }
  return { ok: true, found: result.lines, warnings }
}

/**
 * The reported fit: everything together, to the last digit, with its errors; and the free period beside a held one.
 * Lines that turn out to be locked to the worm (an integer order within 3 standard errors) join its harmonics.
 */
export function* fitFinally(
  context: FitRunContext,
  model: WormModel,
  lines: readonly FoundLine[],
  predicted: readonly PredictedOrder[],
): Generator<Progress, FittedRun | Failure> {
  const { gearPeriodSeconds } = context
  const warnings: AnalysisWarning[] = []
  let orders = model.orders
  let found = [...lines]
  let reached = yield* fitWithErrors(context, requestFor(context, model, orders, found), 0.6)
  if (reached.ok && reached.fit.escapedLines.length > 0) {
    const escaped = new Set(reached.fit.escapedLines)
    found = found.filter((_, index) => !escaped.has(index))
    reached = yield* fitWithErrors(context, requestFor(context, model, orders, found), 0.65)
  }
  if (!reached.ok) return reached
  for (let weak = weakestDoubtfulLine(reached); weak !== null; weak = weakestDoubtfulLine(reached)) {
    found = found.toSpliced(weak, 1)
    reached = yield* fitWithErrors(context, requestFor(context, model, orders, found), 0.68)
    if (!reached.ok) return reached
  }
  const locked = lockedLines(reached.fit, reached.errors, predicted)
  if (locked.size > 0) {
    orders = [...orders, ...locked.values()].sort((a, b) => a - b)
    found = found.filter((_, index) => !locked.has(index))
    reached = yield* fitWithErrors(context, requestFor(context, model, orders, found), 0.7)
    if (!reached.ok) return reached
  }
  const { fit, errors } = reached
  if (!fit.isConverged) warnings.push(warning('not-converged'))
  const span = 2 * fit.time.halfSpanSeconds

  let fittedPeriodSeconds: Estimate | null = null
  const hasThreeTurns = model.wormHz !== null && span * model.wormHz >= 3
  if (fit.isWormFree) {
    fittedPeriodSeconds = periodOf(fit, errors)
  } else if (hasThreeTurns) {
    const request = requestFor(context, model, orders, found)
    const free = yield* fitWithErrors(
      context,
      { ...request, worm: request.worm && { ...request.worm, isFree: true } },
      0.8,
    )
    if (free.ok && free.fit.isConverged) {
      const asRun: FittedRun = { ...free, found, model, fittedPeriodSeconds: null, warnings }
      if (withoutFreePeriod(asRun, context) === null) fittedPeriodSeconds = periodOf(free.fit, free.errors)
    }
  }
  if (gearPeriodSeconds !== null && fittedPeriodSeconds?.stderr) {
    const standardErrors = Math.abs(fittedPeriodSeconds.value - gearPeriodSeconds) / fittedPeriodSeconds.stderr
    if (standardErrors > 3) {
      const details = { fittedSeconds: fittedPeriodSeconds.value, gearSeconds: gearPeriodSeconds, standardErrors }
      warnings.push(warning('period-differs-from-gear', details))
    }
  }
  return {
    ok: true,
    fit,
    errors,
    found,
    model: { ...model, orders },
    fittedPeriodSeconds: fit.isWormFree ? null : fittedPeriodSeconds,
    warnings,
  }
}

function* fitWithErrors(
  { track, cadenceSeconds }: FitRunContext,
  request: JointFitRequest,
  fraction: number,
): Generator<Progress, { ok: true; fit: JointFit; errors: FitErrors } | Failure> {
  const fit = yield* during(report('fitting', fraction), fitJointlyInSteps({ ...request, isPolished: true }))
  if (!fit.ok) return fit
  yield report('fitting', fraction + 0.04)
  const errors = yield* during(
    report('fitting', fraction + 0.04),
    estimateErrorsInSteps(fit, track.timeSeconds, cadenceSeconds),
  )
  return errors.ok ? { ok: true, fit, errors } : errors
}

/**
 * The line furthest below 3 standard errors of the joint fit, or one slower than the record; null where there is none. A
 * line that was found while another was still missing from the model may be nothing, or drift, once both are in it.
 */
function weakestDoubtfulLine({ fit, errors }: { fit: JointFit; errors: FitErrors }): number | null {
  let weakest: { index: number; ratio: number } | null = null
  const lowestHz = 0.5 / fit.time.halfSpanSeconds
  for (const [index, { column, frequencyHz }] of listOscillations(fit).slice(fit.shape.wormOrders.length).entries()) {
    const [a, b] = [fit.coefficients[column], fit.coefficients[column + 1]]
    const ratio = frequencyHz < lowestHz ? 0 : Math.hypot(a, b) / amplitudeError(a, b, errors.reported, column)
    if (ratio < Math.min(LEAST_LINE_ERRORS, weakest?.ratio ?? Infinity)) weakest = { index, ratio }
  }
  return weakest?.index ?? null
}

/** Index of each line that stands at an integer order no part of another order explains, and that order. */
function lockedLines(fit: JointFit, errors: FitErrors, predicted: readonly PredictedOrder[]): Map<number, number> {
  const locked = new Map<number, number>()
  const { wormOrders, lineCount } = fit.shape
  if (wormOrders.length === 0) return locked
  const turns = 2 * fit.time.halfSpanSeconds * fit.frequencies.wormHz
  const taken = new Set(wormOrders)
  for (let index = 0; index < lineCount; index++) {
    const order = orderOf(fit, errors, listOscillations(fit)[wormOrders.length + index])
    if (order === null) continue
    const nearest = Math.round(order.value)
    const tolerance = 3 * (order.stderr ?? 0)
    // An order that is known to a fifth at best would be near an integer by chance.
    const isNear = tolerance <= LARGEST_LOCK_TOLERANCE && Math.abs(order.value - nearest) <= tolerance
    if (!isNear || nearest < 1 || nearest > LARGEST_ORDER || taken.has(nearest)) continue
    const part = matchOrder(order, predicted, 1 / turns)
    if (part !== null && !Number.isInteger(part.order)) continue
    taken.add(nearest)
    locked.set(index, nearest)
  }
  return locked
}

/** Amplitude in standard errors below which a phase means nothing, and a line in the final fit neither. */
const LEAST_LINE_ERRORS = 3

/** Amplitude in standard errors that one harmonic at least must have for the period to be the record's own. */
const STANDING_ERRORS = 5

/**
 * How to go on where the period is free but no harmonic reaches 5 standard errors: the gear's period held, or without a
 * gear no worm figure at all. Null where the free period stands.
 */
export function withoutFreePeriod({ fit, errors, model }: FittedRun, context: FitRunContext): WormStart | null {
  if (!fit.isWormFree) return null
  const stands = listOscillations(fit)
    .slice(0, fit.shape.wormOrders.length)
    .some(({ column }) => {
      const [a, b] = [fit.coefficients[column], fit.coefficients[column + 1]]
      return Math.hypot(a, b) >= STANDING_ERRORS * amplitudeError(a, b, errors.reported, column)
    })
  if (stands) return null
  const { gearPeriodSeconds } = context
  if (gearPeriodSeconds === null) {
    return { ...model.start, frequencyHz: null, isFree: false, reason: 'no-period' }
  }
  return {
    ...model.start,
    frequencyHz: 1 / gearPeriodSeconds,
    isFree: false,
    source: 'gear',
    heldPeriodSeconds: gearPeriodSeconds,
  }
}

function periodOf(fit: JointFit, errors: FitErrors): Estimate {
  const parameter = fit.coefficients.length
  const period = 1 / fit.frequencies.wormHz
  return { value: period, stderr: Math.sqrt(errors.reported[parameter][parameter]) * period ** 2 }
}

function wormOf(model: WormModel, orders: readonly number[]) {
  return model.wormHz === null ? null : { orders, frequencyHz: model.wormHz, isFree: model.start.isFree }
}

function requestFor(context: FitRunContext, model: WormModel, orders: readonly number[], lines: readonly FoundLine[]) {
  return {
    track: context.track,
    driftDegree: model.driftDegree,
    worm: wormOf(model, orders),
    lines: lines.map(({ frequencyHz }) => ({ frequencyHz, isFree: true })),
    highestFrequencyHz: context.highestFrequencyHz,
    isPolished: false,
  }
}

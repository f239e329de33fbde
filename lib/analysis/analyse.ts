import { cleanTrack, STRAY_WARNING_SHARE } from './clean'
import type { CleanedTrack } from './clean'
import { ENGINE_VERSION } from './constants'
import { DECLINATION_WARNING_DEGREES, scaleUncertaintyPercent, toTrack } from './convert'
import type { ConvertedRun } from './convert'
import { makeTable } from './analyse-table'
import { buildViews, residualChance } from './analyse-views'
import { describeDrift, describeLines, describeWorm } from './describe-fit'
import { drain } from './drain'
import { chooseWormModel, during, findLines, findWormStart, fitFinally, withoutFreePeriod } from './fit-run'
import type { FitRunContext, FittedRun, WormModel, WormStart } from './fit-run'
import { foldTurns, ordersUsefulOnLeftOutTurns } from './fold'
import type { FoldInput } from './fold'
import { predictedOrders, wormPeriod } from './gear-train'
import { solveLeastSquares } from './least-squares'
import { splitModel } from './model-parts'
import type { ModelParts } from './model-parts'
import { rateDemand } from './rate-demand'
import { remember } from './remember'
import { aliasFrequency, exposureAttenuation, highestFrequency } from './sampling'
import { differenceNoise, LOWER_BOUND_CORRELATION, secondDifferenceShareOfAr1 } from './seeing-floor'
import { spanSplit } from './spans'
import { rootMeanSquare, span } from './statistics'
import type {
  AnalysisOutcome,
  AnalysisResult,
  AnalysisViews,
  AnalysisWarning,
  Failure,
  PredictedOrder,
  Progress,
  Recipe,
  ResidualResult,
  RunColumns,
  TurnResult,
} from './types'
import { warning } from './warnings'

/** One run made ready to be analysed again and again; stages whose settings have not changed are not computed anew. */
export interface Analyser {
  run(recipe: Recipe): Generator<Progress, AnalysisOutcome>
}

interface Prepared {
  ok: true
  converted: ConvertedRun
  cleaned: CleanedTrack
}

interface Started {
  context: FitRunContext
  start: WormStart
}

interface Modelled {
  ok: true
  context: FitRunContext
  model: WormModel
  warnings: AnalysisWarning[]
}

interface Fitted {
  ok: true
  fitted: FittedRun
  predicted: PredictedOrder[]
  parts: ModelParts
  warnings: AnalysisWarning[]
}

interface Folded {
  turn: TurnResult | null
  foldInput: FoldInput | null
  usefulOrders: number[]
}

/**
 * The whole analysis: units → cleaning → start of the worm period → drift degree and harmonics → further lines → final
 * joint fit with errors → fold, spans, rates, correction table, pictures. Deterministic: equal columns and recipes give
 * equal results to the last bit within one engine.
 *
 * Yields progress every few milliseconds of work; the caller decides how often to pause.
 */
export function* analyse(columns: RunColumns, recipe: Recipe): Generator<Progress, AnalysisOutcome> {
  return yield* createAnalyser(columns).run(recipe)
}

/** The same in one go, for callers that need not pause. */
export function analyseAtOnce(columns: RunColumns, recipe: Recipe): AnalysisOutcome {
  return drain(analyse(columns, recipe))
}

export function createAnalyser(columns: RunColumns): Analyser {
  const prepare = remember<Progress, Prepared | Failure>()
  const begin = remember<Progress, Started>()
  const choose = remember<Progress, Modelled | Failure>()
  const fit = remember<Progress, Fitted | Failure>()
  const fold = remember<Progress, Folded>()
  const views = remember<Progress, AnalysisViews>()

  return {
    *run(recipe) {
      const { conversion, driveTrain } = recipe
      // What does not change the numbers (uncertainties, how the sense is known) must not start everything anew.
      const units = { ...conversion, imageScaleUncertaintyPercent: 0, declinationUncertaintyDegrees: 0, senseBasis: '' }
      const prepareKey = JSON.stringify([units, recipe.excludedSpans, recipe.isStrayPointFilterOn])
      const prepared = yield* prepare(prepareKey, () => prepareRun(columns, recipe))
      if (!prepared.ok) return prepared

      const { wheelTeeth, wormStarts, stages } = driveTrain
      const { driftDegree, wormPeriod: period, typedPeriodSeconds, harmonicCount } = recipe
      // With a gear the search for the period is made on a straight drift, whatever is fitted later.
      const searchDegree = wheelTeeth === null ? driftDegree : null
      const beginKey = prepareKey + JSON.stringify([wheelTeeth, wormStarts, searchDegree, period, typedPeriodSeconds])
      const started = yield* begin(beginKey, () => findStart(prepared, recipe))
      const chooseKey = beginKey + JSON.stringify([driftDegree, harmonicCount])
      const modelled = yield* choose(chooseKey, () => chooseModelFor(started, recipe))
      if (!modelled.ok) return modelled

      const fitKey = chooseKey + JSON.stringify([stages, recipe.isLineSearchOn, recipe.chanceLevel])
      const fitted = yield* fit(fitKey, () => fitModel(modelled, recipe))
      if (!fitted.ok) return fitted

      const folded = yield* fold(fitKey, () => foldRun(modelled, fitted))
      yield { stage: 'correcting', fraction: 0.92 }
      const result = describe({ columns, recipe, prepared, modelled, fitted, folded })
      yield { stage: 'correcting', fraction: 0.94 }
      const table = makeTable({ columns, recipe, prepared, result, folded })
      result.table = table.table
      result.tableReason = table.reason
      result.warnings.push(...table.warnings)
      yield { stage: 'correcting', fraction: 0.96 }
      const base = yield* views(fitKey + JSON.stringify(recipe.spectrumWindow), function* () {
        yield { stage: 'correcting', fraction: 0.97 }
        const { cleaned } = prepared
        const chance = residualChance(fitted.fitted, modelled.context, recipe.chanceLevel)
        return yield* during(
          { stage: 'correcting', fraction: 0.98 },
          buildViews({
            cleaned,
            recipe,
            fitted: fitted.fitted,
            parts: fitted.parts,
            chance,
            result,
            foldInput: folded.foldInput,
          }),
        )
      })
      const turn = base.turn === null ? null : { ...base.turn, tableArcsec: table.playedArcsec(base.turn.angleDegrees) }
      return { ok: true, result, views: { ...base, turn, slip: table.slip } }
    },
  }
}

function* prepareRun(columns: RunColumns, recipe: Recipe): Generator<Progress, Prepared | Failure> {
  yield { stage: 'cleaning', fraction: 0.02 }
  const converted = toTrack(columns, recipe.conversion)
  if (!converted.ok) return converted
  const { excludedSpans, isStrayPointFilterOn } = recipe
  const cleaned = cleanTrack(converted.track, { excludedSpans, isStrayPointFilterOn })
  if (!cleaned.ok) return cleaned
  if (span(cleaned.track.raArcsec) === 0) return { ok: false, reason: 'singular' }
  return { ok: true, converted, cleaned }
}

function* findStart(prepared: Prepared, recipe: Recipe): Generator<Progress, Started> {
  const { track, medianCadenceSeconds } = prepared.cleaned
  const gear = wormPeriod(recipe.driveTrain)
  const context: FitRunContext = {
    track,
    cadenceSeconds: medianCadenceSeconds,
    highestFrequencyHz: highestFrequency(medianCadenceSeconds, recipe.conversion.exposureSeconds),
    gearPeriodSeconds: gear.ok ? gear.seconds : null,
  }
  yield { stage: 'searching', fraction: 0.06 }
  return { context, start: findWormStart(context, recipe) }
}

function* chooseModelFor({ context, start }: Started, recipe: Recipe): Generator<Progress, Modelled | Failure> {
  yield { stage: 'fitting', fraction: 0.15 }
  const chosen = yield* chooseWormModel(context, recipe, start)
  if (!chosen.ok) return chosen
  return { ok: true, context, model: chosen, warnings: [...start.warnings, ...chosen.warnings] }
}

function* fitModel(modelled: Modelled, recipe: Recipe): Generator<Progress, Fitted | Failure> {
  const { context } = modelled
  const reference = context.gearPeriodSeconds ?? (modelled.model.wormHz === null ? null : 1 / modelled.model.wormHz)
  const predicted = reference === null ? [] : predictedOrders(recipe.driveTrain, reference)
  const warnings: AnalysisWarning[] = []
  let { model } = modelled
  for (;;) {
    const lines = yield* findLines(context, recipe, model)
    if (!lines.ok) return lines
    const fitted = yield* fitFinally(context, model, lines.found, predicted)
    if (!fitted.ok) return fitted
    const start = withoutFreePeriod(fitted, context)
    if (start === null) {
      warnings.push(...lines.warnings, ...fitted.warnings)
      return { ok: true, fitted, predicted, parts: splitModel(fitted.fit, context.track), warnings }
    }
    // The swing does not stand out of the noise: a period of its own would be noise too.
    const held = yield* chooseWormModel(context, recipe, start)
    if (!held.ok) return held
    model = held
  }
}

function* foldRun({ context }: Modelled, { fitted, parts }: Fitted): Generator<Progress, Folded> {
  const { fit } = fitted
  const orders = fit.shape.wormOrders
  if (orders.length === 0) return { turn: null, foldInput: null, usefulOrders: [] }
  yield { stage: 'folding', fraction: 0.85 }
  const { timeSeconds, raArcsec } = context.track
  const foldInput: FoldInput = {
    timeSeconds,
    values: raArcsec.map((value, i) => value - parts.drift[i] - parts.lines[i]),
    periodSeconds: 1 / fit.frequencies.wormHz,
    originSeconds: timeSeconds[0],
  }
  yield { stage: 'folding', fraction: 0.86 }
  const turn = foldTurns(foldInput, orders)
  yield { stage: 'folding', fraction: 0.88 }
  const usefulOrders = ordersUsefulOnLeftOutTurns(foldInput, orders)
  return { turn: 'ok' in turn ? null : turn, foldInput, usefulOrders }
}

interface DescribeInput {
  columns: RunColumns
  recipe: Recipe
  prepared: Prepared
  modelled: Modelled
  fitted: Fitted
  folded: Folded
}

function describe({ columns, recipe, prepared, modelled, fitted, folded }: DescribeInput): AnalysisResult {
  const { cleaned } = prepared
  const { track } = cleaned
  const { context } = modelled
  const { fit, errors, found, model } = fitted.fitted
  const { conversion } = recipe
  const firstUsedTimeSeconds = track.timeSeconds[0]
  const lastUsedTimeSeconds = track.timeSeconds[track.timeSeconds.length - 1]
  const durationSeconds = lastUsedTimeSeconds - firstUsedTimeSeconds
  const { exposureSeconds } = conversion
  const hasWorm = fit.shape.wormOrders.length > 0
  const worm = hasWorm
    ? describeWorm(fit, errors, {
        firstUsedTimeSeconds,
        exposureSeconds,
        periodSource: model.start.source,
        heldPeriodSeconds: model.start.heldPeriodSeconds,
        fittedPeriodSeconds: fitted.fitted.fittedPeriodSeconds,
        gearPeriodSeconds: context.gearPeriodSeconds,
      })
    : null
  const lines = describeLines(fit, errors, {
    firstUsedTimeSeconds,
    exposureSeconds,
    found,
    predicted: fitted.predicted,
  })
  const drift = describeDrift(fit, errors)
  const turns = worm === null ? null : durationSeconds / worm.periodSeconds.value
  const noise = differenceNoise(track.timeSeconds, fit.residual)
  const residual: ResidualResult = {
    rmsArcsec: rootMeanSquare(fit.residual),
    lagOneCorrelation: errors.lagOne,
    correctedLagOneCorrelation: errors.correctedLagOne,
    effectiveSampleCount: errors.effectiveSampleCount,
    seeingFloorArcsec: noise.ok ? noise.sigma2 : rootMeanSquare(fit.residual),
    isSeeingFloorLowerBound: errors.lagOne > LOWER_BOUND_CORRELATION,
  }
  const result: AnalysisResult = {
    engineVersion: ENGINE_VERSION,
    rows: columns.timeSeconds.length,
    used: track.timeSeconds.length,
    leftOut: cleaned.leftOut,
    run: {
      durationSeconds,
      medianCadenceSeconds: cleaned.medianCadenceSeconds,
      firstUsedTimeSeconds,
      lastUsedTimeSeconds,
      turns,
      gaps: cleaned.gaps,
      finestSplitOrders: turns === null ? null : 1 / turns,
      shortestPeriodSeconds: 1 / context.highestFrequencyHz,
    },
    drift,
    worm,
    wormReason: model.start.reason,
    wormPeriodIntervalSeconds: model.start.intervalSeconds,
    modelChoice: model.choice,
    lines,
    predictedOrders: fitted.predicted,
    residual,
    errorModel: errors.models[0] ?? (errors.correctedLagOne > 0 ? 'ar1' : 'white'),
    turn: folded.turn,
    spans: spanSplit({ raw: track.raArcsec, ...fitted.parts }),
    rate: rateDemand({
      harmonics: worm?.harmonics ?? [],
      periodSeconds: worm?.periodSeconds.value ?? durationSeconds,
      driftArcsecPerSecond: drift.rateArcsecPerSecond.value,
      lines: lines.map((line) => ({
        amplitudeArcsec: line.amplitudeArcsec.value,
        frequencyHz: line.frequencyHz.value,
      })),
      toleranceSkyArcsec: recipe.toleranceSkyArcsec,
      declinationDegrees: conversion.declinationDegrees,
      pictureExposureSeconds: recipe.pictureExposureSeconds,
    }),
    table: null,
    tableReason: null,
    scaleUncertaintyPercent: scaleUncertaintyPercent(conversion),
    declination: describeDeclination(prepared),
    warnings: [],
  }
  result.warnings = [
    ...collectWarnings({ recipe, prepared, modelled, result, fastRatio: noise.ok ? noise.sigma1 / noise.sigma2 : 1 }),
    ...fitted.warnings,
  ]
  return result
}

/** Straight drift and the RMS about it of the declination displacement, on the sky. */
function describeDeclination({ converted, cleaned }: Prepared): AnalysisResult['declination'] {
  const { declinationArcsec } = converted
  if (declinationArcsec === null) return null
  const rows = Array.from(cleaned.keptIndices).filter((row) => Number.isFinite(declinationArcsec[row]))
  if (rows.length < 3) return null
  const first = converted.track.timeSeconds[rows[0]]
  const time = Float64Array.from(rows, (row) => converted.track.timeSeconds[row] - first)
  const values = Float64Array.from(rows, (row) => declinationArcsec[row])
  const line = solveLeastSquares([new Float64Array(rows.length).fill(1), time], values)
  if (!line.ok) return null
  return { rmsArcsec: rootMeanSquare(line.residual), driftArcsecPerSecond: line.coefficients[1] }
}

function collectWarnings(input: {
  recipe: Recipe
  prepared: Prepared
  modelled: Modelled
  result: AnalysisResult
  fastRatio: number
}): AnalysisWarning[] {
  const { recipe, prepared, modelled, result, fastRatio } = input
  const { conversion } = recipe
  const warnings: AnalysisWarning[] = []
  const declination = conversion.declinationDegrees
  if (declination !== null && Math.abs(declination) > DECLINATION_WARNING_DEGREES) {
    warnings.push(warning('high-declination', { declinationDegrees: declination }))
  }
  if (conversion.senseBasis === 'assumed') warnings.push(warning('sense-assumed'))
  if (prepared.converted.isTimeStampUncorrected) warnings.push(warning('time-stamp-uncorrected'))
  if (prepared.cleaned.strayShare > STRAY_WARNING_SHARE) {
    warnings.push(warning('many-strays', { percent: 100 * prepared.cleaned.strayShare }))
  }
  warnings.push(...modelled.warnings)
  for (const line of result.lines) {
    if (line.isUnresolved) warnings.push(warning('line-unresolved', { periodSeconds: line.periodSeconds.value }))
  }
  const { worm } = result
  if (worm !== null && worm.gearPeriodSeconds !== null) {
    const size = worm.peakToPeakArcsec.value / 2
    const stronger = result.lines.find((line) => line.source === null && line.amplitudeArcsec.value > 3 * size)
    if (stronger) {
      const details = { lineSeconds: stronger.periodSeconds.value, gearSeconds: worm.gearPeriodSeconds }
      warnings.push(warning('stronger-line-than-worm', details))
    }
  }
  const { turns } = result.run
  if (turns !== null && turns < 3 && result.drift.degree < 2) warnings.push(warning('drift-taken-straight', { turns }))
  // Under two turns the harmonics take slow noise into themselves, and nothing is left to show it.
  const isNoiseSlow = result.residual.correctedLagOneCorrelation > LOWER_BOUND_CORRELATION
  if (turns !== null && (turns < 2 || (turns < 4 && isNoiseSlow))) {
    warnings.push(warning('errors-may-be-small', { turns }))
  }
  // Seeing that lingers as AR(1) noise alone has the ratio √(3/(3 − r)), up to 1.22.
  const r = result.residual.correctedLagOneCorrelation
  const ofSeeing = Math.sqrt(1 - r) / secondDifferenceShareOfAr1(r)
  if (fastRatio > 1.2 * ofSeeing && Number.isFinite(fastRatio))
    warnings.push(warning('fast-motion', { ratio: fastRatio }))
  const shortest = result.run.shortestPeriodSeconds
  for (const { name, order, periodSeconds } of result.predictedOrders) {
    if (periodSeconds >= shortest) continue
    const attenuation = exposureAttenuation(1 / periodSeconds, conversion.exposureSeconds)
    if (!attenuation.isCorrectable) {
      warnings.push(warning('exposure-too-long', { periodSeconds, factor: Math.abs(attenuation.factor) }))
      continue
    }
    const alias = aliasFrequency(1 / periodSeconds, result.run.medianCadenceSeconds)
    if (alias * result.run.durationSeconds < 1) continue
    warnings.push(warning('predicted-order-aliased', { name, order, aliasSeconds: 1 / alias }))
  }
  return warnings
}

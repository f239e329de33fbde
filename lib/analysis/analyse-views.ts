import { amplitudeSpectraUpTo, spectrumColumns } from './amplitude-spectrum'
import type { CleanedTrack } from './clean'
import { decimate } from './decimate'
import { toEvenGrid } from './even-grid'
import { powerAtFalseAlarm, timeVariance } from './false-alarm'
import type { FitRunContext, FittedRun } from './fit-run'
import { turnCurves } from './fold'
import type { FoldInput } from './fold'
import { harmonicValue } from './harmonic-curve'
import { evaluateModel } from './model-parts'
import type { ModelParts } from './model-parts'
import { autoregressiveFactor } from './noise-model'
import type { AnalysisResult, AnalysisViews, Recipe } from './types'
import { windowFigures, windowWeights } from './window'

const MODEL_POINTS = 2000
const SPECTRUM_COLUMNS = 1200
const TURN_POINTS = 361

/** Amplitude of one line that chance alone reaches somewhere in the searched band, at each frequency. */
export type Chance = (frequencyHz: number) => number

/**
 * Level that noise like the residual reaches with the given probability: √(2 P_fa s²) for white noise, P_fa the standard
 * power of that false-alarm probability, times the square root of the residual's own spectrum (AR(1) or power law).
 */
export function residualChance(fitted: FittedRun, context: FitRunContext, chanceLevel: number): Chance {
  const { fit, errors } = fitted
  const { track, cadenceSeconds, highestFrequencyHz } = context
  const sampleCount = track.timeSeconds.length
  const power = powerAtFalseAlarm(chanceLevel, {
    sampleCount,
    polynomialDegree: fit.parameterCount - 1,
    bandHz: highestFrequencyHz,
    timeVariance: timeVariance(track.timeSeconds),
  })
  const variance = fit.rss / (sampleCount - fit.parameterCount)
  const lowestHz = 0.7 / (2 * fit.time.halfSpanSeconds)
  return (frequencyHz) => {
    const f = Math.max(frequencyHz, lowestHz)
    const shape = autoregressiveFactor(errors.correctedLagOne, f, cadenceSeconds)
    const level = errors.powerLaw.isPreferred ? errors.powerLaw.at(f) : variance * shape
    return Math.sqrt(2 * power * level)
  }
}

/** Everything that is drawn but the table, which changes with settings of its own; pauses between the pictures. */
export function* buildViews(input: {
  cleaned: CleanedTrack
  recipe: Recipe
  fitted: FittedRun
  parts: ModelParts
  chance: Chance
  result: AnalysisResult
  foldInput: FoldInput | null
}): Generator<void, AnalysisViews> {
  const { cleaned, recipe, fitted, parts, chance, result, foldInput } = input
  const { track, segmentStarts, strays } = cleaned
  const { timeSeconds, raArcsec } = track
  const recorded = decimate({ timeSeconds, values: raArcsec, segmentStarts })
  const { firstUsedTimeSeconds, lastUsedTimeSeconds, turns } = result.run
  const modelTimeSeconds = Float64Array.from(
    { length: MODEL_POINTS },
    (_, i) => firstUsedTimeSeconds + ((lastUsedTimeSeconds - firstUsedTimeSeconds) * i) / (MODEL_POINTS - 1),
  )
  const model = evaluateModel(fitted.fit, modelTimeSeconds)
  const period = result.worm?.periodSeconds.value ?? 0
  const turnCount = turns === null ? 0 : Math.floor(turns) + 1
  const strayCurve = decimate({ timeSeconds: strays.timeSeconds, values: strays.raArcsec, segmentStarts: [0] })
  yield
  const spectrum = yield* spectrumView({ timeSeconds, raArcsec, parts, recipe, fitted, chance, result })
  yield
  return {
    track: {
      timeSeconds: recorded.timeSeconds,
      recordedArcsec: recorded.values,
      modelTimeSeconds,
      fittedArcsec: model.fitted,
      driftArcsec: model.drift,
      strayTimeSeconds: strayCurve.timeSeconds,
      strayArcsec: strayCurve.values,
      turnStartSeconds: Array.from({ length: turnCount }, (_, n) => firstUsedTimeSeconds + n * period),
    },
    spectrum,
    turn: foldInput === null ? null : turnView(result, foldInput),
    slip: null,
  }
}

function* spectrumView(input: {
  timeSeconds: Float64Array
  raArcsec: Float64Array
  parts: ModelParts
  recipe: Recipe
  fitted: FittedRun
  chance: Chance
  result: AnalysisResult
}): Generator<void, AnalysisViews['spectrum']> {
  const { timeSeconds, raArcsec, parts, recipe, fitted, chance, result } = input
  const window = recipe.spectrumWindow
  const before = toEvenGrid(
    timeSeconds,
    raArcsec.map((value, i) => value - parts.drift[i]),
  )
  const after = toEvenGrid(timeSeconds, fitted.fit.residual)
  const highestHz = Math.min(1 / result.run.shortestPeriodSeconds, 0.5 / before.cadenceSeconds)
  yield
  const [whole, left] = amplitudeSpectraUpTo(before, after, { window, highestHz })
  yield
  const columns = spectrumColumns(whole, left, {
    lowestHz: Math.min(0.5 / result.run.durationSeconds, highestHz / 2),
    highestHz,
    columnCount: SPECTRUM_COLUMNS,
  })
  // A tapered spectrum of noise stands higher by the root of the window’s noise bandwidth, which hangs on no length.
  const { noiseBandwidthBins } = windowFigures(windowWeights(window, Math.min(before.values.length, 1024)))
  const taper = Math.sqrt(noiseBandwidthBins)
  return { ...columns, chanceArcsec: columns.frequencyHz.map((f) => taper * chance(f)) }
}

function turnView(result: AnalysisResult, foldInput: FoldInput): AnalysisViews['turn'] {
  const harmonics = result.worm?.harmonics ?? []
  const angleDegrees = Float64Array.from({ length: TURN_POINTS }, (_, i) => (360 * i) / (TURN_POINTS - 1))
  return {
    angleDegrees,
    curveArcsec: angleDegrees.map((degrees) => harmonicValue(harmonics, (degrees * Math.PI) / 180)),
    turns: turnCurves(foldInput),
    tableArcsec: null,
  }
}

import { z } from 'zod'
import type { AnalysisResult, TableResult } from '@/lib/analysis/types'
import { excludedSpanSchema, tableSettingsSchema } from './recipe'

/*
 * The figures of an analysis as the numerical core gives them, checked before they are kept: JSON turns what is not finite
 * into null, so a figure that must be there and is null shows a fault that would otherwise be saved for years.
 */

const number = z.number()
const count = z.number().int().min(0)
const share = z.number()
const estimate = z.object({ value: number, stderr: number.min(0).nullable() })
const reason = z.enum([
  'few-points',
  'short-run',
  'not-finite',
  'not-increasing',
  'singular',
  'out-of-range',
  'no-period',
  'no-index',
])

const leftOut = z.object({
  reason: z.enum(['missing', 'not-finite', 'repeated-time', 'excluded', 'stray']),
  count,
})

const run = z.object({
  durationSeconds: number,
  medianCadenceSeconds: number,
  firstUsedTimeSeconds: number,
  lastUsedTimeSeconds: number,
  turns: number.nullable(),
  gaps: z.array(excludedSpanSchema),
  finestSplitOrders: number.nullable(),
  shortestPeriodSeconds: number,
})

const drift = z.object({
  degree: count,
  coefficients: z.array(estimate),
  rateArcsecPerSecond: estimate,
  percentOfSidereal: number,
})

const harmonic = z.object({
  order: z.number().int().min(1),
  periodSeconds: number.positive(),
  amplitudeArcsec: estimate,
  phaseDegrees: estimate,
  isPhaseMeaningful: z.boolean(),
  cosArcsec: number,
  sinArcsec: number,
  covarianceArcsec2: z.tuple([number, number, number]),
})

const worm = z.object({
  periodSeconds: estimate.extend({ value: number.positive() }),
  periodSource: z.enum(['fitted', 'gear', 'typed']),
  fittedPeriodSeconds: estimate.nullable(),
  gearPeriodSeconds: number.nullable(),
  harmonics: z.array(harmonic),
  peakToPeakArcsec: estimate.extend({ value: number.min(0) }),
  rmsArcsec: number,
  steepestRateArcsecPerSecond: estimate,
  furthestAheadDegrees: number,
  furthestAheadArcsec: number,
  furthestBehindDegrees: number,
  furthestBehindArcsec: number,
  fundamentalPowerShare: share,
})

const line = z.object({
  periodSeconds: estimate,
  frequencyHz: estimate,
  order: estimate.nullable(),
  amplitudeArcsec: estimate,
  phaseDegrees: estimate,
  falseAlarmProbability: number,
  signalToNoise: number,
  source: z.string().nullable(),
  isUnresolved: z.boolean(),
})

const modelChoice = z.object({
  candidates: z.array(z.object({ driftDegree: count, harmonicCount: count, bic: number, residualRmsArcsec: number })),
  isDegreeChosenByEvidence: z.boolean(),
  isCountChosenByEvidence: z.boolean(),
  nextHarmonicProbability: number.nullable(),
})

const residual = z.object({
  rmsArcsec: number,
  lagOneCorrelation: number,
  correctedLagOneCorrelation: number,
  effectiveSampleCount: number,
  seeingFloorArcsec: number,
  isSeeingFloorLowerBound: z.boolean(),
})

const turn = z.object({
  completeTurns: count,
  repeatability: share,
  rmsShareLeft: share,
  predictions: z.array(z.object({ turnNumber: count, rmsBeforeArcsec: number, rmsLeftArcsec: number })),
  predictiveShare: share.nullable(),
  heldOutReduction: share.nullable(),
  scatter: number.nullable(),
})

const spans = z.object({
  rawArcsec: number,
  afterDriftArcsec: number,
  afterWormArcsec: number,
  afterLinesArcsec: number,
  rawWithoutWormArcsec: number,
  driftArcsec: number,
  wormArcsec: number,
})

const rate = z.object({
  steepestArcsecPerSecond: number,
  steepestWithDriftArcsecPerSecond: number,
  percentOfSidereal: number,
  longestCorrectionIntervalSeconds: number.nullable(),
  framesKeptShare: share,
  toleranceAxisArcsec: number,
})

export const tableResultSchema = z.object({
  bins: z
    .array(z.object({ index: count, angleDegrees: number, value: number }))
    .min(8)
    .max(4096),
  settings: tableSettingsSchema,
  orders: z.array(z.number().int().min(1)),
  wormPeriodSeconds: number.positive(),
  originTimeSeconds: number,
  closureError: number,
  largestRateArcsecPerSecond: number,
  rehearsal: z.object({
    orders: z.array(
      z.object({ order: z.number().int(), beforeArcsec: number, afterArcsec: number, isIncluded: z.boolean() }),
    ),
    peakToPeakBeforeArcsec: number,
    peakToPeakAfterArcsec: number,
    heldOutReduction: share.nullable(),
    slipForTenPercentDegrees: number,
    slipForNoHelpDegrees: number,
    binningLossShare: share,
  }),
}) satisfies z.ZodType<TableResult>

export const fullAnalysisResultSchema = z.object({
  engineVersion: z.string().min(1).max(40),
  rows: count,
  used: count,
  leftOut: z.array(leftOut),
  run,
  drift,
  worm: worm.nullable(),
  wormReason: reason.nullable(),
  wormPeriodIntervalSeconds: z.tuple([number, number]).nullable(),
  modelChoice: modelChoice.nullable(),
  lines: z.array(line),
  predictedOrders: z.array(z.object({ name: z.string(), order: number, periodSeconds: number })),
  residual,
  errorModel: z.enum(['white', 'ar1', 'power-law', 'local-spectrum']),
  turn: turn.nullable(),
  spans,
  rate,
  table: tableResultSchema.nullable(),
  tableReason: reason.nullable(),
  scaleUncertaintyPercent: number.nullable(),
  declination: z.object({ rmsArcsec: number, driftArcsecPerSecond: number }).nullable(),
  warnings: z.array(z.object({ code: z.string(), details: z.record(z.string(), z.union([z.number(), z.string()])) })),
}) satisfies z.ZodType<AnalysisResult>

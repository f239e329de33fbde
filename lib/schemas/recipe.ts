import { z } from 'zod'
import type { Recipe, SpectrumWindow } from '@/lib/analysis/types'

/** Side lobes are 170 dB down by then: nothing that is recorded asks for more. */
export const LARGEST_KAISER_BETA = 20

const positive = z.number().positive().finite()

export const conversionSchema = z.object({
  displacementUnit: z.enum(['px', 'arcsec', 'ra-seconds']),
  imageScaleArcsecPerPx: positive.nullable(),
  imageScaleUncertaintyPercent: z.number().min(0).max(100).nullable(),
  declinationDegrees: z.number().gt(-89).lt(89).nullable(),
  declinationUncertaintyDegrees: z.number().min(0).max(90).nullable(),
  frame: z.enum(['sky', 'axis']),
  positiveMeans: z.enum(['ahead', 'behind']),
  senseBasis: z.enum(['proven', 'assumed']),
  exposureSeconds: z.number().min(0).max(3600).nullable(),
  timeStamp: z.enum(['start', 'mid', 'end']),
})

export const excludedSpanSchema = z
  .object({ startSeconds: z.number().finite(), endSeconds: z.number().finite() })
  .refine((span) => span.endSeconds > span.startSeconds, { error: 'A span must end after it starts' })

const teeth = z.number().int().min(1).max(100_000)

export const gearStageSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('gear-pair'), name: z.string().max(80), drivenTeeth: teeth, drivingTeeth: teeth }),
  z.object({
    kind: z.literal('belt'),
    name: z.string().max(80),
    drivenTeeth: teeth,
    drivingTeeth: teeth,
    beltTeeth: teeth,
  }),
])

export const driveTrainSchema = z.object({
  axisKind: z.literal('worm'),
  wheelTeeth: teeth.nullable(),
  wormStarts: z.number().int().min(1).max(16),
  stages: z.array(gearStageSchema).max(12),
})

export const spectrumWindowSchema = z.union([
  z.enum(['rectangular', 'hann', 'hamming', 'blackman', 'blackman-harris', 'flat-top']),
  z.object({ kind: z.literal('kaiser'), beta: z.number().min(0).max(LARGEST_KAISER_BETA) }),
]) satisfies z.ZodType<SpectrumWindow>

export const tableSettingsSchema = z.object({
  binCount: z.number().int().min(8).max(4096),
  quantity: z.enum(['position', 'rate']),
  unit: z.enum(['arcsec', 'arcsec-per-second', 'percent-sidereal']),
  meaning: z.enum(['correction', 'error']),
  angleDirection: z.enum(['increasing', 'decreasing']),
  origin: z.discriminatedUnion('kind', [
    z.object({ kind: z.literal('run-start') }),
    z.object({ kind: z.literal('index-time'), timeSeconds: z.number().finite() }),
    z.object({ kind: z.literal('worm-angle-column') }),
  ]),
  offsetDegrees: z.number().min(-360).max(360),
  orders: z.union([z.literal('default'), z.array(z.number().int().min(1).max(64)).max(64)]),
  gain: z.number().gt(0).max(2),
  playback: z.enum(['interpolated', 'held-from-start', 'held-at-centre']),
})

export const recipeSchema = z.object({
  version: z.literal(1),
  conversion: conversionSchema,
  excludedSpans: z.array(excludedSpanSchema).max(200),
  isStrayPointFilterOn: z.boolean(),
  driftDegree: z.union([z.literal('auto'), z.literal(0), z.literal(1), z.literal(2), z.literal(3)]),
  driveTrain: driveTrainSchema,
  wormPeriod: z.enum(['fitted', 'gear', 'typed']),
  typedPeriodSeconds: positive.nullable(),
  harmonicCount: z.union([z.literal('auto'), z.number().int().min(1).max(12)]),
  isLineSearchOn: z.boolean(),
  chanceLevel: z.number().gt(0).max(0.1),
  spectrumWindow: spectrumWindowSchema,
  toleranceSkyArcsec: positive.max(3600),
  pictureExposureSeconds: positive.max(36_000),
  table: tableSettingsSchema,
}) satisfies z.ZodType<Recipe>

/** The settings a fresh bench starts from; the conversion and the drive train come from the run and the project. */
export function defaultRecipe(): Recipe {
  return {
    version: 1,
    conversion: {
      displacementUnit: 'arcsec',
      imageScaleArcsecPerPx: null,
      imageScaleUncertaintyPercent: null,
      declinationDegrees: null,
      declinationUncertaintyDegrees: null,
      frame: 'sky',
      positiveMeans: 'ahead',
      senseBasis: 'assumed',
      exposureSeconds: null,
      timeStamp: 'mid',
    },
    excludedSpans: [],
    isStrayPointFilterOn: true,
    driftDegree: 'auto',
    driveTrain: { axisKind: 'worm', wheelTeeth: null, wormStarts: 1, stages: [] },
    wormPeriod: 'fitted',
    typedPeriodSeconds: null,
    harmonicCount: 'auto',
    isLineSearchOn: true,
    chanceLevel: 0.001,
    spectrumWindow: 'hann',
    toleranceSkyArcsec: 2,
    pictureExposureSeconds: 60,
    table: {
      binCount: 240,
      quantity: 'position',
      unit: 'arcsec',
      meaning: 'correction',
      angleDirection: 'increasing',
      origin: { kind: 'run-start' },
      offsetDegrees: 0,
      orders: 'default',
      gain: 1,
      playback: 'interpolated',
    },
  }
}

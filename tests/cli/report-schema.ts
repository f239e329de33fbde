import { z } from 'zod'

/*
 * The shape of what the command prints, key by key. zod’s numbers are finite, so this refuses NaN and infinities; where
 * null may stand, it says so.
 */

const estimate = z.strictObject({ value: z.number(), stderr: z.number().nonnegative().nullable() })
const share = z.number().min(0).max(1)
const phase = z.strictObject({ value: z.number().min(0).lt(360), stderr: z.number().nonnegative() })

export const reportSchema = z.strictObject({
  engine: z.strictObject({ version: z.string().min(1) }),
  file: z.strictObject({
    sha256: z.string().regex(/^[0-9a-f]{64}$/),
    recordings: z.number().int().positive(),
    rows: z.number().int().positive(),
    used: z.number().int().positive(),
    leftOut: z.array(z.strictObject({ reason: z.string().min(1), count: z.number().int().positive() })),
  }),
  run: z.strictObject({
    durationSeconds: z.number().positive(),
    medianCadenceSeconds: z.number().positive(),
    turns: z.number().positive().nullable(),
  }),
  drift: z.strictObject({ degree: z.number().int().min(0).max(3), coefficients: z.array(estimate).max(3) }),
  worm: z
    .strictObject({
      periodSeconds: estimate,
      peakToPeakArcsec: estimate,
      steepestRateArcsecPerSecond: estimate,
      harmonics: z
        .array(
          z.strictObject({
            order: z.number().int().positive(),
            amplitudeArcsec: estimate,
            phaseDegrees: phase.nullable(),
          }),
        )
        .min(1),
    })
    .nullable(),
  lines: z.array(
    z.strictObject({
      periodSeconds: estimate,
      order: z.number().positive().nullable(),
      amplitudeArcsec: estimate,
      phaseDegrees: phase,
      falseAlarmProbability: share,
      label: z.string().nullable(),
    }),
  ),
  residual: z.strictObject({
    rmsArcsec: z.number().nonnegative(),
    lagOneCorrelation: z.number().min(-1).max(1),
    seeingFloorArcsec: z.number().nonnegative(),
  }),
  spans: z.strictObject({
    rawArcsec: z.number().nonnegative(),
    afterDriftArcsec: z.number().nonnegative(),
    afterWormArcsec: z.number().nonnegative(),
    afterLinesArcsec: z.number().nonnegative(),
    rawWithoutWormArcsec: z.number().nonnegative(),
    driftArcsec: z.number().nonnegative(),
  }),
  turn: z
    .strictObject({
      repeatability: share,
      heldOutReduction: z.number().max(1).nullable(),
      scatter: z.number().nonnegative().nullable(),
    })
    .nullable(),
  warnings: z.array(z.strictObject({ code: z.string().min(1), message: z.string().min(1) })),
})

export type Report = z.infer<typeof reportSchema>

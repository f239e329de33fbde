import { z } from 'zod'

/** What a kept correction table says of its own rehearsal (TableRehearsal of lib/analysis/types.ts), as far as pages show it. */
export const rehearsedTableSchema = z.object({
  orders: z.array(z.number().int()),
  largestRateArcsecPerSecond: z.number(),
  rehearsal: z.object({
    peakToPeakBeforeArcsec: z.number(),
    peakToPeakAfterArcsec: z.number(),
    heldOutReduction: z.number().nullable(),
    slipForTenPercentDegrees: z.number(),
    slipForNoHelpDegrees: z.number(),
    binningLossShare: z.number(),
  }),
})
export type RehearsedTable = z.infer<typeof rehearsedTableSchema>

/** The figures of a kept analysis that the overview of a project shows. */
const estimateSchema = z.object({ value: z.number(), stderr: z.number().nullable() })
export const overviewFiguresSchema = z.object({
  worm: z
    .object({
      periodSeconds: estimateSchema,
      peakToPeakArcsec: estimateSchema,
      steepestRateArcsecPerSecond: estimateSchema,
      harmonics: z.array(z.object({ order: z.number(), amplitudeArcsec: estimateSchema })),
    })
    .nullable(),
  turn: z.object({ heldOutReduction: z.number().nullable() }).nullable(),
})
export type OverviewFigures = z.infer<typeof overviewFiguresSchema>

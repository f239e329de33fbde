import { z } from 'zod'
import type { ImportSettings } from '@/lib/formats/types'

const row = z.number().int().min(1)
const column = z.number().int().min(0).max(499)

export const importSettingsSchema = z.object({
  version: z.literal(1),
  layout: z.object({
    encoding: z.enum(['utf-8', 'utf-16le', 'utf-16be', 'windows-1252']),
    delimiter: z.enum([',', ';', '\t', ' ']),
    decimalMark: z.enum(['.', ',']),
    headerRow: row.nullable(),
    unitsRow: row.nullable(),
    firstDataRow: row,
  }),
  columns: z.object({
    time: column,
    timeUnit: z.enum(['seconds', 'milliseconds', 'minutes', 'iso-8601', 'julian-date']),
    displacement: column,
    displacementUnit: z.enum(['px', 'arcsec', 'ra-seconds']),
    declination: column.nullable(),
    wormAngle: column.nullable(),
    wormAngleUnit: z.enum(['degrees', 'turns']),
  }),
}) satisfies z.ZodType<ImportSettings>

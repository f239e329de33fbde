import { z } from 'zod'
import { correctionSchema, roleSchema } from './api'
import { timeZoneSchema } from './preferences'

/*
 * The lists that the server sorts, filters and cuts into pages. Each GET takes its query from the address and answers the
 * rows, cursors to what lies after and before them, and counts. A cursor belongs to one sort in one direction: another
 * one, or none of ours, is refused with 422.
 */

const id = z.uuid()
const instant = z.iso.datetime()
const count = z.number().int().min(0)

export const LARGEST_PAGE = 200
export const PAGE_SIZES = [25, 50, 100] as const
/** The days that can be asked for. */
export const FIRST_DAY = '1900-01-01'
export const LAST_DAY = '2999-12-31'

const text = z
  .string()
  .max(200, { error: 'At most 200 characters' })
  .refine((value) => !value.includes('\0'), { error: 'A text holds a character that no name can hold. Remove it.' })
  .default('')
const day = z.iso
  .date({ error: 'Give the day as year, month and day: 2026-11-14' })
  .refine((value) => value >= FIRST_DAY && value <= LAST_DAY, { error: 'Give a day from 1900 to 2999' })
  .optional()
/** From the beginning of one day to the end of another, as clocks of a zone count them. */
const dayFilter = { from: day, to: day, zone: timeZoneSchema.default('UTC') }

interface DayFilter {
  from?: string
  to?: string
  zone: string
}

/** The query with its days counted in the zone of whoever looks; without days it is the same in every zone. */
export function inZone<Query extends DayFilter>(query: Query, zone: string): Query {
  return { ...query, zone: query.from === undefined && query.to === undefined ? 'UTC' : zone }
}

function listQuery<const Sort extends string>(
  sorts: readonly [Sort, ...Sort[]],
  usual: NoInfer<Sort>,
  direction: 'asc' | 'desc',
) {
  return z.object({
    sort: z.enum(sorts, { error: 'The list can’t be sorted by this' }).default(usual as never),
    direction: z.enum(['asc', 'desc'], { error: 'Either asc or desc' }).default(direction as never),
    /** Words that must all be found in the row’s names; case does not matter. */
    q: text,
    cursor: z.string().max(4000, { error: 'This is no place in the list' }).optional(),
    limit: z.coerce
      .number({ error: 'How many rows, as a number' })
      .int({ error: 'A whole number of rows' })
      .min(1, { error: 'At least one row' })
      .max(LARGEST_PAGE, { error: `At most ${LARGEST_PAGE} rows at once` })
      .default(25),
  })
}

/** What every list answers beside its rows. */
const pageShape = {
  /** Leads to the rows after these; null on the last page. */
  nextCursor: z.string().nullable(),
  /** Leads to the rows before these; null on the first page. */
  previousCursor: z.string().nullable(),
  /** Rows that match, and how many of them lie before this page. */
  total: count,
  before: count,
  /** Rows there are when nothing is filtered. */
  all: count,
}
export type PageFacts = z.infer<z.ZodObject<typeof pageShape>>

// Projects ------------------------------------------------------------------------------------------------------------

export const projectQuerySchema = listQuery(
  ['name', 'period', 'runs', 'analyses', 'people', 'role', 'changed'],
  'changed',
  'desc',
).extend({
  role: roleSchema.optional(),
  /** Archived projects are left out unless asked for. */
  archived: z.enum(['no', 'only', 'too']).default('no'),
})
export type ProjectQuery = z.output<typeof projectQuerySchema>
export const projectSummarySchema = z.object({
  id,
  name: z.string(),
  role: roleSchema,
  wheelTeeth: z.number().int().nullable(),
  wormStarts: z.number().int(),
  runCount: count,
  analysisCount: count,
  memberCount: count,
  archivedAt: instant.nullable(),
  updatedAt: instant,
})
export type ProjectSummary = z.infer<typeof projectSummarySchema>
/** GET /api/projects. */
export const projectListSchema = z.object({
  ...pageShape,
  projects: z.array(projectSummarySchema),
  overview: z.object({ archived: count, lastChangedName: z.string().nullable() }),
})

// Runs ----------------------------------------------------------------------------------------------------------------

export const runQuerySchema = listQuery(
  ['name', 'started', 'rows', 'correction', 'sense', 'analyses', 'size', 'by', 'created'],
  'started',
  'desc',
).extend({
  correction: z.enum(['off', 'on', 'unknown']).optional(),
  side: z.enum(['east', 'west', 'unknown']).optional(),
  sense: z.enum(['proven', 'assumed']).optional(),
  state: z.enum(['read', 'unread']).optional(),
  ...dayFilter,
})
export type RunQuery = z.output<typeof runQuerySchema>
export const runSummarySchema = z.object({
  id,
  projectId: id,
  name: z.string(),
  fileName: z.string(),
  byteLength: count,
  status: z.enum(['uploaded', 'ready']),
  rowCount: count.nullable(),
  startedAt: instant.nullable(),
  mountCorrection: z.enum(['off', 'on', 'unknown']),
  sideOfPier: z.enum(['east', 'west', 'unknown']),
  /** Null until the run has been read. */
  senseBasis: z.enum(['proven', 'assumed']).nullable(),
  analysisCount: count,
  createdAt: instant,
  createdBy: z.string(),
})
export type RunSummary = z.infer<typeof runSummarySchema>
/** GET /api/projects/[projectId]/runs. `overview` counts all runs, whatever is filtered. */
export const runListSchema = z.object({
  ...pageShape,
  runs: z.array(runSummarySchema),
  overview: z.object({ unread: count, withoutAnalysis: count, assumedSense: count }),
})

// Analyses ------------------------------------------------------------------------------------------------------------

export const analysisQuerySchema = listQuery(
  ['name', 'run', 'period', 'amplitude', 'peak', 'by', 'created'],
  'created',
  'desc',
).extend({ runId: id.optional(), worm: z.enum(['with', 'without']).optional() })
export type AnalysisQuery = z.output<typeof analysisQuerySchema>
export const analysisSummarySchema = z.object({
  id,
  projectId: id,
  runId: id,
  runName: z.string(),
  name: z.string(),
  /** Null where there is no worm figure. */
  wormPeriodSeconds: z.number().nullable(),
  wormPeriodStderrSeconds: z.number().nullable(),
  wormAmplitudeArcsec: z.number().nullable(),
  wormAmplitudeStderrArcsec: z.number().nullable(),
  peakToPeakArcsec: z.number().nullable(),
  peakToPeakStderrArcsec: z.number().nullable(),
  createdAt: instant,
  createdBy: z.string(),
})
export type AnalysisSummary = z.infer<typeof analysisSummarySchema>
/** GET /api/projects/[projectId]/analyses. */
export const analysisListSchema = z.object({
  ...pageShape,
  analyses: z.array(analysisSummarySchema),
  overview: z.object({
    leastPeakToPeakArcsec: z.number().nullable(),
    mostPeakToPeakArcsec: z.number().nullable(),
    /** Name of the run that the list is narrowed to. */
    runName: z.string().nullable(),
  }),
})

/** GET /api/projects/[projectId]/history: the newest analysis of each run that has a worm figure, by date of recording. */
export const historyPointSchema = z.object({
  analysisId: id,
  runId: id,
  runName: z.string(),
  analysisName: z.string(),
  /** When the run was recorded; where nobody noted that, when it was brought in. */
  at: instant,
  isRecordingTimeKnown: z.boolean(),
  wormAmplitudeArcsec: z.number(),
  wormAmplitudeStderrArcsec: z.number().nullable(),
  peakToPeakArcsec: z.number(),
  peakToPeakStderrArcsec: z.number().nullable(),
  wormPeriodSeconds: z.number().nullable(),
})
/** The last LONGEST_HISTORY of them: more could not be told apart in one picture. */
export const LONGEST_HISTORY = 200
export const historySchema = z.object({ points: z.array(historyPointSchema), total: count })

// Correction tables ---------------------------------------------------------------------------------------------------

export const correctionQuerySchema = listQuery(
  ['name', 'analysis', 'kind', 'bins', 'sense', 'by', 'created'],
  'created',
  'desc',
).extend({
  kind: z.enum(['stand-alone', 'addition']).optional(),
  sense: z.enum(['proven', 'assumed']).optional(),
})
export type CorrectionQuery = z.output<typeof correctionQuerySchema>
export const correctionSummarySchema = correctionSchema
  .omit({ table: true })
  .extend({ settings: correctionSchema.shape.settings.pick({ binCount: true, meaning: true, unit: true }) })
export type CorrectionSummary = z.infer<typeof correctionSummarySchema>
/** GET /api/projects/[projectId]/corrections. */
export const correctionListSchema = z.object({
  ...pageShape,
  corrections: z.array(correctionSummarySchema),
  overview: z.object({ assumedSense: count }),
})

// Audit events --------------------------------------------------------------------------------------------------------

/** Kinds of things that the log speaks of: the first half of an action’s name. */
export const auditQuerySchema = listQuery(['at', 'person', 'action', 'subject'], 'at', 'desc').extend({
  person: id.optional(),
  thing: z
    .string()
    .regex(/^[a-z-]{1,40}$/, { error: 'There is no such kind of thing' })
    .optional(),
  ...dayFilter,
})
export type AuditQuery = z.output<typeof auditQuerySchema>
/** GET /api/projects/[projectId]/audit-events (members). */
export const auditEventListSchema = z.object({
  ...pageShape,
  events: z.array(z.object({ id, actorName: z.string(), action: z.string(), subject: z.string(), at: instant })),
})
export type AuditEvent = z.output<typeof auditEventListSchema>['events'][number]

// Addresses -----------------------------------------------------------------------------------------------------------

export interface ListQuery {
  sort: string
  direction: 'asc' | 'desc'
  q: string
  cursor?: string
  limit: number
}

export type ListSchema = z.ZodObject & z.ZodType<ListQuery>

/**
 * A query as the end of an address, shortest form: what is as usual is left out, so that one view has one address.
 * Begins with ? unless it is empty.
 */
export function listSearch<Schema extends ListSchema>(schema: Schema, asked: Partial<z.output<Schema>>): string {
  const usual: Record<string, unknown> = { ...schema.parse({}) }
  const query: Record<string, unknown> = { ...asked }
  const search = new URLSearchParams()
  for (const key of Object.keys(schema.shape)) {
    const value = query[key]
    if (value !== undefined && value !== '' && value !== usual[key]) search.set(key, String(value))
  }
  const encoded = search.toString()
  return encoded === '' ? '' : `?${encoded}`
}

/** The query of an address that a person may have changed by hand: what can’t be taken is left out. */
export function lenientQuery<Schema extends z.ZodObject>(
  schema: Schema,
  search: Record<string, unknown>,
): z.output<Schema> {
  const first = schema.safeParse(search)
  if (first.success) return first.data
  const faulty = new Set(first.error.issues.map(({ path }) => path[0]))
  return schema.parse(Object.fromEntries(Object.entries(search).filter(([key]) => !faulty.has(key))))
}

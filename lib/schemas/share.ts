import { z } from 'zod'
import { noteAnchorSchema } from './api'
import { recipeSchema } from './recipe'
import { runFactsSchema } from './run-facts'
import { fullAnalysisResultSchema } from './analysis-result'

/*
 * Share links: one read-only report for whoever holds the link.
 *
 * GET, POST …/analyses/[analysisId]/share-links; PATCH, DELETE …/share-links/[linkId] (all: editor). PATCH answers 409
 * `changed-meanwhile` with the link as it is in `current`. DELETE revokes: the link stays in the list and opens nothing more.
 * GET and DELETE work in an archived project too, where a link goes on until it is revoked.
 * GET /api/share/[token] → shareReportSchema, without a session; GET /api/share/[token]/columns → packed columns as a gzip
 * file. 404 for a token that is none, 410 `link-ended` once it has expired or was revoked.
 */

const id = z.uuid()
const instant = z.iso.datetime()

export const PREFACE_MAX = 2000

const preface = z
  .string()
  .trim()
  .max(PREFACE_MAX, { error: `At most ${PREFACE_MAX} characters` })
  .transform((text) => (text === '' ? null : text))
  .nullable()

export const shareLinkFieldsSchema = z.object({
  /** What the reader is told first; empty or null: nothing. */
  preface,
  /** Null: until it is revoked. */
  expiresAt: instant.nullable(),
  /** The notes that are shown. */
  noteIds: z.array(id).max(500),
})
export type ShareLinkFields = z.output<typeof shareLinkFieldsSchema>
export const shareLinkChangeSchema = shareLinkFieldsSchema.extend({ version: z.number().int().min(1) })
export type ShareLinkChange = z.output<typeof shareLinkChangeSchema>

export const shareLinkSchema = z.object({
  id,
  version: z.number().int(),
  token: z.string(),
  preface: z.string().nullable(),
  noteIds: z.array(id),
  createdAt: instant,
  createdBy: z.string(),
  expiresAt: instant.nullable(),
  revokedAt: instant.nullable(),
  openedCount: z.number().int(),
  lastOpenedAt: instant.nullable(),
})
export type ShareLink = z.infer<typeof shareLinkSchema>
export const shareLinkListSchema = z.object({ links: z.array(shareLinkSchema) })

/** Facts of the run that bear on its figures. Free texts stay with the project: nobody chose to publish them. */
const sharedFactsSchema = runFactsSchema
  .pick({
    startedAt: true,
    hourAngleDegrees: true,
    sideOfPier: true,
    trackingRate: true,
    mountCorrection: true,
    guiding: true,
    temperatureCelsius: true,
  })
  .strip()

const sharedNoteSchema = z.object({
  anchor: noteAnchorSchema,
  text: z.string(),
  authorName: z.string(),
  createdAt: instant,
  isSettled: z.boolean(),
})
export type SharedNote = z.infer<typeof sharedNoteSchema>

/** One analysis with all that its report shows. */
export const sharedAnalysisSchema = z.object({
  kind: z.literal('analysis'),
  name: z.string(),
  savedAt: instant,
  engineVersion: z.string(),
  samplesSha256: z.string(),
  recipe: recipeSchema,
  /** Null where it was kept by a version with other figures; the report then shows what is computed again. */
  result: fullAnalysisResultSchema.nullable(),
  run: z.object({
    name: z.string(),
    fileSha256: z.string(),
    rowCount: z.number().int().nullable(),
    facts: sharedFactsSchema,
    /** Whether its stored columns are still those that the analysis was made from. */
    hasSameSamples: z.boolean(),
  }),
  notes: z.array(sharedNoteSchema),
})
export type SharedAnalysis = z.infer<typeof sharedAnalysisSchema>

export const shareReportSchema = z.object({
  mountName: z.string(),
  sharedBy: z.string(),
  sharedAt: instant,
  expiresAt: instant.nullable(),
  preface: z.string().nullable(),
  /** What is shown; further kinds of subject join here. */
  subject: z.discriminatedUnion('kind', [sharedAnalysisSchema]),
})
export type ShareReport = z.infer<typeof shareReportSchema>

import { z } from 'zod'
import { importSettingsSchema } from './import'
import { preferencesSchema } from './preferences'
import { conversionSchema, driveTrainSchema, recipeSchema, tableSettingsSchema } from './recipe'
import { runFactsSchema } from './run-facts'

/*
 * Requests and answers of the route handlers, parsed on both sides; those of the lists stand in lists.ts. Every address below /api/projects/[projectId] answers
 * 401 without a session, 404 to strangers, 403 to members without the right. A changed thing carries `version`; a request
 * to change it names the version it was made from, and 409 `changed-meanwhile` tells who changed it and gives the current state.
 */

const id = z.uuid()
const instant = z.iso.datetime()
const version = z.number().int().min(1)
const name = z.string().trim().min(1, { error: 'Give it a name' }).max(120, { error: 'At most 120 characters' })

export const roleSchema = z.enum(['owner', 'editor', 'viewer'])
export type Role = z.infer<typeof roleSchema>

export const errorAnswerSchema = z.object({
  error: z.object({
    code: z.string(),
    message: z.string(),
    /** Field name to message, for forms. */
    fields: z.record(z.string(), z.string()).optional(),
    /** With 409 changed-meanwhile: who, when, and the thing as it is now. */
    changedBy: z.string().optional(),
    changedAt: instant.optional(),
    current: z.unknown().optional(),
    /** With a file that can't be read: where its fault lies. */
    row: z.number().int().nullable().optional(),
    column: z.string().nullable().optional(),
  }),
})

// Accounts ------------------------------------------------------------------------------------------------------------

/** What a new account needs; lib/schemas/accounts.ts holds what is asked and answered about accounts. */
export const signUpSchema = z.object({
  displayName: z.string().trim().min(1, { error: 'Tell us what to call you' }).max(80),
  email: z.email({ error: 'This is not an e-mail address' }).max(254),
  password: z.string().min(10, { error: 'At least 10 characters' }).max(200),
})
/** POST /api/auth/sign-in → 200 meSchema; 401 `wrong-credentials`. POST /api/auth/sign-out → 204. */
export const signInSchema = z.object({
  email: z.email({ error: 'This is not an e-mail address' }),
  password: z.string().min(1),
})

/** GET /api/me → 200; user is null without a session. */
export const meSchema = z.object({
  user: z.object({ id, displayName: z.string(), email: z.string(), preferences: preferencesSchema }).nullable(),
})

// Projects ------------------------------------------------------------------------------------------------------------

/** GET, POST /api/projects. The maker becomes owner. */
export const newProjectSchema = z.object({ name, driveTrain: driveTrainSchema })
export const projectSchema = z.object({
  id,
  version,
  name,
  role: roleSchema,
  driveTrain: driveTrainSchema,
  driveTrainId: id,
  /** Choices of the last import, offered for the next one; null before the first. */
  lastImport: z.object({ settings: importSettingsSchema, conversion: conversionSchema }).nullable(),
  runCount: z.number().int(),
  analysisCount: z.number().int(),
  memberCount: z.number().int(),
  /** Since when nothing in it can be changed; null: it is in use. */
  archivedAt: instant.nullable(),
  createdAt: instant,
  updatedAt: instant,
})
export type Project = z.infer<typeof projectSchema>
/** PATCH /api/projects/[projectId] (owner). */
export const projectChangeSchema = z.object({ version, name })
/** PUT /api/projects/[projectId]/archived (owner) → 200 projectSchema. Archived: everybody reads on, nobody changes anything. */
export const projectArchivedSchema = z.object({ version, isArchived: z.boolean() })
/** DELETE /api/projects/[projectId] (owner) → 204; 422 unless the name is the project's. */
export const projectDeletionSchema = z.object({ name: z.string().max(120) })
/** GET /api/projects/[projectId]/contents: what goes with the project when it is deleted. */
export const projectContentsSchema = z.object({
  runCount: z.number().int(),
  /** Of the original files. */
  runBytes: z.number().int(),
  analysisCount: z.number().int(),
  noteCount: z.number().int(),
  correctionCount: z.number().int(),
  /** The asker among them. */
  memberCount: z.number().int(),
  /** Share links that open something now. */
  shareLinkCount: z.number().int(),
  /** Invitations that could still be accepted. */
  invitationCount: z.number().int(),
})
export type ProjectContents = z.infer<typeof projectContentsSchema>
/*
 * GET /api/projects/[projectId]/archive → the whole project as a ZIP (lib/schemas/archive.ts).
 * POST /api/projects/import, such a ZIP as the body (at most 1 GB) → 201 projectSchema; 422 `bad-archive`, whose fields name
 * the entries at fault.
 */
/** PUT /api/projects/[projectId]/drive-train (editor) → 200 projectSchema. A new dated version is kept beside the old ones. */
export const driveTrainChangeSchema = z.object({ version, driveTrain: driveTrainSchema })

/** GET /api/projects/[projectId]/members. */
export const memberListSchema = z.object({
  members: z.array(z.object({ userId: id, displayName: z.string(), role: roleSchema, joinedAt: instant })),
})

/** GET, POST /api/projects/[projectId]/optics-presets (POST: editor); PATCH, DELETE …/optics-presets/[presetId]. */
export const opticsFieldsSchema = z.object({
  name,
  focalLengthMm: z.number().positive().max(100_000).nullable(),
  pixelSizeUm: z.number().positive().max(1000).nullable(),
  binning: z.number().int().min(1).max(16).nullable(),
  imageScaleArcsecPerPx: z.number().positive().max(1000),
  imageScaleUncertaintyPercent: z.number().min(0).max(100),
})
export const opticsPresetSchema = opticsFieldsSchema.extend({ id, version })
export const opticsPresetListSchema = z.object({ presets: z.array(opticsPresetSchema) })
export const opticsChangeSchema = opticsFieldsSchema.extend({ version })

// Runs ----------------------------------------------------------------------------------------------------------------

/**
 * POST /api/projects/[projectId]/runs?name=…&fileName=… (editor), the file itself as the body (application/octet-stream,
 * at most 64 MB, streamed): 201 runSchema with status 'uploaded'. 413 `too-large` with the limit in words.
 * PUT  …/runs/[runId]/import  importRunSchema: reads the stored file with these settings: 200 runSchema, 'ready';
 *      422 with the ImportFault's message, code, row and column.
 * GET  …/runs (lists.ts), …/runs/[runId], …/runs/[runId]/columns (packed columns as a gzip file),
 *      …/runs/[runId]/file (the original bytes). PATCH …/runs/[runId] changes name and facts. DELETE removes (editor).
 */
export const runSchema = z.object({
  id,
  version,
  projectId: id,
  name,
  fileName: z.string(),
  byteLength: z.number().int(),
  fileSha256: z.string().length(64),
  status: z.enum(['uploaded', 'ready']),
  importSettings: importSettingsSchema.nullable(),
  conversion: conversionSchema.nullable(),
  facts: runFactsSchema,
  rowCount: z.number().int().nullable(),
  samplesSha256: z.string().length(64).nullable(),
  analysisCount: z.number().int(),
  createdAt: instant,
  createdBy: z.string(),
  updatedAt: instant,
})
export type Run = z.infer<typeof runSchema>
export const importRunSchema = z.object({
  version,
  settings: importSettingsSchema,
  conversion: conversionSchema,
  facts: runFactsSchema,
})
export const runChangeSchema = z.object({ version, name, conversion: conversionSchema, facts: runFactsSchema })

// Analyses ------------------------------------------------------------------------------------------------------------

/**
 * GET, POST /api/projects/[projectId]/analyses (POST: editor; GET takes ?runId=), GET, PATCH, DELETE …/analyses/[analysisId].
 * The result is kept exactly as it was shown; samplesSha256 is the run's own, put there by the server.
 */
export const analysisResultSchema = z.looseObject({
  engineVersion: z.string(),
  rows: z.number().int(),
  used: z.number().int(),
})
export const newAnalysisSchema = z.object({ runId: id, name, recipe: recipeSchema, result: analysisResultSchema })
export const analysisSchema = z.object({
  id,
  version,
  projectId: id,
  runId: id,
  runName: z.string(),
  name,
  engineVersion: z.string(),
  samplesSha256: z.string(),
  /** Taken out of the result; null where it holds no worm figure. */
  wormPeriodSeconds: z.number().nullable(),
  wormPeriodStderrSeconds: z.number().nullable(),
  wormAmplitudeArcsec: z.number().nullable(),
  wormAmplitudeStderrArcsec: z.number().nullable(),
  peakToPeakArcsec: z.number().nullable(),
  peakToPeakStderrArcsec: z.number().nullable(),
  createdAt: instant,
  createdBy: z.string(),
  updatedAt: instant,
  recipe: recipeSchema,
  result: analysisResultSchema,
})
export type Analysis = z.infer<typeof analysisSchema>
/** A saved recipe or result never changes; a changed recipe is a new analysis. Only the name does. */
export const analysisChangeSchema = z.object({ version, name })

// Notes ---------------------------------------------------------------------------------------------------------------

/**
 * GET, POST …/analyses/[analysisId]/notes (POST: editor); PATCH, DELETE …/notes/[noteId] (its author or an owner);
 * PUT …/notes/[noteId]/resolution (editor): anyone who may edit may settle a note or take it up again.
 */
export const noteAnchorSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('whole') }),
  z.object({ kind: z.literal('time'), timeSeconds: z.number().finite() }),
  z.object({ kind: z.literal('period'), periodSeconds: z.number().positive() }),
  z.object({ kind: z.literal('worm-angle'), angleDegrees: z.number().min(0).lt(360) }),
])
const noteText = z.string().trim().min(1, { error: 'Write something first' }).max(4000)
/** Members whom the note names; each of them gets a mail the first time. Others are refused. */
const mentions = z.array(id).max(20, { error: 'At most 20 people can be named in one note' })
export const newNoteSchema = z.object({ anchor: noteAnchorSchema, text: noteText, mentions: mentions.default([]) })
export const noteSchema = z.object({
  id,
  version,
  analysisId: id,
  anchor: noteAnchorSchema,
  text: z.string(),
  mentions: z.array(z.object({ userId: id, displayName: z.string() })),
  authorId: id,
  authorName: z.string(),
  createdAt: instant,
  /** Later than createdAt once the text was changed, and by whom. */
  updatedAt: instant,
  updatedByName: z.string(),
  resolvedAt: instant.nullable(),
  resolvedByName: z.string().nullable(),
})
export type Note = z.infer<typeof noteSchema>
export const noteListSchema = z.object({ notes: z.array(noteSchema) })
export const noteChangeSchema = newNoteSchema.extend({ version })
export const noteResolutionSchema = z.object({ version, isResolved: z.boolean() })

// Correction tables ---------------------------------------------------------------------------------------------------

/**
 * GET, POST /api/projects/[projectId]/corrections (POST: editor), GET, DELETE …/corrections/[correctionId],
 * GET …/corrections/[correctionId]/download?format=csv|json. 409 `correction-was-on` where the run was recorded with a
 * correction playing or not known to be without: such a run gives an addition to the table that was in, `kind: 'addition'`.
 */
export const newCorrectionSchema = z.object({
  analysisId: id,
  name,
  kind: z.enum(['stand-alone', 'addition']),
  /** Set once the person has confirmed that the sense is only assumed. */
  isAssumedSenseConfirmed: z.boolean(),
})
export const correctionSchema = z.object({
  id,
  version,
  projectId: id,
  analysisId: id,
  analysisName: z.string(),
  name,
  kind: z.enum(['stand-alone', 'addition']),
  settings: tableSettingsSchema,
  /** TableResult of lib/analysis/types.ts, as computed from the analysis's result. */
  table: z.looseObject({
    bins: z.array(z.object({ index: z.number().int(), angleDegrees: z.number(), value: z.number() })),
    wormPeriodSeconds: z.number(),
    originTimeSeconds: z.number(),
    closureError: z.number(),
  }),
  senseBasis: z.enum(['proven', 'assumed']),
  createdAt: instant,
  createdBy: z.string(),
})
export type Correction = z.infer<typeof correctionSchema>

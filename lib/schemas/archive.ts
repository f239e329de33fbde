import { z } from 'zod'
import { fullAnalysisResultSchema, tableResultSchema } from './analysis-result'
import { noteAnchorSchema, opticsFieldsSchema } from './api'
import { importSettingsSchema } from './import'
import { conversionSchema, driveTrainSchema, recipeSchema } from './recipe'
import { runFactsSchema } from './run-facts'

/*
 * A whole project as files, version 1. Things name each other by their paths in the archive, people by the names they are
 * known by; there are no database ids. A change that an older reader would misread raises the version.
 */

export const ARCHIVE_FORMAT = 'turnwright-project'
export const ARCHIVE_VERSION = 1

/** Largest archive that is brought in: 1 GB of 1024³ bytes. */
export const MAX_ARCHIVE_BYTES = 1024 * 1024 * 1024

const instant = z.iso.datetime()
const sha256 = z.string().regex(/^[0-9a-f]{64}$/)
const name = z.string().min(1).max(120)
const who = z.string().min(1).max(80)
const path = z.string().min(1).max(400)
/** How often a thing was saved; a change names the one that it was made from. */
const version = z.number().int().min(1).max(2_000_000_000)
const $schema = z.string().max(200)

export const archiveManifestSchema = z.strictObject({
  $schema,
  format: z.literal(ARCHIVE_FORMAT),
  version: z.literal(ARCHIVE_VERSION),
  exportedAt: instant,
  madeBy: z.strictObject({ name: z.string().max(80), version: z.string().max(40), engineVersion: z.string().max(40) }),
  /** Every other file of the archive, in the order in which it is read again. */
  files: z.array(z.strictObject({ path, byteLength: z.number().int().min(0), sha256 })),
})

/** As much of a manifest as every version has: enough to say which version made it. */
export const anyManifestSchema = z.looseObject({
  format: z.literal(ARCHIVE_FORMAT),
  version: z.number().int(),
  madeBy: z.looseObject({ name: z.string().max(80), version: z.string().max(40) }).optional(),
})

export const archiveProjectSchema = z.strictObject({
  $schema,
  name,
  version,
  createdAt: instant,
  updatedAt: instant,
  /** Every drive train that held, oldest first; the last one holds. */
  driveTrains: z
    .array(driveTrainSchema.extend({ createdAt: instant, createdBy: who }))
    .min(1)
    .max(100_000),
  opticsPresets: z
    .array(opticsFieldsSchema.extend({ name, version, createdAt: instant, updatedAt: instant }))
    .max(100_000),
  lastImport: z.object({ settings: importSettingsSchema, conversion: conversionSchema }).nullable(),
})
export type ArchiveProject = z.infer<typeof archiveProjectSchema>

export const archiveRunSchema = z
  .strictObject({
    $schema,
    name,
    version,
    /** The file as it was brought in; its own name may hold what a path can't. */
    file: z.strictObject({
      path,
      name: z.string().min(1).max(255),
      byteLength: z.number().int().min(1).max(67_108_864),
      sha256,
    }),
    status: z.enum(['uploaded', 'ready']),
    importSettings: importSettingsSchema.nullable(),
    conversion: conversionSchema.nullable(),
    facts: runFactsSchema,
    /** Rows that were read, and the hash of their packed columns; null before the file was read. */
    rowCount: z.number().int().min(1).max(100_000_000).nullable(),
    samplesSha256: sha256.nullable(),
    createdAt: instant,
    createdBy: who,
    updatedAt: instant,
  })
  .refine(
    (run) =>
      (run.status === 'ready') ===
      ![run.importSettings, run.conversion, run.rowCount, run.samplesSha256].includes(null),
    { error: 'A run that was read has settings, conversion, row count and samples; another lacks some of them' },
  )
export type ArchiveRun = z.infer<typeof archiveRunSchema>

export const archiveAnalysisSchema = z.strictObject({
  $schema,
  name,
  version,
  /** The folder of the run that it is of. */
  run: path,
  samplesSha256: sha256,
  recipe: recipeSchema,
  result: fullAnalysisResultSchema.loose(),
  resultVersion: version,
  createdAt: instant,
  createdBy: who,
  updatedAt: instant,
})
export type ArchiveAnalysis = z.infer<typeof archiveAnalysisSchema>

const archiveNoteSchema = z
  .strictObject({
    version,
    anchor: noteAnchorSchema,
    text: z.string().min(1).max(4000),
    createdAt: instant,
    createdBy: who,
    updatedAt: instant,
    updatedBy: who,
    resolvedAt: instant.nullable(),
    resolvedBy: who.nullable(),
  })
  .refine((note) => (note.resolvedAt === null) === (note.resolvedBy === null), {
    error: 'A settled note says when and by whom',
  })
export type ArchiveNote = z.infer<typeof archiveNoteSchema>
export const archiveNotesSchema = z.strictObject({ $schema, notes: z.array(archiveNoteSchema) })

export const archiveCorrectionSchema = z.strictObject({
  $schema,
  name,
  version,
  /** The folder of the analysis that it was made from. */
  analysis: path,
  kind: z.enum(['stand-alone', 'addition']),
  senseBasis: z.enum(['proven', 'assumed']),
  table: tableResultSchema.loose(),
  createdAt: instant,
  createdBy: who,
})
export type ArchiveCorrection = z.infer<typeof archiveCorrectionSchema>

export const archiveTrailSchema = z.strictObject({
  $schema,
  events: z.array(
    z.strictObject({
      at: instant,
      actor: z.string().min(1).max(200),
      action: z
        .string()
        .regex(/^[a-z-]+[.][a-z-]+$/)
        .max(80),
      subject: z.string().max(1000),
    }),
  ),
})

/** The JSON files of an archive by the name of their schema: `schemas/run.schema.json` describes each `run.json`. */
export const ARCHIVE_SCHEMAS = {
  manifest: archiveManifestSchema,
  project: archiveProjectSchema,
  run: archiveRunSchema,
  analysis: archiveAnalysisSchema,
  notes: archiveNotesSchema,
  correction: archiveCorrectionSchema,
  trail: archiveTrailSchema,
} as const
export type ArchiveSchemaName = keyof typeof ARCHIVE_SCHEMAS

/** The name that a JSON file gives as its `$schema`; schemas/ holds the file with this `$id`. */
export function archiveSchemaId(schema: ArchiveSchemaName): string {
  return `urn:turnwright:project-archive:${ARCHIVE_VERSION}:${schema}`
}

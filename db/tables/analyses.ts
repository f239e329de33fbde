import type { Generated } from 'kysely'
import type { z } from 'zod'
import type { Recipe, TableSettings } from '@/lib/analysis/types'
import type { analysisResultSchema, correctionSchema } from '@/lib/schemas/api'
import type { Json } from './projects'

/** A saved recipe and what it gave; only the name may change afterwards. */
export interface AnalysesTable {
  id: Generated<string>
  projectId: string
  runId: string
  version: Generated<number>
  name: string
  engineVersion: string
  samplesSha256: string
  recipe: Json<Recipe>
  result: Json<z.infer<typeof analysisResultSchema>>
  resultVersion: Generated<number>
  /** Taken out of the result for lists; null where it holds no worm figure. */
  wormPeriodSeconds: number | null
  wormAmplitudeArcsec: number | null
  wormPeriodStderrSeconds: number | null
  wormAmplitudeStderrArcsec: number | null
  peakToPeakArcsec: number | null
  peakToPeakStderrArcsec: number | null
  /** Who made it where it was brought in from, if not here. */
  authorName: string | null
  createdAt: Generated<Date>
  createdBy: string
  updatedAt: Generated<Date>
  updatedBy: string
}

export interface NotesTable {
  id: Generated<string>
  analysisId: string
  version: Generated<number>
  anchorKind: 'whole' | 'time' | 'period' | 'worm-angle'
  /** Seconds, seconds or degrees after the kind; null for the whole. */
  anchorValue: number | null
  text: string
  authorId: string
  /** Who wrote it where it was brought in from, if not here. */
  authorName: string | null
  createdAt: Generated<Date>
  updatedAt: Generated<Date>
  updatedBy: string
  /** Who changed it last where it was brought in from, until somebody changes it here. */
  updatedByName: string | null
  resolvedAt: Date | null
  resolvedBy: string | null
  /** Who settled it where it was brought in from, until somebody does so here. */
  resolvedByName: string | null
}

export interface NoteMentionsTable {
  noteId: string
  userId: string
}

export interface CorrectionsTable {
  id: Generated<string>
  projectId: string
  analysisId: string
  version: Generated<number>
  name: string
  kind: 'stand-alone' | 'addition'
  settings: Json<TableSettings>
  tableResult: Json<z.infer<typeof correctionSchema>['table']>
  senseBasis: 'proven' | 'assumed'
  createdAt: Generated<Date>
  createdBy: string
  authorName: string | null
}

/** A read-only report of one analysis for whoever holds the link. */
export interface ShareLinksTable {
  id: Generated<string>
  version: Generated<number>
  projectId: string
  analysisId: string
  /** 256 random bits, base64url. Readable: the table lies beside the analysis that it opens. */
  token: string
  /** What its maker tells the reader first. */
  preface: string | null
  createdAt: Generated<Date>
  createdBy: string
  /** Null: until it is revoked. */
  expiresAt: Date | null
  revokedAt: Date | null
  revokedBy: string | null
  openedCount: Generated<number>
  lastOpenedAt: Date | null
}

/** The notes that a share link shows. */
export interface ShareLinkNotesTable {
  shareLinkId: string
  noteId: string
}

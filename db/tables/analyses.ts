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
  peakToPeakArcsec: number | null
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
  createdAt: Generated<Date>
  updatedAt: Generated<Date>
  updatedBy: string
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
}

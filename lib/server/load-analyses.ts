import 'server-only'
import { database } from '@/db'
import type { ProjectAccess } from '@/db/queries/access'
import { findAnalysis } from '@/db/queries/analyses'
import { findCorrection } from '@/db/queries/corrections'
import { listAnalyses, listHistory } from '@/db/queries/list-analyses'
import { listCorrections } from '@/db/queries/list-corrections'
import { listNotes } from '@/db/queries/notes'
import { analysisSchema, correctionSchema, noteListSchema } from '@/lib/schemas/api'
import {
  analysisListSchema,
  correctionListSchema,
  historySchema,
  type AnalysisQuery,
  type CorrectionQuery,
} from '@/lib/schemas/lists'
import { plain } from './plain'

export async function loadAnalyses(access: ProjectAccess, query: AnalysisQuery) {
  return plain(analysisListSchema, await listAnalyses(database(), access, query))
}

export async function loadHistory(access: ProjectAccess) {
  return plain(historySchema, await listHistory(database(), access))
}

export async function loadAnalysis(access: ProjectAccess, analysisId: string) {
  return plain(analysisSchema, await findAnalysis(database(), access, analysisId))
}

export async function loadNotes(access: ProjectAccess, analysisId: string) {
  return plain(noteListSchema.shape.notes, await listNotes(database(), access, analysisId))
}

export async function loadCorrections(access: ProjectAccess, query: CorrectionQuery) {
  return plain(correctionListSchema, await listCorrections(database(), access, query))
}

export async function loadCorrection(access: ProjectAccess, correctionId: string) {
  return plain(correctionSchema, await findCorrection(database(), access, correctionId))
}

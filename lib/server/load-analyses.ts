import 'server-only'
import { database } from '@/db'
import type { ProjectAccess } from '@/db/queries/access'
import { findAnalysis, listAnalyses } from '@/db/queries/analyses'
import { findCorrection, listCorrections } from '@/db/queries/corrections'
import { listNotes } from '@/db/queries/notes'
import type { PageRequest } from '@/db/queries/page'
import {
  analysisListSchema,
  analysisSchema,
  correctionListSchema,
  correctionSchema,
  noteListSchema,
} from '@/lib/schemas/api'
import { plain } from './plain'

export async function loadAnalyses(access: ProjectAccess, page: PageRequest & { runId?: string }) {
  return plain(analysisListSchema, await listAnalyses(database(), access, page))
}

export async function loadAnalysis(access: ProjectAccess, analysisId: string) {
  return plain(analysisSchema, await findAnalysis(database(), access, analysisId))
}

export async function loadNotes(access: ProjectAccess, analysisId: string) {
  return plain(noteListSchema.shape.notes, await listNotes(database(), access, analysisId))
}

export async function loadCorrections(access: ProjectAccess, page: PageRequest) {
  return plain(correctionListSchema, await listCorrections(database(), access, page))
}

export async function loadCorrection(access: ProjectAccess, correctionId: string) {
  return plain(correctionSchema, await findCorrection(database(), access, correctionId))
}

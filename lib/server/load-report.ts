import 'server-only'
import { fullAnalysisResultSchema } from '@/lib/schemas/analysis-result'
import type { ProjectAccess } from '@/db/queries/access'
import { sharedAnalysisSchema } from '@/lib/schemas/share'
import { loadAnalysis, loadNotes } from './load-analyses'
import { loadRun } from './load-runs'
import { plain } from './plain'

/** A saved analysis as its members read and print it: what a share link would show, with every note. */
export async function loadReportSubject(access: ProjectAccess, analysisId: string) {
  const [analysis, notes] = await Promise.all([loadAnalysis(access, analysisId), loadNotes(access, analysisId)])
  const run = await loadRun(access, analysis.runId)
  const subject = plain(sharedAnalysisSchema, {
    ...analysis,
    kind: 'analysis',
    savedAt: analysis.createdAt,
    // Null where it was kept by a version with other figures.
    result: fullAnalysisResultSchema.safeParse(analysis.result).data ?? null,
    run: { ...run, hasSameSamples: run.samplesSha256 === analysis.samplesSha256 },
    notes: notes.map((note) => ({ ...note, isSettled: note.resolvedAt !== null })),
  })
  return { subject, runId: run.id }
}

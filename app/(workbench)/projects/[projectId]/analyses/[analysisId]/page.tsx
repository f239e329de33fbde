import type { Metadata } from 'next'
import { RunBench } from '@/components/workspace/run-bench'
import { fullAnalysisResultSchema } from '@/lib/schemas/analysis-result'
import { assertAddressId, orNotFound, requireProjectPage } from '@/lib/server/current-user'
import { loadAnalysis } from '@/lib/server/load-analyses'
import { loadProject } from '@/lib/server/load-projects'
import { loadRun } from '@/lib/server/load-runs'

export const metadata: Metadata = { title: 'Analysis' }

export default async function AnalysisPage({ params }: PageProps<'/projects/[projectId]/analyses/[analysisId]'>) {
  const { projectId, analysisId } = await params
  const { access } = await requireProjectPage(projectId, `/projects/${projectId}/analyses/${analysisId}`)
  assertAddressId(analysisId)
  const [project, analysis] = await Promise.all([loadProject(access), orNotFound(loadAnalysis(access, analysisId))])
  const run = await loadRun(access, analysis.runId)
  // A result kept by a version with other figures is still listed; the bench then shows what it computes itself.
  const saved = fullAnalysisResultSchema.safeParse(analysis.result)
  return (
    <RunBench project={project} run={run} userId={access.userId} analysis={analysis} savedResult={saved.data ?? null} />
  )
}

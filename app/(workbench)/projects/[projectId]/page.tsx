import { OverviewScreen } from '@/components/projects/overview-screen'
import { SwrFallback } from '@/components/shell/swr-fallback'
import { projectHistory } from '@/lib/findings/project-history'
import { requireProjectPage } from '@/lib/server/current-user'
import { loadAnalyses, loadAnalysis } from '@/lib/server/load-analyses'
import { loadMembers } from '@/lib/server/load-projects'
import { loadRuns } from '@/lib/server/load-runs'
import { everyPage } from './every-page'

export default async function OverviewPage({ params }: PageProps<'/projects/[projectId]'>) {
  const { projectId } = await params
  const { access } = await requireProjectPage(projectId)
  const [runs, analyses, members] = await Promise.all([
    everyPage(
      (page) => loadRuns(access, page),
      (page) => page.runs,
    ),
    everyPage(
      (page) => loadAnalyses(access, page),
      (page) => page.analyses,
    ),
    loadMembers(access),
  ])
  const base = `/api/projects/${projectId}`
  const last = runs && analyses ? projectHistory(analyses, runs).at(-1) : undefined
  const fallback = {
    [`${base}/runs`]: runs,
    [`${base}/analyses`]: analyses,
    [`${base}/members`]: { members },
    ...(last ? { [`${base}/analyses/${last.analysisId}`]: await loadAnalysis(access, last.analysisId) } : {}),
  }
  return (
    <SwrFallback fallback={fallback}>
      <OverviewScreen projectId={projectId} />
    </SwrFallback>
  )
}

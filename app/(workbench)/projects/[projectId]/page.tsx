import { OverviewScreen } from '@/components/projects/overview-screen'
import { SwrFallback } from '@/components/shell/swr-fallback'
import { LATEST_RUNS, latestRunsKey } from '@/lib/client/list-keys'
import { requireProjectPage } from '@/lib/server/current-user'
import { loadAnalysis, loadHistory } from '@/lib/server/load-analyses'
import { loadMembers } from '@/lib/server/load-projects'
import { loadRuns } from '@/lib/server/load-runs'
import { unlessUnreadable } from '@/lib/server/plain'

export default async function OverviewPage({ params }: PageProps<'/projects/[projectId]'>) {
  const { projectId } = await params
  const { access } = await requireProjectPage(projectId)
  const [runs, history, members] = await Promise.all([
    loadRuns(access, LATEST_RUNS),
    loadHistory(access),
    loadMembers(access),
  ])
  const base = `/api/projects/${projectId}`
  const last = history.points.at(-1)
  const fallback = {
    [latestRunsKey(projectId)]: runs,
    [`${base}/history`]: history,
    [`${base}/members`]: { members },
    // Its figures head the page; the page stands without them.
    ...(last
      ? { [`${base}/analyses/${last.analysisId}`]: await unlessUnreadable(loadAnalysis(access, last.analysisId)) }
      : {}),
  }
  return (
    <SwrFallback fallback={fallback}>
      <OverviewScreen projectId={projectId} />
    </SwrFallback>
  )
}

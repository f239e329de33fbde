import type { Metadata } from 'next'
import { RunsScreen } from '@/components/lists/runs-screen'
import { SwrFallback } from '@/components/shell/swr-fallback'
import { requireProjectPage } from '@/lib/server/current-user'
import { loadRuns } from '@/lib/server/load-runs'
import { everyPage } from '../every-page'

export const metadata: Metadata = { title: 'Runs' }

export default async function RunsPage({ params }: PageProps<'/projects/[projectId]/runs'>) {
  const { projectId } = await params
  const { access } = await requireProjectPage(projectId, `/projects/${projectId}/runs`)
  const runs = await everyPage(
    (page) => loadRuns(access, page),
    (page) => page.runs,
  )
  return (
    <SwrFallback fallback={{ [`/api/projects/${projectId}/runs`]: runs }}>
      <RunsScreen projectId={projectId} />
    </SwrFallback>
  )
}

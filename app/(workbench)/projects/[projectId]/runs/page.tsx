import type { Metadata } from 'next'
import { RunsScreen } from '@/components/lists/runs-screen'
import { SwrFallback } from '@/components/shell/swr-fallback'
import { inZone, lenientQuery, listSearch, runQuerySchema } from '@/lib/schemas/lists'
import { requireProjectPage } from '@/lib/server/current-user'
import { firstView } from '@/lib/server/first-view'
import { loadRuns } from '@/lib/server/load-runs'

export const metadata: Metadata = { title: 'Runs' }

export default async function RunsPage({ params, searchParams }: PageProps<'/projects/[projectId]/runs'>) {
  const { projectId } = await params
  const { access, user } = await requireProjectPage(projectId, `/projects/${projectId}/runs`)
  const query = inZone(lenientQuery(runQuerySchema, await searchParams), user.preferences.timeZone ?? 'UTC')
  const list = await firstView(loadRuns(access, query))
  return (
    <SwrFallback fallback={{ [`/api/projects/${projectId}/runs${listSearch(runQuerySchema, query)}`]: list }}>
      <RunsScreen projectId={projectId} />
    </SwrFallback>
  )
}

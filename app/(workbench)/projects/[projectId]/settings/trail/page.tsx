import type { Metadata } from 'next'
import { TrailScreen } from '@/components/lists/trail-screen'
import { SwrFallback } from '@/components/shell/swr-fallback'
import { auditQuerySchema, inZone, lenientQuery, listSearch } from '@/lib/schemas/lists'
import { requireProjectPage } from '@/lib/server/current-user'
import { firstView } from '@/lib/server/first-view'
import { loadAuditEvents, loadMembers } from '@/lib/server/load-projects'

export const metadata: Metadata = { title: 'Who did what' }

export default async function TrailPage({ params, searchParams }: PageProps<'/projects/[projectId]/settings/trail'>) {
  const { projectId } = await params
  const { access, user } = await requireProjectPage(projectId, `/projects/${projectId}/settings/trail`)
  const query = inZone(lenientQuery(auditQuerySchema, await searchParams), user.preferences.timeZone ?? 'UTC')
  const [list, members] = await Promise.all([firstView(loadAuditEvents(access, query)), loadMembers(access)])
  const base = `/api/projects/${projectId}`
  const fallback = {
    [`${base}/audit-events${listSearch(auditQuerySchema, query)}`]: list,
    [`${base}/members`]: { members },
  }
  return (
    <SwrFallback fallback={fallback}>
      <TrailScreen projectId={projectId} />
    </SwrFallback>
  )
}

import type { Metadata } from 'next'
import { PeopleScreen } from '@/components/people/people-screen'
import { SwrFallback } from '@/components/shell/swr-fallback'
import { requireProjectPage } from '@/lib/server/current-user'
import { loadMembers } from '@/lib/server/load-projects'

export const metadata: Metadata = { title: 'People' }

export default async function PeoplePage({ params }: PageProps<'/projects/[projectId]/people'>) {
  const { projectId } = await params
  const { access } = await requireProjectPage(projectId, `/projects/${projectId}/people`)
  const members = await loadMembers(access)
  return (
    <SwrFallback fallback={{ [`/api/projects/${projectId}/members`]: { members } }}>
      <PeopleScreen projectId={projectId} />
    </SwrFallback>
  )
}

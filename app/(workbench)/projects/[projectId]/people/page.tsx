import type { Metadata } from 'next'
import { PeopleScreen } from '@/components/people/people-screen'
import { SwrFallback } from '@/components/shell/swr-fallback'
import { requireProjectPage } from '@/lib/server/current-user'
import { isManaging, loadInvitations } from '@/lib/server/load-people'
import { loadMembers } from '@/lib/server/load-projects'

export const metadata: Metadata = { title: 'People' }

export default async function PeoplePage({ params }: PageProps<'/projects/[projectId]/people'>) {
  const { projectId } = await params
  const { access, user } = await requireProjectPage(projectId, `/projects/${projectId}/people`)
  const [members, invitations] = await Promise.all([
    loadMembers(access),
    isManaging(access) ? loadInvitations(access) : undefined,
  ])
  const url = `/api/projects/${projectId}`
  return (
    <SwrFallback
      fallback={{ [`${url}/members`]: { members }, ...(invitations && { [`${url}/invitations`]: { invitations } }) }}
    >
      <PeopleScreen projectId={projectId} userId={user.id} />
    </SwrFallback>
  )
}

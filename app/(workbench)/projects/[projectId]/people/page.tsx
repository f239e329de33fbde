import type { Metadata } from 'next'
import { PeopleScreen } from '@/components/people/people-screen'
import { requireProjectPage } from '@/lib/server/current-user'

export const metadata: Metadata = { title: 'People' }

export default async function PeoplePage({ params }: PageProps<'/projects/[projectId]/people'>) {
  const { projectId } = await params
  await requireProjectPage(projectId, `/projects/${projectId}/people`)
  return <PeopleScreen projectId={projectId} />
}

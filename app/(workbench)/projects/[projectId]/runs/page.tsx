import type { Metadata } from 'next'
import { RunsScreen } from '@/components/lists/runs-screen'
import { requireProjectPage } from '@/lib/server/current-user'

export const metadata: Metadata = { title: 'Runs' }

export default async function RunsPage({ params }: PageProps<'/projects/[projectId]/runs'>) {
  const { projectId } = await params
  await requireProjectPage(projectId, `/projects/${projectId}/runs`)
  return <RunsScreen projectId={projectId} />
}

import { OverviewScreen } from '@/components/projects/overview-screen'
import { requireProjectPage } from '@/lib/server/current-user'

export default async function OverviewPage({ params }: PageProps<'/projects/[projectId]'>) {
  const { projectId } = await params
  await requireProjectPage(projectId)
  return <OverviewScreen projectId={projectId} />
}

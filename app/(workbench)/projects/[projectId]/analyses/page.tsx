import type { Metadata } from 'next'
import { AnalysesScreen } from '@/components/lists/analyses-screen'
import { requireProjectPage } from '@/lib/server/current-user'

export const metadata: Metadata = { title: 'Analyses' }

export default async function AnalysesPage({ params }: PageProps<'/projects/[projectId]/analyses'>) {
  const { projectId } = await params
  await requireProjectPage(projectId, `/projects/${projectId}/analyses`)
  return <AnalysesScreen projectId={projectId} />
}

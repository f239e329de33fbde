import type { Metadata } from 'next'
import { CorrectionsScreen } from '@/components/lists/corrections-screen'
import { requireProjectPage } from '@/lib/server/current-user'

export const metadata: Metadata = { title: 'Corrections' }

export default async function CorrectionsPage({ params }: PageProps<'/projects/[projectId]/corrections'>) {
  const { projectId } = await params
  await requireProjectPage(projectId, `/projects/${projectId}/corrections`)
  return <CorrectionsScreen projectId={projectId} />
}

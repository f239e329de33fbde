import type { Metadata } from 'next'
import { CorrectionScreen } from '@/components/corrections/correction-screen'
import { requireProjectPage } from '@/lib/server/current-user'

export const metadata: Metadata = { title: 'Correction table' }

export default async function CorrectionPage({
  params,
}: PageProps<'/projects/[projectId]/corrections/[correctionId]'>) {
  const { projectId, correctionId } = await params
  await requireProjectPage(projectId, `/projects/${projectId}/corrections/${correctionId}`)
  return <CorrectionScreen projectId={projectId} correctionId={correctionId} />
}

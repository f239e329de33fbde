import type { Metadata } from 'next'
import { DriveScreen } from '@/components/projects/drive-screen'
import { requireProjectPage } from '@/lib/server/current-user'

export const metadata: Metadata = { title: 'Drive train' }

export default async function DrivePage({ params }: PageProps<'/projects/[projectId]/drive'>) {
  const { projectId } = await params
  await requireProjectPage(projectId, `/projects/${projectId}/drive`)
  return <DriveScreen projectId={projectId} />
}

import type { Metadata } from 'next'
import { SettingsScreen } from '@/components/settings/settings-screen'
import { requireProjectPage } from '@/lib/server/current-user'

export const metadata: Metadata = { title: 'Settings' }

export default async function SettingsPage({ params }: PageProps<'/projects/[projectId]/settings'>) {
  const { projectId } = await params
  await requireProjectPage(projectId, `/projects/${projectId}/settings`)
  return <SettingsScreen projectId={projectId} />
}

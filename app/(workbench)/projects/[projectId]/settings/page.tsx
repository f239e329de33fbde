import type { Metadata } from 'next'
import { SettingsScreen } from '@/components/settings/settings-screen'
import { SwrFallback } from '@/components/shell/swr-fallback'
import { requireProjectPage } from '@/lib/server/current-user'
import { loadOpticsPresets } from '@/lib/server/load-projects'

export const metadata: Metadata = { title: 'Settings' }

export default async function SettingsPage({ params }: PageProps<'/projects/[projectId]/settings'>) {
  const { projectId } = await params
  const { access } = await requireProjectPage(projectId, `/projects/${projectId}/settings`)
  const presets = await loadOpticsPresets(access)
  return (
    <SwrFallback fallback={{ [`/api/projects/${projectId}/optics-presets`]: { presets } }}>
      <SettingsScreen projectId={projectId} />
    </SwrFallback>
  )
}

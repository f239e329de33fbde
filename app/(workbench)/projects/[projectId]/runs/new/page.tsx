import type { Metadata } from 'next'
import { RunUpload } from '@/components/workspace/run-upload'
import { requireProjectPage } from '@/lib/server/current-user'
import { loadOpticsPresets, loadProject } from '@/lib/server/load-projects'

export const metadata: Metadata = { title: 'New run' }

export default async function NewRunPage({ params }: PageProps<'/projects/[projectId]/runs/new'>) {
  const { projectId } = await params
  const { access } = await requireProjectPage(projectId, `/projects/${projectId}/runs/new`)
  const [project, presets] = await Promise.all([loadProject(access), loadOpticsPresets(access)])
  return <RunUpload project={project} presets={presets} />
}

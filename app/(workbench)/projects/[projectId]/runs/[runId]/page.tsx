import type { Metadata } from 'next'
import { RunScreen } from '@/components/workspace/run-screen'
import { assertAddressId, orNotFound, requireProjectPage } from '@/lib/server/current-user'
import { loadProject } from '@/lib/server/load-projects'
import { loadRun } from '@/lib/server/load-runs'

export const metadata: Metadata = { title: 'Run' }

export default async function RunPage({ params }: PageProps<'/projects/[projectId]/runs/[runId]'>) {
  const { projectId, runId } = await params
  const { access } = await requireProjectPage(projectId, `/projects/${projectId}/runs/${runId}`)
  assertAddressId(runId)
  const [project, run] = await Promise.all([loadProject(access), orNotFound(loadRun(access, runId))])
  return <RunScreen project={project} run={run} userId={access.userId} />
}

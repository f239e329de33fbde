import type { Metadata } from 'next'
import { PageHeading } from '@/components/shell/page-heading'
import { ButtonLink } from '@/components/ui/button'
import { EmptyState } from '@/components/ui/empty-state'
import { RunUpload } from '@/components/workspace/run-upload'
import { canEditProject } from '@/lib/schemas/rights'
import { requireProjectPage } from '@/lib/server/current-user'
import { loadOpticsPresets, loadProject } from '@/lib/server/load-projects'

export const metadata: Metadata = { title: 'New run' }

export default async function NewRunPage({ params }: PageProps<'/projects/[projectId]/runs/new'>) {
  const { projectId } = await params
  const { access } = await requireProjectPage(projectId, `/projects/${projectId}/runs/new`)
  const [project, presets] = await Promise.all([loadProject(access), loadOpticsPresets(access)])
  if (!canEditProject(project)) {
    const root = `/projects/${projectId}`
    return (
      <>
        <PageHeading
          crumbs={[{ label: project.name, href: root }, { label: 'Runs', href: `${root}/runs` }, { label: 'New' }]}
          title="No run can be brought in here"
        />
        <EmptyState
          title={project.archivedAt ? 'The project is archived' : 'You can read this project'}
          actions={<ButtonLink href={`${root}/runs`}>To the runs</ButtonLink>}
        >
          {project.archivedAt
            ? 'Nothing in it changes until an owner opens it again.'
            : 'Its owners and editors bring in runs. Try your recording on the bench, which keeps nothing.'}
        </EmptyState>
      </>
    )
  }
  return <RunUpload project={project} presets={presets} />
}

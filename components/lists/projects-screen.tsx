'use client'

import Link from 'next/link'
import { wormPeriodText } from '@/components/projects/teeth'
import { PageHeading } from '@/components/shell/page-heading'
import { ButtonLink } from '@/components/ui/button'
import { DataState } from '@/components/ui/data-state'
import { DataTable } from '@/components/ui/data-table'
import type { DataColumn } from '@/components/ui/data-table-model'
import { EmptyState } from '@/components/ui/empty-state'
import { formatDay } from '@/lib/client/dates'
import { useProjects } from '@/lib/client/project-data'
import { findingText } from '@/lib/findings/finding'
import { projectsFinding } from '@/lib/findings/list-findings'
import type { Project } from '@/lib/schemas/api'

const columns: readonly DataColumn<Project>[] = [
  {
    id: 'name',
    header: 'Mount',
    value: ({ name }) => name,
    cell: ({ id, name, archivedAt }) => (
      <Link className="link font-semibold" href={`/projects/${id}`}>
        {name}
        {archivedAt ? <span className="font-normal text-soft"> (archived)</span> : null}
      </Link>
    ),
  },
  {
    id: 'period',
    header: 'Worm period',
    isNumeric: true,
    value: ({ driveTrain }) => driveTrain.wheelTeeth,
    cell: ({ driveTrain }) => wormPeriodText(driveTrain.wheelTeeth, driveTrain.wormStarts),
  },
  { id: 'runs', header: 'Runs', isNumeric: true, value: ({ runCount }) => runCount },
  {
    id: 'analyses',
    header: 'Analyses',
    isNumeric: true,
    isSecondary: true,
    value: ({ analysisCount }) => analysisCount,
  },
  { id: 'people', header: 'People', isNumeric: true, isSecondary: true, value: ({ memberCount }) => memberCount },
  { id: 'role', header: 'You are', isSecondary: true, value: ({ role }) => role },
  {
    id: 'changed',
    header: 'Changed',
    isSecondary: true,
    value: ({ updatedAt }) => updatedAt,
    cell: ({ updatedAt }) => formatDay(updatedAt),
  },
]

export function ProjectsScreen() {
  const { data, error, mutate } = useProjects()
  return (
    <DataState what="your projects" data={data} error={error} onRetry={() => void mutate()}>
      {({ projects }) => (
        <>
          <PageHeading
            title={findingText(projectsFinding(projects))}
            actions={
              <>
                <ButtonLink href="/projects/import">Bring in an archive</ButtonLink>
                <ButtonLink href="/projects/new" variant="primary">
                  New project
                </ButtonLink>
              </>
            }
          />
          {projects.length === 0 ? (
            <EmptyState
              title="Start with your mount"
              actions={
                <>
                  <ButtonLink href="/projects/new" variant="primary">
                    Make a project
                  </ButtonLink>
                  <ButtonLink href="/bench">Try the bench first</ButtonLink>
                </>
              }
            >
              A project keeps one mount’s recordings, what was found in them, and the correction tables made from them.
              Give it a name and, if you know it, the number of teeth of the worm wheel.
            </EmptyState>
          ) : (
            <DataTable
              caption="projects"
              columns={columns}
              rows={projects}
              rowId={({ id }) => id}
              initialSort={{ id: 'changed', desc: true }}
            />
          )}
        </>
      )}
    </DataState>
  )
}

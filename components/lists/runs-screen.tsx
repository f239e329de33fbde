'use client'

import Link from 'next/link'
import { PageHeading } from '@/components/shell/page-heading'
import { ButtonLink } from '@/components/ui/button'
import { DataState } from '@/components/ui/data-state'
import { DataTable } from '@/components/ui/data-table'
import type { DataColumn } from '@/components/ui/data-table-model'
import { EmptyState } from '@/components/ui/empty-state'
import { formatDayAndTime } from '@/lib/client/dates'
import { useProject, useRuns, type RunRow } from '@/lib/client/project-data'
import { findingText } from '@/lib/findings/finding'
import { runsFinding } from '@/lib/findings/list-findings'
import { canEditProject } from '@/lib/schemas/rights'
import { formatBytes, formatCount } from '@/lib/units'

const columns: readonly DataColumn<RunRow>[] = [
  {
    id: 'name',
    header: 'Run',
    value: ({ name }) => name,
    cell: ({ id, projectId, name, status }) => (
      <>
        <Link className="link font-semibold" href={`/projects/${projectId}/runs/${id}`}>
          {name}
        </Link>
        {status === 'uploaded' ? <span className="ml-2 text-sm text-oxide">not read yet</span> : null}
      </>
    ),
  },
  {
    id: 'started',
    header: 'Recorded, UTC',
    value: ({ facts, createdAt }) => facts.startedAt ?? createdAt,
    cell: ({ facts }) => (facts.startedAt ? formatDayAndTime(facts.startedAt) : 'time unknown'),
  },
  {
    id: 'rows',
    header: 'Rows',
    isNumeric: true,
    isSecondary: true,
    value: ({ rowCount }) => rowCount,
    cell: ({ rowCount }) => (rowCount === null ? '–' : formatCount(rowCount)),
  },
  {
    id: 'correction',
    header: 'Correction in the mount',
    isSecondary: true,
    value: ({ facts }) => facts.mountCorrection,
  },
  {
    id: 'sense',
    header: 'Sense',
    isSecondary: true,
    value: ({ conversion }) => conversion?.senseBasis ?? null,
  },
  {
    id: 'analyses',
    header: 'Analyses',
    isNumeric: true,
    isSecondary: true,
    value: ({ analysisCount }) => analysisCount,
  },
  {
    id: 'size',
    header: 'File',
    isNumeric: true,
    isSecondary: true,
    value: ({ byteLength }) => byteLength,
    cell: ({ byteLength }) => formatBytes(byteLength),
  },
  { id: 'by', header: 'Brought in by', isSecondary: true, value: ({ createdBy }) => createdBy },
]

export function RunsScreen({ projectId }: { projectId: string }) {
  const project = useProject(projectId)
  const { data, error, mutate } = useRuns(projectId)
  const canEdit = project.data !== undefined && canEditProject(project.data)
  const upload = (
    <ButtonLink href={`/projects/${projectId}/runs/new`} variant="primary">
      Bring in a run
    </ButtonLink>
  )
  return (
    <DataState what="the runs" data={data} error={error} onRetry={() => void mutate()}>
      {(runs) => (
        <>
          <PageHeading
            crumbs={[{ label: project.data?.name ?? 'Project', href: `/projects/${projectId}` }, { label: 'Runs' }]}
            title={findingText(runsFinding(runs))}
            actions={canEdit && runs.length > 0 ? upload : null}
          />
          {runs.length === 0 ? (
            <EmptyState title="Record a star for six turns of the worm" actions={canEdit ? upload : null}>
              Let the mount track a star near the celestial equator and the meridian with guiding off and no correction
              playing, and log its position every few seconds. Bring the log in as text; it is kept byte for byte.
            </EmptyState>
          ) : (
            <DataTable
              caption="runs"
              columns={columns}
              rows={runs}
              rowId={({ id }) => id}
              initialSort={{ id: 'started', desc: true }}
            />
          )}
        </>
      )}
    </DataState>
  )
}

'use client'

import Link from 'next/link'
import { useMemo } from 'react'
import { PageHeading } from '@/components/shell/page-heading'
import { ButtonLink } from '@/components/ui/button'
import { EmptyState } from '@/components/ui/empty-state'
import { FilterDay, FilterSelect } from '@/components/ui/filter-row'
import type { ListColumn } from '@/components/ui/server-table-model'
import type { Dates } from '@/lib/client/dates'
import { useDates } from '@/lib/client/display'
import { useProject } from '@/lib/client/project-data'
import { useList, useListAddress } from '@/lib/client/use-list'
import { findingText } from '@/lib/findings/finding'
import { runsFinding } from '@/lib/findings/list-findings'
import { runFilterWords } from '@/lib/findings/shown-sentence'
import { inZone, listSearch, runListSchema, runQuerySchema, type RunSummary } from '@/lib/schemas/lists'
import { canEditProject } from '@/lib/schemas/rights'
import { formatBytes, formatCount } from '@/lib/units'
import { ListFrame } from './list-frame'

const columnsIn = ({ zoneName, dayAndTime }: Dates): readonly ListColumn<RunSummary>[] => [
  {
    id: 'name',
    header: 'Run',
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
    header: `Recorded, ${zoneName}`,
    startsDescending: true,
    cell: ({ startedAt }) => (
      <span className="sm:whitespace-nowrap">{startedAt ? dayAndTime(startedAt) : 'time unknown'}</span>
    ),
  },
  {
    id: 'rows',
    header: 'Rows',
    isNumeric: true,
    isSecondary: true,
    startsDescending: true,
    cell: ({ rowCount }) => (rowCount === null ? '–' : formatCount(rowCount)),
  },
  {
    id: 'correction',
    header: 'Correction in the mount',
    isSecondary: true,
    cell: ({ mountCorrection }) => mountCorrection,
  },
  { id: 'sense', header: 'Sense', isSecondary: true, cell: ({ senseBasis }) => senseBasis ?? '–' },
  {
    id: 'analyses',
    header: 'Analyses',
    isNumeric: true,
    isSecondary: true,
    startsDescending: true,
    cell: ({ analysisCount }) => analysisCount,
  },
  {
    id: 'size',
    header: 'File',
    isNumeric: true,
    isSecondary: true,
    startsDescending: true,
    cell: ({ byteLength }) => formatBytes(byteLength),
  },
  { id: 'by', header: 'Brought in by', isSecondary: true, isName: true, cell: ({ createdBy }) => createdBy },
]

export function RunsScreen({ projectId }: { projectId: string }) {
  const project = useProject(projectId)
  const address = useListAddress(runQuerySchema)
  const { query, change } = address
  const dates = useDates()
  const columns = useMemo(() => columnsIn(dates), [dates])
  const answer = useList(
    `/api/projects/${projectId}/runs${listSearch(runQuerySchema, inZone(query, dates.timeZone))}`,
    runListSchema,
  )
  const canEdit = project.data !== undefined && canEditProject(project.data)
  const upload = (
    <ButtonLink href={`/projects/${projectId}/runs/new`} variant="primary">
      Bring in a run
    </ButtonLink>
  )
  return (
    <ListFrame
      noun={{ one: 'run', many: 'runs' }}
      answer={answer}
      address={address}
      columns={columns}
      rowsOf={({ runs }) => runs}
      heading={(data) => (
        <PageHeading
          crumbs={[{ label: project.data?.name ?? 'Project', href: `/projects/${projectId}` }, { label: 'Runs' }]}
          title={findingText(runsFinding(data))}
          actions={canEdit && data.all > 0 ? upload : null}
        />
      )}
      nothingYet={
        <EmptyState title="Record a star for six turns of the worm" actions={canEdit ? upload : null}>
          Let the mount track a star near the celestial equator and the meridian with guiding off and no correction
          playing, and log its position every few seconds. Bring the log in as text; it is kept byte for byte.
        </EmptyState>
      }
      searched="name, file or person"
      filtered={() => runFilterWords(query)}
      filters={
        <>
          <FilterSelect
            label="Correction in the mount"
            value={query.correction}
            options={[
              { value: 'off', label: 'off' },
              { value: 'on', label: 'on' },
              { value: 'unknown', label: 'unknown' },
            ]}
            onValue={(correction) => change({ correction })}
          />
          <FilterSelect
            label="Side of pier"
            value={query.side}
            options={[
              { value: 'east', label: 'east' },
              { value: 'west', label: 'west' },
              { value: 'unknown', label: 'unknown' },
            ]}
            onValue={(side) => change({ side })}
          />
          <FilterSelect
            label="Sense"
            value={query.sense}
            options={[
              { value: 'proven', label: 'proven' },
              { value: 'assumed', label: 'assumed' },
            ]}
            onValue={(sense) => change({ sense })}
          />
          <FilterSelect
            label="File"
            value={query.state}
            options={[
              { value: 'read', label: 'read' },
              { value: 'unread', label: 'not read yet' },
            ]}
            onValue={(state) => change({ state })}
          />
          <FilterDay
            label={`Recorded from, ${dates.zoneName}`}
            value={query.from}
            onValue={(from) => change({ from })}
          />
          <FilterDay label={`to, ${dates.zoneName}`} value={query.to} onValue={(to) => change({ to })} />
        </>
      }
    />
  )
}

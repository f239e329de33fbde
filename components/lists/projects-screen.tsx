'use client'

import Link from 'next/link'
import { useMemo } from 'react'
import { wormPeriodText } from '@/components/projects/teeth'
import { PageHeading } from '@/components/shell/page-heading'
import { ButtonLink } from '@/components/ui/button'
import { EmptyState } from '@/components/ui/empty-state'
import { FilterSelect } from '@/components/ui/filter-row'
import type { ListColumn } from '@/components/ui/server-table-model'
import type { Dates } from '@/lib/client/dates'
import { useDates } from '@/lib/client/display'
import { projectsKey } from '@/lib/client/project-data'
import { useList, useListAddress } from '@/lib/client/use-list'
import { findingText } from '@/lib/findings/finding'
import { projectsFinding } from '@/lib/findings/list-findings'
import { projectFilterWords } from '@/lib/findings/shown-sentence'
import { listSearch, projectListSchema, projectQuerySchema, type ProjectSummary } from '@/lib/schemas/lists'
import { ListFrame } from './list-frame'

const columnsIn = ({ day }: Dates): readonly ListColumn<ProjectSummary>[] => [
  {
    id: 'name',
    header: 'Mount',
    cell: ({ id, name, archivedAt }) => (
      <>
        <Link className="link font-semibold" href={`/projects/${id}`}>
          {name}
        </Link>
        {archivedAt ? <span className="ml-2 text-sm text-soft">archived</span> : null}
      </>
    ),
  },
  {
    id: 'period',
    header: 'Worm period',
    isNumeric: true,
    cell: ({ wheelTeeth, wormStarts }) => wormPeriodText(wheelTeeth, wormStarts),
  },
  { id: 'runs', header: 'Runs', isNumeric: true, startsDescending: true, cell: ({ runCount }) => runCount },
  {
    id: 'analyses',
    header: 'Analyses',
    isNumeric: true,
    isSecondary: true,
    startsDescending: true,
    cell: ({ analysisCount }) => analysisCount,
  },
  {
    id: 'people',
    header: 'People',
    isNumeric: true,
    isSecondary: true,
    startsDescending: true,
    cell: ({ memberCount }) => memberCount,
  },
  { id: 'role', header: 'You are', isSecondary: true, cell: ({ role }) => role },
  {
    id: 'changed',
    header: 'Changed',
    isSecondary: true,
    startsDescending: true,
    cell: ({ updatedAt }) => <span className="whitespace-nowrap">{day(updatedAt)}</span>,
  },
]

export function ProjectsScreen() {
  const address = useListAddress(projectQuerySchema)
  const { query, change } = address
  const dates = useDates()
  const columns = useMemo(() => columnsIn(dates), [dates])
  const answer = useList(projectsKey + listSearch(projectQuerySchema, query), projectListSchema)
  return (
    <ListFrame
      noun={{ one: 'project', many: 'projects' }}
      answer={answer}
      address={address}
      columns={columns}
      rowsOf={({ projects }) => projects}
      heading={(data) => (
        <PageHeading
          title={findingText(projectsFinding(data))}
          actions={
            <>
              <ButtonLink href="/projects/import">Bring in an archive</ButtonLink>
              <ButtonLink href="/projects/new" variant="primary">
                New project
              </ButtonLink>
            </>
          }
        />
      )}
      nothingYet={
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
          A project keeps one mount’s recordings, what was found in them, and the correction tables made from them. Give
          it a name and, if you know it, the number of teeth of the worm wheel.
        </EmptyState>
      }
      searched="name"
      filtered={() => projectFilterWords(query)}
      filters={
        <>
          <FilterSelect
            label="You are"
            value={query.role}
            options={[
              { value: 'owner', label: 'owner' },
              { value: 'editor', label: 'editor' },
              { value: 'viewer', label: 'viewer' },
            ]}
            onValue={(role) => change({ role })}
          />
          <FilterSelect
            label="Archived"
            anyLabel="left out"
            value={query.archived === 'no' ? undefined : query.archived}
            options={[
              { value: 'too', label: 'shown too' },
              { value: 'only', label: 'shown alone' },
            ]}
            onValue={(archived) => change({ archived: archived ?? 'no' })}
          />
        </>
      }
    />
  )
}

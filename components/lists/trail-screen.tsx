'use client'

import { useMemo } from 'react'
import { PageHeading } from '@/components/shell/page-heading'
import { EmptyState } from '@/components/ui/empty-state'
import { FilterDay, FilterSelect } from '@/components/ui/filter-row'
import type { ListColumn } from '@/components/ui/server-table-model'
import type { Dates } from '@/lib/client/dates'
import { useDates } from '@/lib/client/display'
import { useMembers, useProject } from '@/lib/client/project-data'
import { useList, useListAddress } from '@/lib/client/use-list'
import { auditThings, auditWords } from '@/lib/findings/audit-words'
import { findingText } from '@/lib/findings/finding'
import { auditFinding } from '@/lib/findings/list-findings'
import { auditFilterWords } from '@/lib/findings/shown-sentence'
import { auditEventListSchema, auditQuerySchema, inZone, listSearch, type AuditEvent } from '@/lib/schemas/lists'
import { ListFrame } from './list-frame'

const columnsIn = ({ zoneName, dayAndTime }: Dates): readonly ListColumn<AuditEvent>[] => [
  { id: 'person', header: 'Who', cell: ({ actorName }) => actorName },
  { id: 'action', header: 'Did what', cell: ({ action }) => auditWords(action) },
  {
    id: 'subject',
    isName: true,
    header: 'To what',
    cell: ({ subject, at }) => (
      <>
        <span className="break-words">{subject}</span>
        <span className="block text-sm text-soft sm:hidden">{dayAndTime(at)}</span>
      </>
    ),
  },
  {
    id: 'at',
    header: `When, ${zoneName}`,
    isSecondary: true,
    startsDescending: true,
    cell: ({ at }) => <span className="whitespace-nowrap">{dayAndTime(at)}</span>,
  },
]

/** Who did what in a project. */
export function TrailScreen({ projectId }: { projectId: string }) {
  const project = useProject(projectId)
  const members = useMembers(projectId)
  const address = useListAddress(auditQuerySchema)
  const { query, change } = address
  const dates = useDates()
  const columns = useMemo(() => columnsIn(dates), [dates])
  const answer = useList(
    `/api/projects/${projectId}/audit-events${listSearch(auditQuerySchema, inZone(query, dates.timeZone))}`,
    auditEventListSchema,
  )
  const people = members.data?.members ?? []
  const personName = people.find(({ userId }) => userId === query.person)?.displayName ?? null
  return (
    <ListFrame
      noun={{ one: 'entry', many: 'entries' }}
      answer={answer}
      address={address}
      columns={columns}
      rowsOf={({ events }) => events}
      heading={(data) => (
        <PageHeading
          crumbs={[
            { label: project.data?.name ?? 'Project', href: `/projects/${projectId}` },
            { label: 'Settings', href: `/projects/${projectId}/settings` },
            { label: 'Who did what' },
          ]}
          title={findingText(auditFinding(data))}
          lead="Every change is noted with the name that the person had then. Nobody can change the log."
        />
      )}
      nothingYet={
        <EmptyState title="The first change will stand here">
          Whatever is brought in, saved, renamed or deleted is noted with who did it and when.
        </EmptyState>
      }
      searched="person or thing"
      filtered={() => auditFilterWords(query, personName)}
      filters={
        <>
          <FilterSelect
            label="Who"
            anyLabel="anybody"
            value={query.person}
            options={people.map(({ userId, displayName }) => ({ value: userId, label: displayName }))}
            onValue={(person) => change({ person })}
          />
          <FilterSelect
            label="About"
            anyLabel="anything"
            value={query.thing}
            options={auditThings()}
            onValue={(thing) => change({ thing })}
          />
          <FilterDay label={`From, ${dates.zoneName}`} value={query.from} onValue={(from) => change({ from })} />
          <FilterDay label={`to, ${dates.zoneName}`} value={query.to} onValue={(to) => change({ to })} />
        </>
      }
    />
  )
}

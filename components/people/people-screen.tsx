'use client'

import { PageHeading } from '@/components/shell/page-heading'
import { DataState } from '@/components/ui/data-state'
import { DataTable } from '@/components/ui/data-table'
import type { DataColumn } from '@/components/ui/data-table-model'
import { formatDay } from '@/lib/client/dates'
import { useMembers, useProject, type Member } from '@/lib/client/project-data'
import { capitalised, counted } from '@/lib/findings/words'
import { aRole, mayDo } from '@/lib/schemas/rights'

const columns: readonly DataColumn<Member>[] = [
  { id: 'name', header: 'Name', value: ({ displayName }) => displayName },
  { id: 'role', header: 'Role', value: ({ role }) => role },
  { id: 'may', header: 'May', isSecondary: true, value: ({ role }) => mayDo(role) },
  {
    id: 'since',
    header: 'Since',
    value: ({ joinedAt }) => joinedAt,
    cell: ({ joinedAt }) => formatDay(joinedAt),
  },
]

export function PeopleScreen({ projectId }: { projectId: string }) {
  const project = useProject(projectId)
  const { data, error, mutate } = useMembers(projectId)
  return (
    <DataState what="the people" data={data} error={error} onRetry={() => void mutate()}>
      {({ members }) => (
        <>
          <PageHeading
            crumbs={[{ label: project.data?.name ?? 'Project', href: `/projects/${projectId}` }, { label: 'People' }]}
            title={
              members.length === 1
                ? 'One person works on this mount'
                : `${capitalised(counted(members.length, 'person', 'people'))} share this mount`
            }
            lead={project.data ? `You are ${aRole(project.data.role)} and may ${mayDo(project.data.role)}.` : undefined}
          />
          <DataTable caption="people" columns={columns} rows={members} rowId={({ userId }) => userId} />
        </>
      )}
    </DataState>
  )
}

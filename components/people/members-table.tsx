'use client'

import { useMemo, useState } from 'react'
import { Button } from '@/components/ui/button'
import { DataTable } from '@/components/ui/data-table'
import type { DataColumn } from '@/components/ui/data-table-model'
import { Select } from '@/components/ui/select'
import { useDates } from '@/lib/client/display'
import type { Member } from '@/lib/client/project-data'
import type { Role } from '@/lib/schemas/api'
import { mayDo } from '@/lib/schemas/rights'
import { LastOwnerDialog } from './last-owner-dialog'
import { RemoveDialog } from './remove-dialog'
import { RoleDialog } from './role-dialog'
import { ROLE_OPTIONS } from './role-options'

interface MembersTableProps {
  project: { id: string; name: string }
  /** Who looks. */
  userId: string
  canManage: boolean
  members: readonly Member[]
}

type Asked = { member: Member; role: Role } | { member: Member; role: null }

/** Who is here. Owners choose roles and remove people in it; everyone finds the way out in their own row. */
export function MembersTable({ project, userId, canManage, members }: MembersTableProps) {
  const dates = useDates()
  const [asked, setAsked] = useState<Asked | null>(null)
  const columns = useMemo<DataColumn<Member>[]>(
    () => [
      {
        id: 'name',
        header: 'Name',
        value: ({ displayName }) => displayName,
        cell: (member) => (
          <>
            {member.displayName}
            {member.userId === userId ? <span className="text-soft"> (you)</span> : null}
          </>
        ),
      },
      {
        id: 'role',
        header: 'Role',
        value: ({ role }) => role,
        cell: (member) =>
          canManage ? (
            <Select
              aria-label={`Role of ${member.displayName}`}
              options={ROLE_OPTIONS}
              value={member.role}
              onChange={(event) => setAsked({ member, role: event.target.value as Role })}
              className="w-28"
            />
          ) : (
            member.role
          ),
      },
      { id: 'may', header: 'May', isSecondary: true, value: ({ role }) => mayDo(role) },
      {
        id: 'since',
        header: 'Since',
        isSecondary: true,
        value: ({ joinedAt }) => joinedAt,
        cell: ({ joinedAt }) => <span className="whitespace-nowrap">{dates.day(joinedAt)}</span>,
      },
      {
        id: 'actions',
        header: 'What you can do',
        hasControls: true,
        value: () => null,
        cell: (member) => {
          const isSelf = member.userId === userId
          if (!isSelf && !canManage) return null
          return (
            <div className="text-right">
              <Button
                size="small"
                aria-label={isSelf ? undefined : `Remove ${member.displayName}`}
                onClick={() => setAsked({ member, role: null })}
              >
                {isSelf ? 'Leave' : 'Remove'}
              </Button>
            </div>
          )
        },
      },
    ],
    [dates, canManage, userId],
  )
  const isLastOwner = asked?.member.role === 'owner' && members.filter(({ role }) => role === 'owner').length === 1
  const dialog = {
    project,
    isSelf: asked?.member.userId === userId,
    onClose: () => setAsked(null),
  }

  return (
    <>
      <DataTable caption="people" columns={columns} rows={members} rowId={({ userId: id }) => id} />
      {asked && isLastOwner ? <LastOwnerDialog {...dialog} member={asked.member} /> : null}
      {asked && !isLastOwner && asked.role ? <RoleDialog {...dialog} member={asked.member} role={asked.role} /> : null}
      {asked && !isLastOwner && !asked.role ? <RemoveDialog {...dialog} member={asked.member} /> : null}
    </>
  )
}

'use client'

import { Notice } from '@/components/ui/notice'
import { sendJson } from '@/lib/client/fetcher'
import type { Member } from '@/lib/client/project-data'
import type { Role } from '@/lib/schemas/api'
import { membershipSchema } from '@/lib/schemas/people'
import { aRole, rightsChange } from '@/lib/schemas/rights'
import { MemberDialog } from './member-dialog'

interface RoleDialogProps {
  project: { id: string }
  member: Member
  /** The one to change to. */
  role: Role
  isSelf: boolean
  onClose: () => void
}

/** Tells what a change of role gives and takes before it is made. */
export function RoleDialog({ project, member, role, isSelf, onClose }: RoleDialogProps) {
  const { gained, lost } = rightsChange(member.role, role)
  const who = isSelf ? 'You' : member.displayName
  return (
    <MemberDialog
      projectId={project.id}
      title={`Make ${isSelf ? 'yourself' : member.displayName} ${aRole(role)}?`}
      keepLabel={`Keep as ${member.role}`}
      confirmLabel={`Make ${aRole(role)}`}
      onClose={onClose}
      onConfirm={async () => {
        const url = `/api/projects/${project.id}/members/${member.userId}`
        await sendJson('PATCH', url, { from: member.role, role }, membershipSchema)
      }}
    >
      {gained ? (
        <p>
          {who} may from then on also {gained}.
        </p>
      ) : null}
      {lost ? (
        <p>
          {who} may no longer {lost}.{isSelf ? ' Only another owner can give that back to you.' : ''}
        </p>
      ) : null}
      {role === 'owner' ? (
        <Notice tone="warning">An owner can also remove you, and take your role from you.</Notice>
      ) : null}
      <p>What {isSelf ? 'you' : 'they'} made stays as it is.</p>
    </MemberDialog>
  )
}

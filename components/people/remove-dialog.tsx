'use client'

import { sendOnly } from '@/lib/client/fetcher'
import { openAfresh } from '@/lib/client/open-afresh'
import type { Member } from '@/lib/client/project-data'
import { MemberDialog } from './member-dialog'

interface RemoveDialogProps {
  project: { id: string; name: string }
  member: Member
  isSelf: boolean
  onClose: () => void
}

/** Removing somebody, or leaving: says what ends and what stays. */
export function RemoveDialog({ project, member, isSelf, onClose }: RemoveDialogProps) {
  const { displayName } = member
  return (
    <MemberDialog
      projectId={project.id}
      title={isSelf ? `Leave “${project.name}”?` : `Remove ${displayName} from “${project.name}”?`}
      keepLabel={isSelf ? 'Stay' : 'Keep'}
      confirmLabel={isSelf ? 'Leave' : 'Remove'}
      onClose={onClose}
      onConfirm={async () => {
        await sendOnly('DELETE', `/api/projects/${project.id}/members/${member.userId}`)
        // Nothing that was read as a member may stay in memory.
        if (isSelf) openAfresh('/projects')
      }}
    >
      <p>
        {isSelf
          ? 'You can no longer open this project. To come back, an owner has to invite you again.'
          : `${displayName} can no longer open this project, and sees so with the next click. To come back, ${displayName} has to be invited again.`}
      </p>
      <p>
        What {isSelf ? 'you' : 'they'} made stays, with {isSelf ? 'your' : 'their'} name on it: runs, analyses, notes,
        correction tables.
      </p>
      <p>
        Share links that {isSelf ? 'you' : 'they'} made go on working.{' '}
        {isSelf
          ? 'Revoke those that should not before you leave.'
          : 'The page of each analysis lists its links, where you can revoke them.'}
      </p>
    </MemberDialog>
  )
}

'use client'

import { Button } from '@/components/ui/button'
import { Actions, Dialog } from '@/components/ui/dialog'
import type { Member } from '@/lib/client/project-data'

interface LastOwnerDialogProps {
  member: Member
  isSelf: boolean
  onClose: () => void
}

/** Why the only owner must stay one, and what to do first. */
export function LastOwnerDialog({ member, isSelf, onClose }: LastOwnerDialogProps) {
  const who = isSelf ? 'You are' : `${member.displayName} is`
  return (
    <Dialog isOpen onClose={onClose} title={`${who} the only owner`}>
      <p>
        A project needs an owner: without one nobody could invite people, or delete it. Make somebody else an owner
        first; after that {isSelf ? 'you' : 'they'} can leave or take another role.
      </p>
      <Actions>
        <Button variant="primary" onClick={onClose}>
          Close
        </Button>
      </Actions>
    </Dialog>
  )
}

'use client'

import { ConfirmDialog } from '@/components/ui/confirm-dialog'
import type { Invitation } from '@/lib/schemas/people'

interface RevokeDialogProps {
  invitation: Invitation
  onClose: () => void
  onConfirm: () => Promise<void>
}

export function RevokeDialog({ invitation, onClose, onConfirm }: RevokeDialogProps) {
  return (
    <ConfirmDialog
      title="Revoke this invitation?"
      keepLabel="Keep it"
      confirmLabel="Revoke"
      onClose={onClose}
      onConfirm={onConfirm}
    >
      <p>
        The link that was sent to <span className="break-all">{invitation.email}</span> opens nothing any more, and says
        that the invitation was taken back. You can invite the same address again later.
      </p>
    </ConfirmDialog>
  )
}

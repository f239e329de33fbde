'use client'

import { useState } from 'react'
import { Button } from '@/components/ui/button'
import { Actions, Dialog } from '@/components/ui/dialog'
import { Notice } from '@/components/ui/notice'
import type { Invitation } from '@/lib/schemas/people'

interface RevokeDialogProps {
  invitation: Invitation
  onClose: () => void
  onConfirm: () => Promise<void>
}

export function RevokeDialog({ invitation, onClose, onConfirm }: RevokeDialogProps) {
  const [isBusy, setBusy] = useState(false)
  const [fault, setFault] = useState<string | null>(null)

  async function confirm() {
    setBusy(true)
    setFault(null)
    try {
      await onConfirm()
      onClose()
    } catch (error) {
      setFault(error instanceof Error ? error.message : 'It did not work. Try again.')
      setBusy(false)
    }
  }

  return (
    <Dialog isOpen onClose={onClose} title="Revoke this invitation?">
      <p>
        The link that was sent to <span className="break-all">{invitation.email}</span> opens nothing any more, and says
        that the invitation was taken back. You can invite the same address again later.
      </p>
      {fault ? (
        <Notice tone="error" isLive className="mt-3">
          {fault}
        </Notice>
      ) : null}
      <Actions>
        <Button onClick={onClose}>Keep it</Button>
        <Button variant="danger" disabled={isBusy} onClick={() => void confirm()}>
          Revoke
        </Button>
      </Actions>
    </Dialog>
  )
}

'use client'

import { useState, type ReactNode } from 'react'
import { Button } from './button'
import { Actions, Dialog } from './dialog'
import { Notice } from './notice'

interface ConfirmDialogProps {
  title: string
  /** What will be so, in words. */
  children: ReactNode
  keepLabel: string
  confirmLabel: string
  onClose: () => void
  /** Rejects with what the person should read; the dialog then stays. */
  onConfirm: () => Promise<void>
}

/** Asks once before something is done that somebody will miss; it is open as long as it is there. */
export function ConfirmDialog({ title, children, keepLabel, confirmLabel, onClose, onConfirm }: ConfirmDialogProps) {
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
    <Dialog isOpen onClose={onClose} title={title}>
      <div className="flex flex-col gap-3">{children}</div>
      {fault ? (
        <Notice tone="error" isLive className="mt-3">
          {fault}
        </Notice>
      ) : null}
      <Actions>
        <Button onClick={onClose}>{keepLabel}</Button>
        <Button variant="danger" disabled={isBusy} onClick={() => void confirm()}>
          {confirmLabel}
        </Button>
      </Actions>
    </Dialog>
  )
}

'use client'

import { useState, type ReactNode } from 'react'
import { useSWRConfig } from 'swr'
import { Button } from '@/components/ui/button'
import { Actions, Dialog } from '@/components/ui/dialog'
import { Notice } from '@/components/ui/notice'
import { projectKey } from '@/lib/client/project-data'

interface MemberDialogProps {
  projectId: string
  title: string
  children: ReactNode
  keepLabel: string
  confirmLabel: string
  onClose: () => void
  onConfirm: () => Promise<void>
}

/** Asks before something changes for a member; once it is closed the list is as the server has it by then. */
export function MemberDialog(props: MemberDialogProps) {
  const { projectId, title, children, keepLabel, confirmLabel, onClose, onConfirm } = props
  const { mutate } = useSWRConfig()
  const [isBusy, setBusy] = useState(false)
  const [fault, setFault] = useState<string | null>(null)

  function close() {
    onClose()
    void mutate(projectKey(projectId))
    void mutate(`${projectKey(projectId)}/members`)
  }

  async function confirm() {
    setBusy(true)
    setFault(null)
    try {
      await onConfirm()
      close()
    } catch (error) {
      setFault(error instanceof Error ? error.message : 'It did not work. Try again.')
      setBusy(false)
    }
  }

  return (
    <Dialog isOpen onClose={close} title={title}>
      <div className="flex flex-col gap-3">{children}</div>
      {fault ? (
        <Notice tone="error" isLive className="mt-3">
          {fault}
        </Notice>
      ) : null}
      <Actions>
        <Button onClick={close}>{keepLabel}</Button>
        <Button variant="danger" disabled={isBusy} onClick={() => void confirm()}>
          {confirmLabel}
        </Button>
      </Actions>
    </Dialog>
  )
}

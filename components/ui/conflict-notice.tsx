import type { ReactNode } from 'react'
import { Button } from './button'
import { Notice } from './notice'

interface ConflictNoticeProps {
  /** Who changed the same thing meanwhile; left out where the server does not say. */
  changedBy?: string
  /** When, already in words. */
  changedAt?: string
  /** What was changed: “the drive train”. */
  thing: string
  /** What they made of it, so that one can decide. */
  children?: ReactNode
  onKeepMine: () => void
  onTakeTheirs: () => void
}

/** Two people changed the same thing: nothing is lost until one of them decides. */
export function ConflictNotice({
  changedBy,
  changedAt,
  thing,
  children,
  onKeepMine,
  onTakeTheirs,
}: ConflictNoticeProps) {
  return (
    <Notice
      tone="warning"
      isLive
      title={`${changedBy ?? 'Someone else'} changed ${thing} meanwhile${changedAt ? `, ${changedAt}` : ''}`}
      actions={
        <>
          <Button onClick={onKeepMine}>Save mine instead</Button>
          <Button onClick={onTakeTheirs}>Take theirs</Button>
        </>
      }
    >
      {children}
      <p>What you typed is still in the form and nothing of yours was saved yet.</p>
    </Notice>
  )
}

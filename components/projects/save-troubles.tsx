import type { ReactNode } from 'react'
import { ConflictNotice } from '@/components/ui/conflict-notice'
import { Notice } from '@/components/ui/notice'
import { useDates } from '@/lib/client/display'
import type { SaveConflict } from './use-save'

interface SaveTroublesProps<Thing> {
  /** What was to be saved: “the drive train”. */
  thing: string
  fault: string | null
  conflict: SaveConflict<Thing> | null
  /** What they made of it, in words. */
  theirs?: (current: Thing) => ReactNode
  onKeepMine: (current: Thing) => void
  onTakeTheirs: (current: Thing) => void
}

/** What stands in the way of saving, as useSave tells it; nothing when all is well. */
export function SaveTroubles<Thing>(props: SaveTroublesProps<Thing>) {
  const { thing, fault, conflict, theirs, onKeepMine, onTakeTheirs } = props
  const { minute } = useDates()
  return (
    <>
      {conflict ? (
        <ConflictNotice
          thing={thing}
          changedBy={conflict.changedBy}
          changedAt={conflict.changedAt && minute(conflict.changedAt)}
          onKeepMine={() => onKeepMine(conflict.current)}
          onTakeTheirs={() => onTakeTheirs(conflict.current)}
        >
          {theirs ? <p>Theirs: {theirs(conflict.current)}</p> : null}
        </ConflictNotice>
      ) : null}
      {fault ? (
        <Notice tone="error" title="Not saved" isLive>
          {fault}
        </Notice>
      ) : null}
    </>
  )
}

import { Button } from '@/components/ui/button'
import { ConflictNotice } from '@/components/ui/conflict-notice'
import { Notice } from '@/components/ui/notice'
import { useDates } from '@/lib/client/display'
import type { Note } from '@/lib/schemas/api'
import { anchorText } from './note-types'
import { NoteWords } from './note-words'
import type { NoteTrouble } from './use-note-saving'

interface NoteTroublesProps {
  trouble: NoteTrouble
  faultId: string
  onKeepMine: (theirs: Note) => void
  onTakeTheirs: () => void
  onAddAnew: () => void
  onLetGo: () => void
}

/** What stands in the way of saving a note, and the ways on. */
export function NoteTroubles({ trouble, faultId, ...on }: NoteTroublesProps) {
  const dates = useDates()
  if (trouble.kind === 'changed') {
    const { theirs, changedBy, changedAt } = trouble
    return (
      <ConflictNotice
        thing="this note"
        changedBy={changedBy}
        changedAt={changedAt && dates.minute(changedAt)}
        onKeepMine={() => on.onKeepMine(theirs)}
        onTakeTheirs={on.onTakeTheirs}
      >
        <figure className="my-1.5 border-l-3 border-steel pl-2 text-sm">
          <figcaption className="text-soft">Theirs, {anchorText(theirs.anchor)}</figcaption>
          <p className="whitespace-pre-wrap wrap-anywhere">
            <NoteWords text={theirs.text} mentions={theirs.mentions} />
          </p>
        </figure>
      </ConflictNotice>
    )
  }
  if (trouble.kind === 'deleted') {
    return (
      <Notice
        tone="warning"
        isLive
        title="Somebody removed this note meanwhile"
        actions={
          <>
            <Button size="small" onClick={on.onAddAnew}>
              Add mine as a new note
            </Button>
            <Button size="small" onClick={on.onLetGo}>
              Let it go
            </Button>
          </>
        }
      >
        What you typed is still here.
      </Notice>
    )
  }
  return (
    <div id={faultId} role="alert" className="mt-1 text-sm text-oxide">
      <p>{trouble.message}</p>
      {trouble.kind === 'signed-out' ? (
        <a href="/sign-in" target="_blank" rel="noopener" className="link">
          Sign in in another tab
        </a>
      ) : null}
    </div>
  )
}

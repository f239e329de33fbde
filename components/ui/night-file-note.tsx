import { Button } from './button'
import { Notice } from './notice'

interface NightFileNoteProps {
  onOpen: () => void
  onStay: () => void
}

/** In Night, before the system’s own window for files opens in colours that spoil the eyes’ adaptation. */
export function NightFileNote({ onOpen, onStay }: NightFileNoteProps) {
  return (
    <Notice
      tone="warning"
      title="The file window of your system is not red"
      isLive
      actions={
        <>
          <Button onClick={onOpen}>Open it all the same</Button>
          <Button onClick={onStay}>Stay dark</Button>
        </>
      }
    >
      It comes in the system’s own colours, which Night cannot tint. Turn the screen away from your eyes first, or drop
      the file here.
    </Notice>
  )
}

import type { ReactNode } from 'react'
import { Button } from './button'
import { Notice } from './notice'
import { ProgressBar } from './progress-bar'

interface DataStateProps<Data> {
  /** What is being fetched: “the runs”. */
  what: string
  data: Data | undefined
  error: Error | undefined
  onRetry: () => void
  children: (data: Data) => ReactNode
}

/** Shows data once it is there; until then a bar that says what is coming, and on a fault what to do. */
export function DataState<Data>({ what, data, error, onRetry, children }: DataStateProps<Data>) {
  if (data !== undefined) return <>{children(data)}</>
  if (error) {
    return (
      <Notice
        tone="error"
        isLive
        title={`Could not get ${what}`}
        actions={<Button onClick={onRetry}>Try again</Button>}
      >
        {error.message}
      </Notice>
    )
  }
  return <ProgressBar label={`Getting ${what}`} fraction={null} />
}

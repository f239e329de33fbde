import { Notice } from '@/components/ui/notice'

interface WorkerFaultProps {
  /** What the worker said; nothing is shown while it works. */
  message: string | null
  /** What a reload brings back. */
  kept?: string
}

/** The worker broke down; only a reload makes a new one. */
export function WorkerFault({ message, kept = '' }: WorkerFaultProps) {
  if (message === null) return null
  return (
    <Notice tone="error" title="The computation broke off" isLive>
      Reload the page{kept ? `; ${kept}` : ' and try again'}. ({message})
    </Notice>
  )
}

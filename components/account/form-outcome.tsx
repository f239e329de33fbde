import { Notice } from '@/components/ui/notice'

/** The line above a form's button: what went wrong, or what was done. */
export function FormOutcome({ fault, done, title }: { fault: string | null; done: string | null; title: string }) {
  return (
    <>
      {fault ? (
        <Notice tone="error" title={title} isLive>
          {fault}
        </Notice>
      ) : null}
      <p role="status" className={done ? 'text-verdigris' : 'sr-only'}>
        {done}
      </p>
    </>
  )
}

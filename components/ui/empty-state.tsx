import type { ReactNode } from 'react'
import { Card } from './card'

/** Says that there is nothing yet, what would be here, and what to do next. */
export function EmptyState({
  title,
  children,
  actions,
}: {
  title: ReactNode
  children: ReactNode
  actions?: ReactNode
}) {
  return (
    <Card className="px-6 py-10 max-sm:px-4">
      <h2 className="text-finding font-semibold">{title}</h2>
      <div className="mt-1 max-w-[60ch] text-soft">{children}</div>
      {actions ? <div className="mt-4 flex flex-wrap gap-2">{actions}</div> : null}
    </Card>
  )
}

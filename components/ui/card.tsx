import type { ComponentProps, ReactNode } from 'react'
import { classNames } from './class-names'

export function Card({ className, ...rest }: ComponentProps<'section'>) {
  return <section className={classNames('rounded-card border border-rule bg-card', className)} {...rest} />
}

/** A card with padding and a heading of its own. */
export function TitledCard({ title, actions, children, className }: TitledCardProps) {
  return (
    <Card className={classNames('p-5 max-sm:p-4', className)}>
      <div className="mb-3 flex flex-wrap items-center justify-between gap-2">
        <h2 className="min-w-0 text-finding font-semibold wrap-anywhere">{title}</h2>
        {actions}
      </div>
      {children}
    </Card>
  )
}

interface TitledCardProps {
  title: ReactNode
  actions?: ReactNode
  children: ReactNode
  className?: string
}

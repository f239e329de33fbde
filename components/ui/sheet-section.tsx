import { useId, type ReactNode } from 'react'
import { Card } from './card'
import { classNames } from './class-names'

interface SheetSectionProps {
  /** Place in the reading order of the worksheet; left out where there is no order. */
  number?: number
  title: string
  /** The question this section answers, in a sentence or two. */
  question?: ReactNode
  /** Settings, below the question; they fold away on a phone. */
  settings?: ReactNode
  finding?: ReactNode
  /** Figures and notes at the right. */
  aside?: ReactNode
  children: ReactNode
}

/** One section of a worksheet: question and settings at the left, finding and picture in the middle, figures at the right. */
export function SheetSection({ number, title, question, settings, finding, aside, children }: SheetSectionProps) {
  const headingId = useId()
  return (
    <Card
      aria-labelledby={headingId}
      className={classNames(
        'grid grid-cols-1 print:block',
        aside
          ? 'lg:grid-cols-[13rem_minmax(0,1fr)_17rem] xl:grid-cols-[13rem_minmax(0,1fr)_18.75rem]'
          : 'lg:grid-cols-[13rem_minmax(0,1fr)]',
      )}
    >
      <div className="border-rule p-5 print:break-inside-avoid print:break-after-avoid max-lg:pb-0 max-sm:px-4 lg:border-r">
        {number === undefined ? null : <p className="figures text-sm text-brass">{number}</p>}
        <h2 id={headingId} className="text-finding font-semibold">
          {title}
        </h2>
        {question ? <div className="mt-2 text-sm text-pretty text-soft">{question}</div> : null}
        {settings ? (
          <>
            <div className="mt-3 hidden lg:block">{settings}</div>
            <details className="mt-2 lg:hidden">
              <summary className="py-2 text-sm font-semibold pointer-coarse:py-3">Settings</summary>
              <div className="pt-1">{settings}</div>
            </details>
          </>
        ) : null}
      </div>
      <div className="min-w-0 p-5 max-sm:px-4">
        {finding ? (
          <p className="mb-3 text-finding font-semibold text-pretty print:break-after-avoid">{finding}</p>
        ) : null}
        {children}
      </div>
      {aside ? <div className="min-w-0 border-rule p-5 max-lg:border-t max-sm:px-4 lg:border-l">{aside}</div> : null}
    </Card>
  )
}

/** A setting or a fact on one line: name at the left, figure at the right. */
export function FactRow({ name, children }: { name: ReactNode; children: ReactNode }) {
  return (
    <div className="flex items-baseline justify-between gap-3 border-b border-rule py-1.5 text-sm">
      <dt className="wrap-anywhere">{name}</dt>
      <dd className="figures text-right">{children}</dd>
    </div>
  )
}

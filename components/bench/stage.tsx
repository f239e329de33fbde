import { useId, type ReactNode } from 'react'
import { FindingText } from '@/components/findings/finding-text'
import type { Finding } from '@/lib/findings/finding'
import './bench.css'

interface StageProps {
  number: number
  title: string
  question: string
  settings?: ReactNode
  isLocked: boolean
  finding: Finding | null
  aside?: ReactNode
  children?: ReactNode
}

/** One stage of the worksheet. On a phone it is one column and the settings fold away; wider, they stay open. */
export function Stage({ number, title, question, settings, isLocked, finding, aside, children }: StageProps) {
  const headingId = useId()
  return (
    <section
      aria-labelledby={headingId}
      className="grid grid-cols-1 print:block rounded-card border border-rule bg-card lg:grid-cols-[13rem_minmax(0,1fr)_17rem] xl:grid-cols-[13rem_minmax(0,1fr)_18.75rem]"
    >
      <div className="min-w-0 px-5 pt-5 max-sm:px-4 print:break-inside-avoid print:break-after-avoid lg:border-r lg:border-rule lg:pb-5">
        <p className="figures text-sm text-brass" aria-hidden="true">
          {number}
        </p>
        <h2 id={headingId} className="text-finding font-semibold">
          {title}
        </h2>
        <p className="mt-2 max-w-[60ch] text-sm text-pretty text-soft">{question}</p>
        {settings ? (
          <details className="stage-settings mt-2">
            <summary className="py-1.5 text-sm font-semibold pointer-coarse:py-3.5">Settings</summary>
            <fieldset disabled={isLocked} className="min-w-0">
              <legend className="sr-only">Settings of {title}</legend>
              {settings}
            </fieldset>
          </details>
        ) : null}
      </div>
      <div className="min-w-0 px-5 py-4 max-sm:px-4">
        {finding ? (
          <p className="mb-3 max-w-[72ch] text-finding font-semibold text-pretty print:break-after-avoid">
            <FindingText finding={finding} />
          </p>
        ) : null}
        {children}
      </div>
      <div className="flex min-w-0 flex-col gap-4 px-5 pt-5 pb-5 max-lg:pt-0 max-sm:px-4 lg:border-l lg:border-rule">
        {aside}
      </div>
    </section>
  )
}

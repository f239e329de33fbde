import { useId, type ReactNode } from 'react'
import { classNames } from '@/components/ui/class-names'
import { FindingText } from '@/components/findings/finding-text'
import type { Finding } from '@/lib/findings/finding'

interface ReportSectionProps {
  title: string
  finding?: Finding | null
  children: ReactNode
}

/** One part of the report: its heading and finding stay with what follows them on paper. */
export function ReportSection({ title, finding, children }: ReportSectionProps) {
  const headingId = useId()
  return (
    <section aria-labelledby={headingId} className="report-section">
      <div className="report-keep">
        <h2 id={headingId} className="border-t border-rule pt-3 text-finding font-semibold">
          {title}
        </h2>
        {finding ? (
          <p className="mt-1 mb-3 max-w-[72ch] text-pretty">
            <FindingText finding={finding} />
          </p>
        ) : null}
      </div>
      <div className="flex flex-col gap-4">{children}</div>
    </section>
  )
}

interface ReportFactsProps {
  rows: readonly (readonly [name: string, figure: ReactNode])[]
  isOneColumn?: boolean
}

/** Name and figure pairs, in two columns where there is room. */
export function ReportFacts({ rows, isOneColumn = false }: ReportFactsProps) {
  return (
    <dl
      className={classNames(
        'break-inside-avoid',
        !isOneColumn && 'grid grid-cols-2 gap-x-8 max-sm:grid-cols-1 print:grid-cols-2',
      )}
    >
      {rows.map(([name, figure]) => (
        <div key={name} className="flex items-baseline justify-between gap-3 border-b border-rule py-1 text-sm">
          <dt className="text-soft">{name}</dt>
          <dd className="figures text-right">{figure}</dd>
        </div>
      ))}
    </dl>
  )
}

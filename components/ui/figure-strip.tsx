import type { ReactNode } from 'react'
import { withSpace } from '@/lib/units'
import { Card } from './card'
import { classNames } from './class-names'

export interface KeyFigure {
  label: ReactNode
  /** The figure as text, minus sign and digits already right. */
  value: ReactNode
  /** Its standard error as text, without the ± sign. */
  uncertainty?: ReactNode
  /** Text with or without the space before it; anything else stands as it is. */
  unit?: ReactNode
  /** A word or two behind it, such as “real change”. */
  remark?: ReactNode
}

/** The key figures of a screen, side by side; on a phone two in a row. */
export function FigureStrip({ figures, label = 'Key figures' }: { figures: readonly KeyFigure[]; label?: string }) {
  return (
    <Card aria-label={label} className="overflow-hidden">
      <dl className="-mt-px -ml-px grid grid-cols-2 md:not-print:grid-flow-col md:not-print:auto-cols-fr md:not-print:grid-cols-none md:not-print:grid-rows-[auto_auto] print:grid-cols-3">
        {figures.map((figure, index) => (
          <div
            key={index}
            className="row-span-2 grid min-w-0 grid-rows-subgrid border-t border-l border-rule px-5 py-4 max-sm:px-4 max-sm:py-3 max-md:not-print:last:odd:col-span-2"
          >
            <dt className="text-sm text-soft">{figure.label}</dt>
            <dd className="pt-0.5">
              <Figure {...figure} />
            </dd>
          </div>
        ))}
      </dl>
    </Card>
  )
}

/** One large figure with its uncertainty, smaller and softer, and its unit. */
export function Figure({ value, uncertainty, unit, remark }: Omit<KeyFigure, 'label'>) {
  return (
    <span className="figures">
      <span className="text-figure font-semibold">{value}</span>
      {uncertainty === undefined ? null : ' '}
      <span
        className={classNames(
          'inline-block text-base whitespace-nowrap text-soft max-xl:text-sm',
          // In narrow columns some would fit beside their figure and some not; below it they line up.
          uncertainty !== undefined && 'max-xl:block',
        )}
      >
        {uncertainty === undefined ? null : (
          <>
            ±{'\u202f'}
            {uncertainty}
          </>
        )}
        {typeof unit === 'string' ? withSpace(unit.trimStart()) : unit}
        {remark === undefined ? null : <span className="ml-3 whitespace-normal">{remark}</span>}
      </span>
    </span>
  )
}

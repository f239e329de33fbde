import type { ReactNode } from 'react'
import { Notice } from '@/components/ui/notice'
import type { AnalysisWarning } from '@/lib/analysis/types'
import { warningSentence, type Stage } from '@/lib/findings/warning-sentence'

/** A small heading over a group of figures. */
export function AsideGroup({ title, children }: { title: string; children: ReactNode }) {
  return (
    <div>
      <h3 className="mb-1.5 text-sm font-semibold text-soft">{title}</h3>
      {children}
    </div>
  )
}

export function Facts({ rows }: { rows: readonly [name: ReactNode, figure: ReactNode][] }) {
  return (
    <dl>
      {rows.map(([name, figure], index) => (
        <div key={index} className="flex items-baseline justify-between gap-3 border-b border-rule py-1 text-sm">
          <dt>{name}</dt>
          <dd className="figures text-right whitespace-nowrap">{figure}</dd>
        </div>
      ))}
    </dl>
  )
}

interface SmallTableProps {
  caption: string
  head: readonly string[]
  rows: readonly (readonly ReactNode[])[]
  /** Columns of words stand at the left; the others are figures. */
  wordColumns?: number
}

export function SmallTable({ caption, head, rows, wordColumns = 1 }: SmallTableProps) {
  return (
    <div className="overflow-x-auto">
      <table className="w-full text-sm">
        <caption className="mb-1.5 text-left text-sm font-semibold text-soft">{caption}</caption>
        <thead>
          <tr className="border-b border-rule">
            {head.map((title, index) => (
              <th
                key={title}
                scope="col"
                className={`py-1 text-xs font-semibold text-soft ${index < wordColumns ? 'text-left' : 'pl-2 text-right'}`}
              >
                {title}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((cells, row) => (
            <tr key={row} className="border-b border-rule">
              {cells.map((cell, index) => (
                <td
                  key={index}
                  className={
                    index < wordColumns
                      ? 'py-1 text-left leading-4'
                      : 'figures py-1 pl-2 text-right text-xs whitespace-nowrap'
                  }
                >
                  {cell}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  )
}

/** What the analysis warns of at one stage. */
export function StageWarnings({ warnings, stage }: { warnings: readonly AnalysisWarning[]; stage: Stage }) {
  const texts = warnings.map(warningSentence).filter((each) => each.stage === stage)
  if (texts.length === 0) return null
  return (
    <Notice tone="warning" className="text-sm">
      {texts.map(({ text }) => (
        <p key={text} className="text-sm not-first:mt-1.5">
          {text}
        </p>
      ))}
    </Notice>
  )
}

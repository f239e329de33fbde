'use client'

import { useSyncExternalStore } from 'react'
import { FindingText } from '@/components/findings/finding-text'
import { Mark } from '@/components/shell/mark'
import type { AnalysisResult } from '@/lib/analysis/types'
import { formatDay, formatDayAndTime } from '@/lib/client/dates'
import { titleFinding } from '@/lib/findings/title-finding'
import type { SharedAnalysis } from '@/lib/schemas/share'

/** Who gave the report to whom it reaches; null on a report that members look at themselves. */
export interface Sharing {
  by: string
  at: string
  expiresAt: string | null
  preface: string | null
}

interface ReportTitleProps {
  mountName: string
  subject: SharedAnalysis
  result: AnalysisResult | null
  sharing: Sharing | null
}

/** What this is, of which mount, from when and by whom. */
export function ReportTitle({ mountName, subject, result, sharing }: ReportTitleProps) {
  const { run } = subject
  const rows: [string, string][] = [
    ['Mount', mountName],
    ['Analysis', subject.name],
    ['Run', run.name],
    ['Recorded', run.facts.startedAt ? `${formatDayAndTime(run.facts.startedAt)} UTC` : 'not known'],
    ['Saved', formatDay(subject.savedAt)],
    ...(sharing ? ([['Shared by', `${sharing.by}, ${formatDay(sharing.at)}`]] as [string, string][]) : []),
  ]
  return (
    <header className="flex flex-col gap-4">
      <p className="flex items-center gap-2 text-sm text-soft">
        <Mark className="size-5" />
        Turnwright report on the periodic error of a mount
      </p>
      <h1 className="text-title font-semibold text-balance">
        {result ? <FindingText finding={titleFinding(result, subject.recipe)} /> : subject.name}
      </h1>
      <dl className="grid grid-cols-2 gap-x-8 gap-y-1.5 max-sm:grid-cols-1 print:grid-cols-2">
        {rows.map(([term, text]) => (
          <div key={term} className="grid grid-cols-[5.5rem_minmax(0,1fr)] gap-2">
            <dt className="text-soft">{term}</dt>
            <dd className="wrap-anywhere">{text}</dd>
          </div>
        ))}
      </dl>
      {sharing?.preface ? (
        <blockquote className="border-l-3 border-brass-fill pl-4 whitespace-pre-wrap text-pretty wrap-anywhere">
          {sharing.preface}
          <footer className="mt-1 text-sm text-soft">{sharing.by}</footer>
        </blockquote>
      ) : null}
    </header>
  )
}

/** On paper: where the report stands, and until when. */
export function PrintedAddress({ expiresAt }: { expiresAt: string | null }) {
  const address = useSyncExternalStore(subscribeToNothing, readAddress, () => null)
  if (address === null) return null
  return (
    <p className="hidden text-sm text-soft print:block">
      Read online{expiresAt === null ? '' : ` until ${formatDay(expiresAt)}`}:{' '}
      <span className="figures break-all">{address}</span>
    </p>
  )
}

function subscribeToNothing() {
  return () => undefined
}

function readAddress(): string {
  return window.location.origin + window.location.pathname
}

'use client'

import { useMemo, useRef } from 'react'
import { Notice } from '@/components/ui/notice'
import { ProgressBar } from '@/components/ui/progress-bar'
import { compareResults } from '@/lib/findings/rerun-finding'
import { recomputedText } from '@/lib/findings/method-text'
import { reasonSentence } from '@/lib/findings/reason-sentence'
import type { SharedAnalysis } from '@/lib/schemas/share'
import { PrintButton } from './print-button'
import { ReportBody } from './report-body'
import { ReportMethod, ReportNotes, ReportOrigin, ReportRun } from './report-end'
import { noteMarks, numberReportNotes } from './report-notes'
import { PrintedAddress, ReportTitle, type Sharing } from './report-title'
import { useReportViews } from './use-report-views'
import './report.css'

/** Engines differ in the last bits of sines and logarithms; a figure shows five digits at the most. */
const ROUNDING = 1e-9

interface ReportSheetProps {
  mountName: string
  subject: SharedAnalysis
  sharing: Sharing | null
  /** Where the run’s columns are answered. */
  columnsUrl: string
}

/**
 * One analysis to read and to print. Text, tables and what is drawn from figures alone stand at once; the pictures that
 * need the samples follow when the worker is done.
 */
export function ReportSheet({ mountName, subject, sharing, columnsUrl }: ReportSheetProps) {
  const sheet = useRef<HTMLElement>(null)
  const { outcome, progress, fault, isSettled } = useReportViews(
    subject.run.hasSameSamples ? columnsUrl : null,
    subject.recipe,
  )
  const computed = outcome?.ok ? outcome.result : null
  const saved = subject.result
  const result = saved ?? computed
  const notes = useMemo(() => numberReportNotes(subject.notes), [subject.notes])
  const marks = useMemo(() => noteMarks(notes), [notes])
  const recomputed = saved && computed ? recomputedText(saved, computed) : null
  // What another browser's rounding changes can't be seen in any figure: it stands with the versions, not above the report.
  const isDifferent =
    saved !== null && computed !== null && compareResults(saved, computed).largestRelativeDifference > ROUNDING
  const failure = outcome && !outcome.ok ? outcome : null

  return (
    <>
      <div className="no-print mx-auto flex w-full max-w-[48rem] flex-wrap items-center justify-between gap-3">
        <div className="min-w-48 flex-1">
          {isSettled ? null : <ProgressBar label="Drawing the pictures" fraction={progress?.fraction ?? null} />}
        </div>
        <PrintButton sheet={sheet} isSettled={isSettled} />
      </div>
      <article
        ref={sheet}
        className="report-sheet mx-auto flex w-full flex-col gap-7 rounded-card border border-rule bg-card px-10 py-8 max-sm:px-4 max-sm:py-5"
      >
        <ReportTitle mountName={mountName} subject={subject} result={result} sharing={sharing} />
        {fault ? <Notice>{fault}</Notice> : null}
        {isDifferent ? <Notice>{recomputed}</Notice> : null}
        {saved === null ? (
          <Notice>
            The figures of this analysis were kept by an earlier version that this one can’t show.{' '}
            {computed ? 'Those below were computed again from the same samples.' : 'They are being computed again.'}
          </Notice>
        ) : null}
        {failure ? <Notice tone="error">{reasonSentence(failure)}</Notice> : null}
        {result ? (
          <ReportBody
            result={result}
            views={outcome?.ok ? outcome.views : null}
            isWaiting={!isSettled}
            recipe={subject.recipe}
            marks={marks}
          />
        ) : null}
        <ReportNotes notes={notes} />
        <ReportRun run={subject.run} />
        {result ? <ReportMethod result={result} recipe={subject.recipe} /> : null}
        <ReportOrigin subject={subject} recomputed={isDifferent ? null : recomputed} />
        {sharing ? <PrintedAddress expiresAt={sharing.expiresAt} /> : null}
      </article>
    </>
  )
}

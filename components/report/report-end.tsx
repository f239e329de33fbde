import { anchorText } from '@/components/notes/note-types'
import {
  GUIDING_OPTIONS,
  MOUNT_CORRECTION_OPTIONS,
  SIDE_OF_PIER_OPTIONS,
  TRACKING_RATE_OPTIONS,
} from '@/components/runs/fact-options'
import type { SelectOption } from '@/components/ui/select'
import type { AnalysisResult, Recipe } from '@/lib/analysis/types'
import { formatDay } from '@/lib/client/dates'
import { methodText } from '@/lib/findings/method-text'
import type { SharedAnalysis } from '@/lib/schemas/share'
import { formatCount, formatNumber } from '@/lib/units'
import type { ReportNote } from './report-notes'
import { ReportFacts, ReportSection } from './report-section'

export function ReportNotes({ notes }: { notes: readonly ReportNote[] }) {
  if (notes.length === 0) return null
  return (
    <ReportSection title="Notes">
      <ul className="flex flex-col gap-3">
        {notes.map(({ number, note }, index) => (
          <li
            key={index}
            id={number === null ? undefined : `note-${number}`}
            className="border-l-3 border-plum py-0.5 pl-3"
          >
            <p className="whitespace-pre-wrap wrap-anywhere">
              {number === null ? null : (
                <span className="figures mr-1.5 inline-block rounded-[3px] border border-plum px-1.5 text-xs leading-4">
                  {number}
                </span>
              )}
              {note.text}
            </p>
            <p className="text-sm text-soft">
              {note.authorName}, {formatDay(note.createdAt)}, {anchorText(note.anchor)}
              {note.isSettled ? ', settled' : null}
            </p>
          </li>
        ))}
      </ul>
    </ReportSection>
  )
}

/** What is known of the run, as far as it bears on the figures. */
export function ReportRun({ run }: Pick<SharedAnalysis, 'run'>) {
  const { facts } = run
  const label = (options: readonly SelectOption[], value: string) =>
    options.find((option) => option.value === value)?.label ?? value
  return (
    <ReportSection title="The run">
      <ReportFacts
        rows={[
          ['correction in the mount', label(MOUNT_CORRECTION_OPTIONS, facts.mountCorrection)],
          ['guiding', label(GUIDING_OPTIONS, facts.guiding)],
          ['tracking rate', label(TRACKING_RATE_OPTIONS, facts.trackingRate)],
          ['side of the pier', label(SIDE_OF_PIER_OPTIONS, facts.sideOfPier)],
          ['hour angle', known(facts.hourAngleDegrees, '°')],
          ['temperature', known(facts.temperatureCelsius, '°C')],
          ['rows in the file', run.rowCount === null ? 'not known' : formatCount(run.rowCount)],
        ]}
      />
    </ReportSection>
  )
}

function known(value: number | null, unit: string): string {
  return value === null ? 'not known' : formatNumber(value, Number.isInteger(value) ? 0 : 1, { unit })
}

export function ReportMethod({ result, recipe }: { result: AnalysisResult; recipe: Recipe }) {
  return (
    <ReportSection title="How this was found">
      <dl className="flex flex-col gap-2.5">
        {methodText(result, recipe).map(({ title, text }) => (
          <div key={title}>
            <dt className="font-semibold">{title}</dt>
            <dd className="max-w-[80ch] text-pretty">{text}</dd>
          </div>
        ))}
      </dl>
    </ReportSection>
  )
}

interface ReportOriginProps {
  subject: SharedAnalysis
  /** What came out when it was computed again here; null while that is not known. */
  recomputed: string | null
}

/** By what, from what: enough to tell whether two reports speak of the same samples. */
export function ReportOrigin({ subject, recomputed }: ReportOriginProps) {
  const rows = [
    ['Version of the computation', subject.engineVersion],
    ['SHA-256 of the samples', subject.samplesSha256],
    ['SHA-256 of the file', subject.run.fileSha256],
  ]
  return (
    <ReportSection title="Versions and origin">
      <dl className="flex flex-col gap-1.5 text-sm">
        {rows.map(([term, text]) => (
          <div key={term}>
            <dt className="text-soft">{term}</dt>
            <dd className="figures break-all">{text}</dd>
          </div>
        ))}
      </dl>
      {recomputed ? <p className="text-sm">{recomputed}</p> : null}
    </ReportSection>
  )
}

'use client'

import Link from 'next/link'
import { useMemo } from 'react'
import { PageHeading } from '@/components/shell/page-heading'
import { ButtonLink } from '@/components/ui/button'
import { EmptyState } from '@/components/ui/empty-state'
import { FilterSelect } from '@/components/ui/filter-row'
import type { ListColumn } from '@/components/ui/server-table-model'
import type { Dates } from '@/lib/client/dates'
import { useDates, useDisplay } from '@/lib/client/display'
import { useProject } from '@/lib/client/project-data'
import { useList, useListAddress } from '@/lib/client/use-list'
import { formatSwing, type Display } from '@/lib/display-units'
import { findingText } from '@/lib/findings/finding'
import { analysesFinding } from '@/lib/findings/list-findings'
import { analysisFilterWords } from '@/lib/findings/shown-sentence'
import { analysisListSchema, analysisQuerySchema, listSearch, type AnalysisSummary } from '@/lib/schemas/lists'
import { ABSENT, formatEstimate } from '@/lib/units'
import { ListFrame } from './list-frame'

/** The value with its standard error; a dash where there is none. */
function estimateText(value: number | null, stderr: number | null, unit: string): string {
  return formatEstimate(value === null ? null : { value, stderr }, { unit })
}

const columnsIn = ({ day }: Dates, display: Display): readonly ListColumn<AnalysisSummary>[] => [
  {
    id: 'name',
    header: 'Analysis',
    cell: ({ id, projectId, name }) => (
      <Link className="link font-semibold" href={`/projects/${projectId}/analyses/${id}`}>
        {name}
      </Link>
    ),
  },
  {
    id: 'run',
    isName: true,
    header: 'Run',
    isSecondary: true,
    cell: ({ projectId, runId, runName }) => (
      <Link className="hover:underline" href={`/projects/${projectId}/runs/${runId}`}>
        {runName}
      </Link>
    ),
  },
  {
    id: 'period',
    header: 'Worm period',
    isNumeric: true,
    isSecondary: true,
    cell: ({ wormPeriodSeconds, wormPeriodStderrSeconds }) =>
      estimateText(wormPeriodSeconds, wormPeriodStderrSeconds, 's'),
  },
  {
    id: 'amplitude',
    header: display.swingMeasure === 'amplitude' ? 'Worm amplitude' : 'Fundamental, p–p',
    isNumeric: true,
    isSecondary: true,
    startsDescending: true,
    cell: ({ wormAmplitudeArcsec, wormAmplitudeStderrArcsec }) =>
      wormAmplitudeArcsec === null
        ? ABSENT
        : formatSwing({ value: wormAmplitudeArcsec, stderr: wormAmplitudeStderrArcsec }, display),
  },
  {
    id: 'peak',
    header: display.swingMeasure === 'amplitude' ? 'Peak to peak' : 'Whole worm, p–p',
    isNumeric: true,
    startsDescending: true,
    cell: ({ peakToPeakArcsec, peakToPeakStderrArcsec }) => estimateText(peakToPeakArcsec, peakToPeakStderrArcsec, '″'),
  },
  { id: 'by', header: 'Saved by', isSecondary: true, isName: true, cell: ({ createdBy }) => createdBy },
  {
    id: 'created',
    header: 'On',
    isSecondary: true,
    startsDescending: true,
    cell: ({ createdAt }) => <span className="whitespace-nowrap">{day(createdAt)}</span>,
  },
]

export function AnalysesScreen({ projectId }: { projectId: string }) {
  const project = useProject(projectId)
  const address = useListAddress(analysisQuerySchema)
  const { query, change } = address
  const dates = useDates()
  const display = useDisplay()
  const columns = useMemo(() => columnsIn(dates, display), [dates, display])
  const answer = useList(
    `/api/projects/${projectId}/analyses${listSearch(analysisQuerySchema, query)}`,
    analysisListSchema,
  )
  return (
    <ListFrame
      noun={{ one: 'analysis', many: 'analyses' }}
      answer={answer}
      address={address}
      columns={columns}
      rowsOf={({ analyses }) => analyses}
      heading={(data) => (
        <PageHeading
          crumbs={[{ label: project.data?.name ?? 'Project', href: `/projects/${projectId}` }, { label: 'Analyses' }]}
          title={findingText(analysesFinding(data))}
          lead={data.all > 0 ? 'Each keeps its settings and its figures as they were saved.' : undefined}
        />
      )}
      nothingYet={
        <EmptyState
          title="Open a run and save what it shows"
          actions={
            <ButtonLink href={`/projects/${projectId}/runs`} variant="primary">
              To the runs
            </ButtonLink>
          }
        >
          The bench of a run works the figures out while you watch. Save them there as an analysis; a correction table
          is made from a saved analysis.
        </EmptyState>
      }
      searched="name, run or person"
      filtered={(data) => analysisFilterWords(query, data.overview.runName)}
      filters={
        <FilterSelect
          label="Figure for the worm"
          value={query.worm}
          options={[
            { value: 'with', label: 'there is one' },
            { value: 'without', label: 'there is none' },
          ]}
          onValue={(worm) => change({ worm })}
        />
      }
    />
  )
}

'use client'

import Link from 'next/link'
import { PageHeading } from '@/components/shell/page-heading'
import { ButtonLink } from '@/components/ui/button'
import { DataState } from '@/components/ui/data-state'
import { DataTable } from '@/components/ui/data-table'
import type { DataColumn } from '@/components/ui/data-table-model'
import { EmptyState } from '@/components/ui/empty-state'
import { formatDay } from '@/lib/client/dates'
import { useAnalyses, useProject, type AnalysisRow } from '@/lib/client/project-data'
import { findingText } from '@/lib/findings/finding'
import { analysesFinding } from '@/lib/findings/list-findings'
import { formatNumber } from '@/lib/units'

const columns: readonly DataColumn<AnalysisRow>[] = [
  {
    id: 'name',
    header: 'Analysis',
    value: ({ name }) => name,
    cell: ({ id, projectId, name }) => (
      <Link className="link font-semibold" href={`/projects/${projectId}/analyses/${id}`}>
        {name}
      </Link>
    ),
  },
  {
    id: 'run',
    header: 'Run',
    isSecondary: true,
    value: ({ runName }) => runName,
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
    value: ({ wormPeriodSeconds }) => wormPeriodSeconds,
    cell: ({ wormPeriodSeconds }) => formatNumber(wormPeriodSeconds, 2, { unit: 's' }),
  },
  {
    id: 'amplitude',
    header: 'Worm amplitude',
    isNumeric: true,
    isSecondary: true,
    value: ({ wormAmplitudeArcsec }) => wormAmplitudeArcsec,
    cell: ({ wormAmplitudeArcsec }) => formatNumber(wormAmplitudeArcsec, 2, { unit: '″' }),
  },
  {
    id: 'peak',
    header: 'Peak to peak',
    isNumeric: true,
    value: ({ peakToPeakArcsec }) => peakToPeakArcsec,
    cell: ({ peakToPeakArcsec }) => formatNumber(peakToPeakArcsec, 1, { unit: '″' }),
  },
  { id: 'by', header: 'Saved by', isSecondary: true, value: ({ createdBy }) => createdBy },
  {
    id: 'on',
    header: 'On',
    isSecondary: true,
    value: ({ createdAt }) => createdAt,
    cell: ({ createdAt }) => formatDay(createdAt),
  },
]

export function AnalysesScreen({ projectId }: { projectId: string }) {
  const project = useProject(projectId)
  const { data, error, mutate } = useAnalyses(projectId)
  return (
    <DataState what="the analyses" data={data} error={error} onRetry={() => void mutate()}>
      {(analyses) => (
        <>
          <PageHeading
            crumbs={[{ label: project.data?.name ?? 'Project', href: `/projects/${projectId}` }, { label: 'Analyses' }]}
            title={findingText(analysesFinding(analyses))}
            lead={
              analyses.length > 0
                ? 'Each keeps its settings and its figures as they were saved; its standard errors stand on its own page.'
                : undefined
            }
          />
          {analyses.length === 0 ? (
            <EmptyState
              title="Open a run and save what it shows"
              actions={
                <ButtonLink href={`/projects/${projectId}/runs`} variant="primary">
                  To the runs
                </ButtonLink>
              }
            >
              The bench of a run works the figures out while you watch. Save them there as an analysis; a correction
              table is made from a saved analysis.
            </EmptyState>
          ) : (
            <DataTable
              caption="analyses"
              columns={columns}
              rows={analyses}
              rowId={({ id }) => id}
              initialSort={{ id: 'on', desc: true }}
            />
          )}
        </>
      )}
    </DataState>
  )
}

'use client'

import Link from 'next/link'
import { unitText } from '@/components/corrections/table-words'
import { PageHeading } from '@/components/shell/page-heading'
import { ButtonLink } from '@/components/ui/button'
import { DataState } from '@/components/ui/data-state'
import { DataTable } from '@/components/ui/data-table'
import type { DataColumn } from '@/components/ui/data-table-model'
import { EmptyState } from '@/components/ui/empty-state'
import { formatDay } from '@/lib/client/dates'
import { useCorrections, useProject, type CorrectionRow } from '@/lib/client/project-data'
import { findingText } from '@/lib/findings/finding'
import { correctionsFinding } from '@/lib/findings/list-findings'

const columns: readonly DataColumn<CorrectionRow>[] = [
  {
    id: 'name',
    header: 'Correction table',
    value: ({ name }) => name,
    cell: ({ id, projectId, name }) => (
      <Link className="link font-semibold" href={`/projects/${projectId}/corrections/${id}`}>
        {name}
      </Link>
    ),
  },
  {
    id: 'analysis',
    header: 'Made from',
    isSecondary: true,
    value: ({ analysisName }) => analysisName,
    cell: ({ projectId, analysisId, analysisName }) => (
      <Link className="hover:underline" href={`/projects/${projectId}/analyses/${analysisId}`}>
        {analysisName}
      </Link>
    ),
  },
  {
    id: 'kind',
    header: 'Kind',
    isSecondary: true,
    value: ({ kind }) => (kind === 'addition' ? 'added to the table in the mount' : 'stands alone'),
  },
  { id: 'bins', header: 'Bins', isSecondary: true, isNumeric: true, value: ({ settings }) => settings.binCount },
  {
    id: 'unit',
    header: 'Values',
    isSecondary: true,
    value: ({ settings }) => `${settings.meaning}, ${unitText(settings.unit)}`,
  },
  { id: 'sense', header: 'Sense', value: ({ senseBasis }) => senseBasis },
  { id: 'by', header: 'Made by', isSecondary: true, value: ({ createdBy }) => createdBy },
  {
    id: 'on',
    header: 'On',
    isSecondary: true,
    value: ({ createdAt }) => createdAt,
    cell: ({ createdAt }) => formatDay(createdAt),
  },
]

export function CorrectionsScreen({ projectId }: { projectId: string }) {
  const project = useProject(projectId)
  const { data, error, mutate } = useCorrections(projectId)
  return (
    <DataState what="the correction tables" data={data} error={error} onRetry={() => void mutate()}>
      {(corrections) => (
        <>
          <PageHeading
            crumbs={[
              { label: project.data?.name ?? 'Project', href: `/projects/${projectId}` },
              { label: 'Corrections' },
            ]}
            title={findingText(correctionsFinding(corrections))}
          />
          {corrections.length === 0 ? (
            <EmptyState
              title="Make a table from a saved analysis"
              actions={
                <ButtonLink href={`/projects/${projectId}/analyses`} variant="primary">
                  To the analyses
                </ButtonLink>
              }
            >
              The last stage of an analysis shows what a table would take out, rehearsed on turns that it was not made
              from. If that is worth it, make the table there.
            </EmptyState>
          ) : (
            <DataTable
              caption="correction tables"
              columns={columns}
              rows={corrections}
              rowId={({ id }) => id}
              initialSort={{ id: 'on', desc: true }}
            />
          )}
        </>
      )}
    </DataState>
  )
}

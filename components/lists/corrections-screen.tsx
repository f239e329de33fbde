'use client'

import Link from 'next/link'
import { useMemo } from 'react'
import { unitText } from '@/components/corrections/table-words'
import { PageHeading } from '@/components/shell/page-heading'
import { ButtonLink } from '@/components/ui/button'
import { EmptyState } from '@/components/ui/empty-state'
import { FilterSelect } from '@/components/ui/filter-row'
import type { ListColumn } from '@/components/ui/server-table-model'
import type { Dates } from '@/lib/client/dates'
import { useDates } from '@/lib/client/display'
import { useProject } from '@/lib/client/project-data'
import { useList, useListAddress } from '@/lib/client/use-list'
import { findingText } from '@/lib/findings/finding'
import { correctionsFinding } from '@/lib/findings/list-findings'
import { correctionFilterWords } from '@/lib/findings/shown-sentence'
import { correctionListSchema, correctionQuerySchema, listSearch, type CorrectionSummary } from '@/lib/schemas/lists'
import { ListFrame } from './list-frame'

const columnsIn = ({ day }: Dates): readonly ListColumn<CorrectionSummary>[] => [
  {
    id: 'name',
    header: 'Correction table',
    cell: ({ id, projectId, name }) => (
      <Link className="link font-semibold" href={`/projects/${projectId}/corrections/${id}`}>
        {name}
      </Link>
    ),
  },
  {
    id: 'analysis',
    isName: true,
    header: 'Made from',
    isSecondary: true,
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
    cell: ({ kind }) => (kind === 'addition' ? 'added to the table in the mount' : 'stands alone'),
  },
  {
    id: 'bins',
    header: 'Bins',
    isSecondary: true,
    isNumeric: true,
    startsDescending: true,
    cell: ({ settings }) => settings.binCount,
  },
  {
    id: 'unit',
    header: 'Values',
    isSecondary: true,
    isSortable: false,
    cell: ({ settings }) => `${settings.meaning}, ${unitText(settings.unit)}`,
  },
  { id: 'sense', header: 'Sense', cell: ({ senseBasis }) => senseBasis },
  { id: 'by', header: 'Made by', isSecondary: true, isName: true, cell: ({ createdBy }) => createdBy },
  {
    id: 'created',
    header: 'On',
    isSecondary: true,
    startsDescending: true,
    cell: ({ createdAt }) => <span className="whitespace-nowrap">{day(createdAt)}</span>,
  },
]

export function CorrectionsScreen({ projectId }: { projectId: string }) {
  const project = useProject(projectId)
  const address = useListAddress(correctionQuerySchema)
  const { query, change } = address
  const dates = useDates()
  const columns = useMemo(() => columnsIn(dates), [dates])
  const answer = useList(
    `/api/projects/${projectId}/corrections${listSearch(correctionQuerySchema, query)}`,
    correctionListSchema,
  )
  return (
    <ListFrame
      noun={{ one: 'correction table', many: 'correction tables' }}
      answer={answer}
      address={address}
      columns={columns}
      rowsOf={({ corrections }) => corrections}
      heading={(data) => (
        <PageHeading
          crumbs={[
            { label: project.data?.name ?? 'Project', href: `/projects/${projectId}` },
            { label: 'Corrections' },
          ]}
          title={findingText(correctionsFinding(data))}
        />
      )}
      nothingYet={
        <EmptyState
          title="Make a table from a saved analysis"
          actions={
            <ButtonLink href={`/projects/${projectId}/analyses`} variant="primary">
              To the analyses
            </ButtonLink>
          }
        >
          The last stage of an analysis shows what a table would take out, rehearsed on turns that it was not made from.
          If that is worth it, make the table there.
        </EmptyState>
      }
      searched="name, analysis or person"
      filtered={() => correctionFilterWords(query)}
      filters={
        <>
          <FilterSelect
            label="Kind"
            value={query.kind}
            options={[
              { value: 'stand-alone', label: 'stands alone' },
              { value: 'addition', label: 'added to the table in the mount' },
            ]}
            onValue={(kind) => change({ kind })}
          />
          <FilterSelect
            label="Sense"
            value={query.sense}
            options={[
              { value: 'proven', label: 'proven' },
              { value: 'assumed', label: 'assumed' },
            ]}
            onValue={(sense) => change({ sense })}
          />
        </>
      }
    />
  )
}

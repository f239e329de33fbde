'use client'

import Link from 'next/link'
import { PageHeading } from '@/components/shell/page-heading'
import { FindingText } from '@/components/findings/finding-text'
import { ButtonAnchor } from '@/components/ui/button'
import { DataState } from '@/components/ui/data-state'
import { DataTable } from '@/components/ui/data-table'
import type { DataColumn } from '@/components/ui/data-table-model'
import { FigureStrip, type KeyFigure } from '@/components/ui/figure-strip'
import { Notice } from '@/components/ui/notice'
import { FactRow, SheetSection } from '@/components/ui/sheet-section'
import { useDates } from '@/lib/client/display'
import { useCorrection, useProject } from '@/lib/client/project-data'
import { TABLE_CAUTIONS } from '@/lib/findings/correction-finding'
import { findingText } from '@/lib/findings/finding'
import { closureFinding, tableFinding } from '@/lib/findings/table-finding'
import type { Correction } from '@/lib/schemas/api'
import { rehearsedTableSchema, type RehearsedTable } from '@/lib/schemas/kept-figures'
import { formatNumber, formatPercent, formatSignificant } from '@/lib/units'
import { BinPicture } from './bin-picture'
import { tableMeaning, unitText } from './table-words'

interface CorrectionScreenProps {
  projectId: string
  correctionId: string
}

export function CorrectionScreen({ projectId, correctionId }: CorrectionScreenProps) {
  const project = useProject(projectId)
  const { data, error, mutate } = useCorrection(projectId, correctionId)
  return (
    <DataState what="the correction table" data={data} error={error} onRetry={() => void mutate()}>
      {(correction) => <CorrectionPage correction={correction} projectName={project.data?.name ?? 'Project'} />}
    </DataState>
  )
}

type Bin = Correction['table']['bins'][number]

function CorrectionPage({ correction, projectName }: { correction: Correction; projectName: string }) {
  const { projectId, settings, table } = correction
  const base = `/projects/${projectId}`
  const download = `/api${base}/corrections/${correction.id}/download?format=`
  const parsed = rehearsedTableSchema.safeParse(table)
  const rehearsed = parsed.success ? parsed.data : null
  const finding = tableFinding(rehearsed, table.bins.length)
  const unit = unitText(settings.unit)
  const what = settings.meaning === 'correction' ? 'what the table adds' : 'what the axis does wrong'

  return (
    <>
      <PageHeading
        crumbs={[
          { label: projectName, href: base },
          { label: 'Corrections', href: `${base}/corrections` },
          { label: correction.name },
        ]}
        title={findingText(finding)}
        actions={
          <>
            <ButtonAnchor href={`${download}json`} download>
              JSON
            </ButtonAnchor>
            <ButtonAnchor href={`${download}csv`} download variant="primary">
              Download CSV
            </ButtonAnchor>
          </>
        }
      />
      {rehearsed ? <FigureStrip figures={rehearsalFigures(rehearsed)} /> : null}
      <SheetSection
        number={1}
        title="Before you load it"
        question="A table moves the mount by itself. These come first."
        aside={<Origin correction={correction} />}
      >
        <div className="flex flex-col gap-3">
          {correction.senseBasis === 'assumed' ? (
            <Notice tone="error" title="The sense of this recording is only assumed">
              If it is the other way round, this table doubles the error. Prove the sense with one deliberate guide
              pulse to the west, which must make the star jump east, before loading it.
            </Notice>
          ) : null}
          {correction.kind === 'addition' ? (
            <Notice tone="warning" title="This is an addition, not a table by itself">
              A correction was playing while the run was recorded, or nobody knows that none was. Add these values to
              the table that was in the mount; loaded alone they bring back what that table took out.
            </Notice>
          ) : null}
          <ul className="flex list-disc flex-col gap-2 pl-5">
            {TABLE_CAUTIONS.map((caution) => (
              <li key={caution} className="text-pretty">
                {caution}
              </li>
            ))}
          </ul>
        </div>
      </SheetSection>
      <SheetSection
        number={2}
        title="What it means"
        question="How the numbers are to be read. The downloaded file says the same beside them."
        finding={<FindingText finding={closureFinding(table.closureError, settings.quantity)} />}
      >
        <ul className="mb-5 flex max-w-[80ch] list-disc flex-col gap-1 pl-5">
          {tableMeaning(settings, { wormPeriodSeconds: table.wormPeriodSeconds, orders: rehearsed?.orders }).map(
            (line) => (
              <li key={line} className="text-pretty">
                {line}
              </li>
            ),
          )}
        </ul>
        <BinPicture
          values={table.bins.map(({ value }) => value)}
          axisTitle={`${what}, ${unit}`}
          summary={`${findingText(finding)}. One bar for each of ${table.bins.length} bins; the numbers stand in the table below.`}
        />
      </SheetSection>
      <SheetSection number={3} title="Bins" question="The numbers themselves, as the files hold them.">
        <div className="no-print max-w-2xl">
          <BinTable bins={table.bins} unit={unit} />
        </div>
        <PrintedBins bins={table.bins} unit={unit} />
      </SheetSection>
    </>
  )
}

function Origin({ correction }: { correction: Correction }) {
  const { day } = useDates()
  const base = `/projects/${correction.projectId}`
  return (
    <>
      <h3 className="text-sm font-semibold text-soft">Where it comes from</h3>
      <dl>
        <FactRow name="analysis">
          <Link className="link font-sans" href={`${base}/analyses/${correction.analysisId}`}>
            {correction.analysisName}
          </Link>
        </FactRow>
        <FactRow name="sense">
          <span className="font-sans">{correction.senseBasis}</span>
        </FactRow>
        <FactRow name="kind">
          <span className="font-sans">{correction.kind === 'addition' ? 'addition' : 'stands alone'}</span>
        </FactRow>
        <FactRow name="made by">
          <span className="font-sans">{correction.createdBy}</span>
        </FactRow>
        <FactRow name="on">
          <span className="font-sans">{day(correction.createdAt)}</span>
        </FactRow>
      </dl>
    </>
  )
}

/** All bins at once: paper has no pages to turn within a table. */
function PrintedBins({ bins, unit }: { bins: readonly Bin[]; unit: string }) {
  return (
    <div className="hidden print:block">
      <p className="mb-2 text-sm text-soft">Bin, worm angle, value in {unit}</p>
      <ol className="figures columns-3 gap-8 text-xs">
        {bins.map(({ index, angleDegrees, value }) => (
          <li key={index} className="grid grid-cols-3 border-b border-rule py-0.5 text-right">
            <span>{index}</span>
            <span>{formatNumber(angleDegrees, 2, { unit: '°' })}</span>
            <span>{formatNumber(value, 4, { isSigned: true })}</span>
          </li>
        ))}
      </ol>
    </div>
  )
}

function BinTable({ bins, unit }: { bins: readonly Bin[]; unit: string }) {
  const columns: readonly DataColumn<Bin>[] = binColumns(unit)
  return (
    <DataTable
      caption="values of the bins"
      columns={columns}
      rows={bins}
      rowId={({ index }) => String(index)}
      pageSize={24}
      hasFilter={false}
    />
  )
}

const columnsByUnit = new Map<string, readonly DataColumn<Bin>[]>()

/** The same array for the same unit: the table sorts anew whenever its columns are new. */
function binColumns(unit: string): readonly DataColumn<Bin>[] {
  const known = columnsByUnit.get(unit)
  if (known) return known
  const columns: readonly DataColumn<Bin>[] = [
    { id: 'bin', header: 'Bin', isNumeric: true, value: ({ index }) => index },
    {
      id: 'angle',
      header: 'Worm angle',
      isNumeric: true,
      value: ({ angleDegrees }) => angleDegrees,
      cell: ({ angleDegrees }) => formatNumber(angleDegrees, 2, { unit: '°' }),
    },
    {
      id: 'value',
      header: `Value, ${unit}`,
      isNumeric: true,
      value: ({ value }) => value,
      cell: ({ value }) => formatNumber(value, 4, { isSigned: true }),
    },
  ]
  columnsByUnit.set(unit, columns)
  return columns
}

function rehearsalFigures({ rehearsal, largestRateArcsecPerSecond }: RehearsedTable): KeyFigure[] {
  const figures: KeyFigure[] = [
    { label: 'Off the RMS of other turns', value: formatPercent(rehearsal.heldOutReduction) },
    { label: 'Worm, peak to peak', value: formatNumber(rehearsal.peakToPeakBeforeArcsec, 1), unit: '″' },
    { label: 'Of it, left by the bins', value: formatSignificant(rehearsal.peakToPeakAfterArcsec, 2), unit: '″' },
    { label: 'A tenth is back at a slip of', value: formatNumber(rehearsal.slipForTenPercentDegrees, 1), unit: '°' },
    { label: 'No help left at a slip of', value: formatNumber(rehearsal.slipForNoHelpDegrees, 0), unit: '°' },
    { label: 'Steepest rate it asks for', value: formatSignificant(largestRateArcsecPerSecond, 2), unit: '″/s' },
  ]
  return figures
}

'use client'

import { useMemo, useRef } from 'react'
import { PlotlyChart } from '@/components/charts/plotly-chart'
import { TableChart } from '@/components/charts/table-chart'
import { useWidth } from '@/components/charts/use-width'
import type { Recipe, TableResult } from '@/lib/analysis/types'
import type { FigureFrame } from '@/lib/figures/figure'
import { tablePicture } from '@/lib/figures/table-picture'
import { slipFigure } from '@/lib/figures/turn-figure'
import { tableAngleDegrees } from '@/lib/figures/worm-angle'
import { correctionFinding } from '@/lib/findings/correction-finding'
import { findingText } from '@/lib/findings/finding'
import { arcsec, harmonicName, originName, senseMark } from '@/lib/findings/words'
import { formatNumber, formatPercent, formatSignificant } from '@/lib/units'
import { AsideGroup, Facts, SmallTable, StageWarnings } from './aside'
import { CorrectionSettings } from './correction-settings'
import { MakeTable, type MakeTableProps } from './make-table'
import { PictureSpace } from './picture-space'
import { Stage } from './stage'
import type { StageInput } from './stage-props'
import { useNoteMarks } from './use-stage-notes'

interface CorrectionStageProps extends StageInput {
  hasWormAngle: boolean
  making: Omit<MakeTableProps, 'recipe'>
}

export function CorrectionStage(props: CorrectionStageProps) {
  const { result, views, recipe, change, notes, isLocked, hasWormAngle, making } = props
  const holder = useRef<HTMLDivElement>(null)
  const width = useWidth(holder)
  const table = result?.table ?? null
  const finding = result ? correctionFinding(result, recipe) : null
  const slip = views?.slip ?? null
  const makeSlip = useMemo(
    () => (slip && table ? (frame: FigureFrame) => slipFigure({ slip, ...table.rehearsal, frame }) : null),
    [slip, table],
  )
  const { marks, link } = useNoteMarks(notes, 'worm-angle')
  const angleMarks =
    result && table
      ? marks.map(({ value, ...mark }) => ({
          ...mark,
          angleDegrees: tableAngleDegrees(value, { table, run: result.run }),
        }))
      : []

  return (
    <Stage
      number={6}
      title="Correction"
      question="What a table would add to the axis, bin by bin round the worm."
      isLocked={isLocked}
      settings={<CorrectionSettings result={result} recipe={recipe} change={change} hasWormAngle={hasWormAngle} />}
      finding={finding}
      aside={
        result && table ? (
          <>
            <AsideGroup title="If the worm angle slips">
              <Facts
                rows={[
                  [
                    '10\u202f% of the worm is back at',
                    `± ${formatNumber(table.rehearsal.slipForTenPercentDegrees, 1)}°`,
                  ],
                  ['no help left at', `± ${formatNumber(table.rehearsal.slipForNoHelpDegrees, 0)}°`],
                ]}
              />
            </AsideGroup>
            <MakeTable recipe={recipe} {...making} />
            <StageWarnings warnings={result.warnings} stage="correction" />
          </>
        ) : null
      }
    >
      <div ref={holder} className="min-w-0">
        {result?.worm && table && finding ? (
          <>
            <TableChart
              picture={tablePicture(table, result.worm, result.run)}
              summary={findingText(finding)}
              axisTitle={axisTitle(recipe)}
              angleTitle={angleTitle(table)}
              notes={angleMarks}
              markLink={link}
              isNarrow={width > 0 && width < 560}
            />
            {makeSlip ? (
              <div className="mt-4">
                <PlotlyChart
                  name="slip"
                  summary={`If the worm angle slips by ${formatNumber(table.rehearsal.slipForTenPercentDegrees, 1)}°, a tenth of the worm is back; beyond ${formatNumber(table.rehearsal.slipForNoHelpDegrees, 0)}° the table no longer helps.`}
                  makeFigure={makeSlip}
                />
              </div>
            ) : null}
            <div className="mt-4 grid gap-x-10 gap-y-4 sm:grid-cols-2">
              <TableFacts table={table} />
              <RehearsalTable table={table} />
            </div>
          </>
        ) : (
          <PictureSpace heightPx={result ? 120 : 238}>
            {result ? 'There is no table to draw.' : 'The table appears here.'}
          </PictureSpace>
        )}
      </div>
    </Stage>
  )
}

function axisTitle({ table, conversion }: Recipe): string {
  const unit = {
    arcsec: 'arcsec',
    'arcsec-per-second': 'arcsec per second',
    'percent-sidereal': '% of the sidereal rate',
  }[table.unit]
  const what = table.meaning === 'correction' ? 'what the table adds' : 'what the axis does wrong'
  return `${what}, ${unit}, ahead is up${senseMark(conversion.senseBasis)}`
}

function angleTitle({ settings }: TableResult): string {
  const offset =
    settings.offsetDegrees === 0
      ? ''
      : ` ${settings.offsetDegrees > 0 ? '+' : '−'} ${Math.abs(settings.offsetDegrees)}°`
  return `worm angle from ${originName(settings.origin)}${offset}${settings.angleDirection === 'decreasing' ? ', falling' : ''}`
}

function TableFacts({ table }: { table: TableResult }) {
  const { rehearsal, settings } = table
  const unit = { arcsec: '″', 'arcsec-per-second': '″/s', 'percent-sidereal': '%' }[settings.unit]
  return (
    <AsideGroup title="The table">
      <Facts
        rows={[
          ['worm period', formatNumber(table.wormPeriodSeconds, 2, { unit: 's' })],
          ['closes to zero within', closure(table.closureError) + unit],
          ['largest rate', formatSignificant(table.largestRateArcsecPerSecond, 2, { unit: '″/s' })],
          ['lost to bins and playing', formatPercent(rehearsal.binningLossShare, 1)],
          ['peak to peak, before', arcsec(rehearsal.peakToPeakBeforeArcsec)],
          ['peak to peak, after', arcsec(rehearsal.peakToPeakAfterArcsec)],
        ]}
      />
    </AsideGroup>
  )
}

function closure(error: number): string {
  return Math.abs(error) < 1e-9 ? '10⁻⁹' : formatSignificant(Math.abs(error), 1)
}

function RehearsalTable({ table }: { table: TableResult }) {
  return (
    <SmallTable
      caption="Played as written, on this run"
      head={['harmonic', 'before ″', 'after ″']}
      rows={table.rehearsal.orders.map(({ order, beforeArcsec, afterArcsec, isIncluded }) => [
        isIncluded ? harmonicName(order) : `${harmonicName(order)}, left in`,
        formatNumber(beforeArcsec, 2),
        formatNumber(afterArcsec, 3),
      ])}
    />
  )
}

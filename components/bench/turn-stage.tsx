'use client'

import { useMemo } from 'react'
import { DialChart } from '@/components/charts/dial-chart'
import { LegendEntry } from '@/components/charts/picture'
import { PlotlyChart } from '@/components/charts/plotly-chart'
import type { AnalysisResult } from '@/lib/analysis/types'
import { displacementFactor, displacementUnitOf, sizedDisplacement, type Display } from '@/lib/display-units'
import type { FigureFrame } from '@/lib/figures/figure'
import { turnFigure } from '@/lib/figures/turn-figure'
import { findingText } from '@/lib/findings/finding'
import { turnFinding } from '@/lib/findings/turn-finding'
import { countWord, degrees, senseMark } from '@/lib/findings/words'
import { formatNumber, formatPercent } from '@/lib/units'
import { AsideGroup, Facts, SmallTable, StageWarnings } from './aside'
import { NO_VIEWS, PictureSpace } from './picture-space'
import { FactSetting } from './setting-rows'
import { Stage } from './stage'
import type { StageInput } from './stage-props'
import { useStageNotes } from './use-stage-notes'

export function TurnStage({ result, views, recipe, display, notes, noteActions, isLocked }: StageInput) {
  const { marks, link, pick, pickBar, aside } = useStageNotes({
    kind: 'worm-angle',
    notes,
    actions: noteActions,
    startAt: result?.worm ? { kind: 'worm-angle', angleDegrees: 0 } : null,
  })
  const sense = senseMark(recipe.conversion.senseBasis)
  const turn = views?.turn ?? null
  const angleMarks = useMemo(() => marks.map(({ value, ...mark }) => ({ ...mark, angleDegrees: value })), [marks])
  const makeFigure = useMemo(() => {
    if (!turn) return null
    return (frame: FigureFrame) => turnFigure({ turn, senseMark: sense, notes: angleMarks, display, frame })
  }, [turn, sense, angleMarks, display])
  const finding = result ? turnFinding(result) : null
  const pickAngle = pick ? (angleDegrees: number) => pick({ kind: 'worm-angle', angleDegrees }) : undefined
  const summary = finding && result ? `${findingText(finding)} ${extremaWords(result, { sense, display })}` : ''

  return (
    <Stage
      number={4}
      title="Turn"
      question="Every turn laid over the others, once round the worm. Outward is ahead, inward behind."
      isLocked={isLocked}
      settings={
        <>
          <FactSetting label="Zero at">run start</FactSetting>
          {result?.turn ? <FactSetting label="Turns">{result.turn.completeTurns}</FactSetting> : null}
        </>
      }
      finding={finding}
      aside={
        result ? (
          <>
            <Predictions result={result} display={display} />
            <WormFacts result={result} sense={sense} display={display} />
            <StageWarnings warnings={result.warnings} stage="turn" />
            {aside}
          </>
        ) : null
      }
    >
      {result?.worm && turn && makeFigure ? (
        <div className="grid items-start gap-x-6 gap-y-4 md:grid-cols-[minmax(0,6fr)_minmax(0,7fr)]">
          <DialChart
            turn={turn}
            summary={`${summary} As a dial.`}
            senseMark={sense}
            display={display}
            notes={angleMarks}
            markLink={link}
            onPick={pickAngle}
          />
          <PlotlyChart
            name="turn"
            summary={summary}
            makeFigure={makeFigure}
            marks={marks.map(({ value, ...mark }) => ({ ...mark, x: value }))}
            markLink={link}
            onPick={pickAngle}
            legend={
              <>
                <LegendEntry look="recorded">each turn</LegendEntry>
                <LegendEntry look="fitted">fitted</LegendEntry>
              </>
            }
          >
            {pickBar}
          </PlotlyChart>
        </div>
      ) : (
        <PictureSpace heightPx={result && !result.worm ? 120 : 380}>
          {result
            ? result.worm
              ? NO_VIEWS
              : 'Without a worm period the turns can’t be laid over one another.'
            : 'The turns appear here.'}
        </PictureSpace>
      )}
    </Stage>
  )
}

function Predictions({ result: { turn }, display }: { result: AnalysisResult; display: Display }) {
  const [unit, factor] = [displacementUnitOf(display), displacementFactor(display)]
  if (!turn) return null
  if (turn.predictions.length === 0) {
    return <p className="text-sm text-soft">With fewer than three turns none can be foretold by the others.</p>
  }
  return (
    <SmallTable
      caption={`Each turn foretold by the other ${countWord(turn.predictions.length - 1)}`}
      head={['turn', `RMS ${unit}`, `left ${unit}`, 'less']}
      rows={turn.predictions.map(({ turnNumber, rmsBeforeArcsec, rmsLeftArcsec }) => [
        turnNumber,
        formatNumber(factor * rmsBeforeArcsec, 2),
        formatNumber(factor * rmsLeftArcsec, 2),
        formatPercent(rmsBeforeArcsec > 0 ? 1 - rmsLeftArcsec / rmsBeforeArcsec : null),
      ])}
    />
  )
}

interface WormFactsProps {
  result: AnalysisResult
  sense: string
  display: Display
}

function WormFacts({ result: { worm, turn }, sense, display }: WormFactsProps) {
  if (!worm) return null
  return (
    <AsideGroup title="The worm’s swing">
      <Facts
        rows={[
          [
            `furthest ahead${sense}`,
            `${sizedDisplacement(worm.furthestAheadArcsec, display)} at ${degrees(worm.furthestAheadDegrees)}`,
          ],
          [
            `furthest behind${sense}`,
            `${sizedDisplacement(worm.furthestBehindArcsec, display)} at ${degrees(worm.furthestBehindDegrees)}`,
          ],
          ['RMS', sizedDisplacement(worm.rmsArcsec, display)],
          ...(turn?.scatter === null || turn?.scatter === undefined
            ? []
            : ([['worm, from turn to turn', `± ${formatPercent(turn.scatter, 1)}`]] as [string, string][])),
        ]}
      />
    </AsideGroup>
  )
}

function extremaWords({ worm }: AnalysisResult, { sense, display }: { sense: string; display: Display }): string {
  if (!worm) return ''
  return `The axis is furthest ahead${sense} at ${degrees(worm.furthestAheadDegrees)} by ${sizedDisplacement(worm.furthestAheadArcsec, display)}, furthest behind at ${degrees(worm.furthestBehindDegrees)}.`
}

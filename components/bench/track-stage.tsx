'use client'

import { useMemo, useState } from 'react'
import { LegendEntry } from '@/components/charts/picture'
import { PlotlyChart } from '@/components/charts/plotly-chart'
import { Button } from '@/components/ui/button'
import type { AnalysisResult } from '@/lib/analysis/types'
import { acrossTheAxis, sizedDisplacement, type Display } from '@/lib/display-units'
import type { FigureFrame } from '@/lib/figures/figure'
import { trackExtentSeconds, trackFigure } from '@/lib/figures/track-figure'
import { findingText } from '@/lib/findings/finding'
import { perMinute } from '@/lib/findings/key-figures'
import { trackFinding } from '@/lib/findings/track-finding'
import { senseMark } from '@/lib/findings/words'
import { formatEstimate, formatNumber, formatSignificant } from '@/lib/units'
import { AsideGroup, Facts, StageWarnings } from './aside'
import { NO_VIEWS, PictureSpace } from './picture-space'
import { ExcludeForm, SpanList } from './span-list'
import { Stage } from './stage'
import type { StageInput } from './stage-props'
import { TrackSettings } from './track-settings'
import { PictureBar, useStageNotes } from './use-stage-notes'

interface Selection {
  startSeconds: number
  endSeconds: number
  zoomIn: () => void
}

export function TrackStage({ result, views, recipe, display, change, notes, noteActions, isLocked }: StageInput) {
  const [selection, setSelection] = useState<Selection | null>(null)
  const extent = useMemo(() => (result && views ? trackExtentSeconds(result, views.track) : null), [result, views])
  const { marks, link, pick, pickBar, aside } = useStageNotes({
    kind: 'time',
    notes,
    actions: noteActions,
    startAt: result ? { kind: 'time', timeSeconds: result.run.firstUsedTimeSeconds } : null,
    extent,
  })
  const sense = senseMark(recipe.conversion.senseBasis)
  const { excludedSpans } = recipe
  const makeFigure = useMemo(() => {
    if (!result || !views) return null
    const notesAt = marks.map(({ value, ...mark }) => ({ ...mark, timeSeconds: value }))
    return (frame: FigureFrame) =>
      trackFigure({ result, track: views.track, excludedSpans, notes: notesAt, senseMark: sense, display, frame })
  }, [result, views, excludedSpans, marks, sense, display])
  const finding = result ? trackFinding(result) : null

  function leaveOut(span: { startSeconds: number; endSeconds: number }) {
    const spans = [...excludedSpans, { startSeconds: tidy(span.startSeconds), endSeconds: tidy(span.endSeconds) }]
    change(null, { ...recipe, excludedSpans: spans.sort((a, b) => a.startSeconds - b.startSeconds) })
    setSelection(null)
  }

  return (
    <Stage
      number={1}
      title="Track"
      question="What the star did, on the axis, before anything is taken away."
      isLocked={isLocked}
      settings={<TrackSettings result={result} recipe={recipe} change={change} />}
      finding={finding}
      aside={
        <>
          {result ? <DriftFacts result={result} display={display} /> : null}
          <SpanList
            spans={excludedSpans}
            isLocked={isLocked}
            onRemove={(index) =>
              change(null, { ...recipe, excludedSpans: excludedSpans.filter((_, each) => each !== index) })
            }
          />
          {!isLocked && result ? <ExcludeForm onLeaveOut={leaveOut} /> : null}
          {result ? <StageWarnings warnings={result.warnings} stage="track" /> : null}
          {aside}
        </>
      }
    >
      {result && views && finding && makeFigure ? (
        <PlotlyChart
          name="track"
          summary={`${findingText(finding)} ${driftWords(result)} Drag over the picture to choose a stretch.`}
          makeFigure={makeFigure}
          marks={marks.map(({ value, ...mark }) => ({ ...mark, x: value / 60 }))}
          markLink={link}
          legend={
            <>
              <LegendEntry look="recorded">recorded</LegendEntry>
              <LegendEntry look="fitted">fitted</LegendEntry>
              <LegendEntry look="drift">drift</LegendEntry>
              {views.track.strayArcsec.length > 0 ? <LegendEntry look="stray">left out</LegendEntry> : null}
            </>
          }
          onSelect={([from, to], zoomIn) => setSelection({ startSeconds: 60 * from, endSeconds: 60 * to, zoomIn })}
          onPick={pick ? (minutes) => pick({ kind: 'time', timeSeconds: 60 * minutes }) : undefined}
        >
          {selection ? (
            <PictureBar
              label={`${formatNumber(selection.startSeconds / 60, 2)} to ${formatNumber(selection.endSeconds / 60, 2, { unit: 'min' })}`}
              onClose={() => setSelection(null)}
            >
              {isLocked ? null : (
                <Button variant="primary" size="small" onClick={() => leaveOut(selection)}>
                  Leave out
                </Button>
              )}
              <Button
                size="small"
                onClick={() => {
                  selection.zoomIn()
                  setSelection(null)
                }}
              >
                Show it alone
              </Button>
            </PictureBar>
          ) : (
            pickBar
          )}
        </PlotlyChart>
      ) : (
        <PictureSpace heightPx={272}>{result ? NO_VIEWS : 'The track appears here.'}</PictureSpace>
      )}
    </Stage>
  )
}

function DriftFacts({ result, display }: { result: AnalysisResult; display: Display }) {
  const { drift, spans, worm, declination } = result
  return (
    <AsideGroup title={worm ? 'Drift, fitted together with the gears' : 'Drift'}>
      <Facts
        rows={[
          ['rate, ″/min', formatEstimate(perMinute(drift.rateArcsecPerSecond), { isSigned: true })],
          ['its own span', sizedDisplacement(spans.driftArcsec, display)],
          ['of the sidereal rate', formatSignificant(drift.percentOfSidereal, 2, { unit: '%' })],
          ['degree of its curve', drift.degree],
          ...(declination
            ? ([
                ['declination, RMS', sizedDisplacement(declination.rmsArcsec, acrossTheAxis(display))],
                [
                  'declination drift, ″/min',
                  formatSignificant(60 * declination.driftArcsecPerSecond, 2, { isSigned: true }),
                ],
              ] as [string, string][])
            : []),
        ]}
      />
    </AsideGroup>
  )
}

function driftWords({ drift }: AnalysisResult): string {
  return `The drift is ${formatEstimate(perMinute(drift.rateArcsecPerSecond), { isSigned: true, unit: '″/min' })}.`
}

/** Spans are kept to the hundredth of a second: finer than any frame, and short in the address. */
function tidy(seconds: number): number {
  return Number(seconds.toFixed(2))
}

'use client'

import { useMemo, useRef } from 'react'
import { DialChart } from '@/components/charts/dial-chart'
import { LegendEntry } from '@/components/charts/picture'
import { PhasorChart } from '@/components/charts/phasor-chart'
import { PlotlyChart } from '@/components/charts/plotly-chart'
import { useWidth } from '@/components/charts/use-width'
import type { AnalysisResult, AnalysisViews, Recipe } from '@/lib/analysis/types'
import { PLAIN_DISPLAY } from '@/lib/display-units'
import type { FigureFrame } from '@/lib/figures/figure'
import { spectrumFigure } from '@/lib/figures/spectrum-figure'
import { trackFigure } from '@/lib/figures/track-figure'
import { turnFigure } from '@/lib/figures/turn-figure'
import { findingText } from '@/lib/findings/finding'
import { spectrumFinding } from '@/lib/findings/spectrum-finding'
import { trackFinding } from '@/lib/findings/track-finding'
import { turnFinding } from '@/lib/findings/turn-finding'
import { senseMark } from '@/lib/findings/words'
import type { NoteMarks } from './report-notes'

/** A mark in a picture leads to its note further down. */
const TO_NOTE = {
  activeId: null,
  onPoint: () => undefined,
  onFollow: (id: string) => document.getElementById(id)?.scrollIntoView({ block: 'center' }),
}

export interface ReportPictureProps {
  result: AnalysisResult
  views: AnalysisViews
  recipe: Recipe
  marks: NoteMarks
}

export function TrackPicture({ result, views, recipe, marks }: ReportPictureProps) {
  const makeFigure = useMemo(
    () => (frame: FigureFrame) =>
      trackFigure({
        result,
        track: views.track,
        excludedSpans: recipe.excludedSpans,
        notes: marks.times,
        senseMark: senseMark(recipe.conversion.senseBasis),
        display: PLAIN_DISPLAY,
        frame,
      }),
    [result, views, recipe, marks],
  )
  return (
    <PlotlyChart
      name="track"
      summary={findingText(trackFinding(result))}
      makeFigure={makeFigure}
      legend={
        <>
          <LegendEntry look="recorded">recorded</LegendEntry>
          <LegendEntry look="fitted">fitted</LegendEntry>
          <LegendEntry look="drift">drift</LegendEntry>
          {views.track.strayArcsec.length > 0 ? <LegendEntry look="stray">left out</LegendEntry> : null}
        </>
      }
    />
  )
}

export function SpectrumPicture({ result, views, recipe, marks }: ReportPictureProps) {
  const makeFigure = useMemo(
    () => (frame: FigureFrame) =>
      spectrumFigure({
        result,
        spectrum: views.spectrum,
        chanceLevel: recipe.chanceLevel,
        isBeforeShown: true,
        notes: marks.periods,
        display: PLAIN_DISPLAY,
        frame,
      }),
    [result, views, recipe, marks],
  )
  return (
    <PlotlyChart
      name="spectrum"
      summary={findingText(spectrumFinding(result, recipe))}
      makeFigure={makeFigure}
      legend={
        <>
          <LegendEntry look="recorded">left after the lines</LegendEntry>
          <LegendEntry look="before">before</LegendEntry>
          <LegendEntry look="chance">chance level</LegendEntry>
        </>
      }
    />
  )
}

interface HarmonicsPictureProps {
  worm: NonNullable<AnalysisResult['worm']>
  summary: string
}

export function HarmonicsPicture({ worm, summary }: HarmonicsPictureProps) {
  const holder = useRef<HTMLDivElement>(null)
  const width = useWidth(holder)
  return (
    <div ref={holder}>
      <PhasorChart harmonics={worm.harmonics} summary={summary} columns={width > 0 && width < 520 ? 2 : 4} />
    </div>
  )
}

export function TurnPictures({ result, views, recipe, marks }: ReportPictureProps) {
  const { turn } = views
  const sense = senseMark(recipe.conversion.senseBasis)
  const makeFigure = useMemo(
    () =>
      turn
        ? (frame: FigureFrame) =>
            turnFigure({ turn, senseMark: sense, notes: marks.angles, display: PLAIN_DISPLAY, frame })
        : null,
    [turn, sense, marks],
  )
  if (!turn || !makeFigure) return null
  const summary = findingText(turnFinding(result))
  return (
    <div className="report-turn grid items-start gap-x-6 gap-y-4">
      <DialChart
        turn={turn}
        summary={`${summary} As a dial.`}
        senseMark={sense}
        notes={marks.angles}
        markLink={TO_NOTE}
      />
      <PlotlyChart
        name="turn"
        summary={summary}
        makeFigure={makeFigure}
        legend={
          <>
            <LegendEntry look="recorded">each turn</LegendEntry>
            <LegendEntry look="fitted">fitted</LegendEntry>
          </>
        }
      />
    </div>
  )
}

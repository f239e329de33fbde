'use client'

import { useMemo, useState } from 'react'
import { LegendEntry } from '@/components/charts/picture'
import { PlotlyChart } from '@/components/charts/plotly-chart'
import type { AnalysisResult, Recipe } from '@/lib/analysis/types'
import { displacementUnitOf, formatSwing, shortSwingWord, shownSwing, type Display } from '@/lib/display-units'
import type { FigureFrame } from '@/lib/figures/figure'
import { spectrumExtentSeconds, spectrumFigure } from '@/lib/figures/spectrum-figure'
import { findingText } from '@/lib/findings/finding'
import { spectrumFinding } from '@/lib/findings/spectrum-finding'
import { formatDuration, formatEstimate, formatNumber, formatPeriod, formatProbability } from '@/lib/units'
import { SmallTable, StageWarnings } from './aside'
import { NO_VIEWS, PictureSpace } from './picture-space'
import { ChoiceSetting, FactSetting, SwitchSetting } from './setting-rows'
import { Stage } from './stage'
import type { StageInput } from './stage-props'
import { useStageNotes } from './use-stage-notes'
import { WindowSetting } from './window-setting'

const CHANCE_LEVELS = [0.05, 0.01, 0.001, 0.0001]

export function SpectrumStage({ result, views, recipe, display, change, notes, noteActions, isLocked }: StageInput) {
  const [isBeforeShown, setBeforeShown] = useState(true)
  const extent = useMemo(
    () => (result && views ? spectrumExtentSeconds(result, views.spectrum) : null),
    [result, views],
  )
  const { marks, link, pick, pickBar, aside } = useStageNotes({
    kind: 'period',
    notes,
    actions: noteActions,
    startAt: result ? { kind: 'period', periodSeconds: result.worm?.periodSeconds.value ?? 100 } : null,
    extent,
  })
  const { chanceLevel } = recipe
  const makeFigure = useMemo(() => {
    if (!result || !views) return null
    const notesAt = marks.map(({ value, ...mark }) => ({ ...mark, periodSeconds: value }))
    return (frame: FigureFrame) =>
      spectrumFigure({ result, spectrum: views.spectrum, chanceLevel, isBeforeShown, notes: notesAt, display, frame })
  }, [result, views, chanceLevel, isBeforeShown, marks, display])
  const finding = result ? spectrumFinding(result, recipe) : null

  return (
    <Stage
      number={2}
      title="Spectrum"
      question="How far the axis swings at each period. The ruler counts swings per turn of the worm."
      isLocked={isLocked}
      settings={<SpectrumSettings result={result} recipe={recipe} change={change} />}
      finding={finding}
      aside={
        <>
          {result ? <LinesTable result={result} recipe={recipe} display={display} /> : null}
          {result ? <StageWarnings warnings={result.warnings} stage="spectrum" /> : null}
          {aside}
        </>
      }
    >
      {result && finding && makeFigure ? (
        <PlotlyChart
          name="spectrum"
          summary={`${findingText(finding)} ${stemWords(result, display)}`}
          makeFigure={makeFigure}
          marks={marks.map(({ value, ...mark }) => ({ ...mark, x: value }))}
          markLink={link}
          onPick={pick ? (periodSeconds) => pick({ kind: 'period', periodSeconds }) : undefined}
          legend={
            <>
              <LegendEntry look="recorded">left after the lines</LegendEntry>
              <label className="inline-flex cursor-pointer items-center gap-2 pointer-coarse:min-h-11">
                <input
                  type="checkbox"
                  checked={isBeforeShown}
                  onChange={(event) => setBeforeShown(event.target.checked)}
                />
                <LegendEntry look="before">before</LegendEntry>
              </label>
              <LegendEntry look="chance">chance level</LegendEntry>
            </>
          }
        >
          {pickBar}
        </PlotlyChart>
      ) : (
        <PictureSpace heightPx={330}>{result ? NO_VIEWS : 'The spectrum appears here.'}</PictureSpace>
      )}
    </Stage>
  )
}

function SpectrumSettings({ result, recipe, change }: Pick<StageInput, 'result' | 'recipe' | 'change'>) {
  const levels = CHANCE_LEVELS.includes(recipe.chanceLevel) ? CHANCE_LEVELS : [...CHANCE_LEVELS, recipe.chanceLevel]
  return (
    <>
      <SwitchSetting
        label="Other lines"
        isOn={recipe.isLineSearchOn}
        onValue={(isLineSearchOn) => change('isLineSearchOn', { ...recipe, isLineSearchOn })}
      />
      <ChoiceSetting
        label="Chance level"
        value={String(recipe.chanceLevel)}
        options={levels.map((level) => ({ value: String(level), label: `1 in ${Math.round(1 / level)}` }))}
        onValue={(value) => change('chanceLevel', { ...recipe, chanceLevel: Number(value) })}
      />
      <WindowSetting
        window={recipe.spectrumWindow}
        turns={result?.run.turns ?? null}
        onWindow={(spectrumWindow) => change('spectrumWindow', { ...recipe, spectrumWindow })}
      />
      {result?.run.finestSplitOrders ? (
        <FactSetting label="Finest split">{formatNumber(result.run.finestSplitOrders, 2)} order</FactSetting>
      ) : null}
    </>
  )
}

function LinesTable({ result, recipe, display }: { result: AnalysisResult; recipe: Recipe; display: Display }) {
  const { lines, predictedOrders, run } = result
  const tooFast = predictedOrders.filter(({ periodSeconds }) => periodSeconds < run.shortestPeriodSeconds)
  return (
    <div className="flex flex-col gap-2">
      {lines.length === 0 ? (
        <p className="text-sm text-soft">
          {recipe.isLineSearchOn
            ? `No line beside the worm passes the chance level of ${formatProbability(recipe.chanceLevel)}.`
            : 'Lines beside the worm are not looked for.'}
        </p>
      ) : (
        <SmallTable
          caption="Lines beside the worm"
          head={['source', 'order', 'per. s', swingHead(display)]}
          rows={lines.map(({ source, order, periodSeconds, amplitudeArcsec }) => [
            source ?? 'unexplained',
            order ? formatNumber(order.value, 3) : '–',
            formatNumber(periodSeconds.value, periodSeconds.value >= 100 ? 1 : 2),
            shortEstimate(shownSwing(amplitudeArcsec, display)),
          ])}
        />
      )}
      <p className="text-sm text-pretty text-soft">
        {lines.some(({ order }) => order !== null && Math.abs(order.value - Math.round(order.value)) > 0.01)
          ? 'A line of no whole order does not repeat with the worm, so no table can take it out. '
          : ''}
        Swings faster than {formatDuration(run.shortestPeriodSeconds)} are out of this cadence’s reach
        {tooFast.length > 0 ? `, among them ${tooFast.map(({ name }) => name).join(', ')}` : ''}.
      </p>
    </div>
  )
}

function stemWords({ worm, lines }: AnalysisResult, display: Display): string {
  const parts = [
    ...(worm?.harmonics ?? []).map(
      ({ order, amplitudeArcsec }) => `order ${order}: ${formatSwing(amplitudeArcsec, display)}`,
    ),
    ...lines.map(
      ({ source, periodSeconds, amplitudeArcsec }) =>
        `${source ?? 'unexplained'}, ${formatPeriod(periodSeconds.value)}: ${formatSwing(amplitudeArcsec, display)}`,
    ),
  ]
  return parts.length === 0
    ? ''
    : `${display.swingMeasure === 'amplitude' ? 'Amplitudes' : 'Swings from peak to peak'}: ${parts.join('; ')}.`
}

/** “ampl. ″”, “peak-to-peak px”: the head over swings in narrow tables. */
export function swingHead(display: Display): string {
  return `${shortSwingWord(display)} ${displacementUnitOf(display)}`
}

/** Value ± error without the zero before the point of the error, for narrow tables: 7.35 ± .04. */
export function shortEstimate(estimate: { value: number; stderr: number | null }): string {
  return formatEstimate(estimate).replace('± 0.', '± .')
}

'use client'

import { useRef } from 'react'
import { PhasorChart } from '@/components/charts/phasor-chart'
import { useWidth } from '@/components/charts/use-width'
import type { AnalysisResult, Recipe } from '@/lib/analysis/types'
import { shownSwing, type Display } from '@/lib/display-units'
import { findingText } from '@/lib/findings/finding'
import {
  errorModelSentence,
  errorModelWords,
  harmonicCountSentence,
  harmonicsFinding,
} from '@/lib/findings/harmonics-finding'
import { ABSENT, formatEstimate, formatNumber } from '@/lib/units'
import { AsideGroup, Facts, SmallTable, StageWarnings } from './aside'
import { PictureSpace } from './picture-space'
import { ChoiceSetting, FactSetting, NumberSetting } from './setting-rows'
import { shortEstimate, swingHead } from './spectrum-stage'
import { Stage } from './stage'
import type { StageInput } from './stage-props'

export function HarmonicsStage({ result, recipe, display, change, isLocked }: StageInput) {
  const holder = useRef<HTMLDivElement>(null)
  const width = useWidth(holder)
  const finding = result ? harmonicsFinding(result, display) : null
  return (
    <Stage
      number={3}
      title="Harmonics"
      question="Size and phase of each harmonic; the patch is where 95 in 100 repeats would fall."
      isLocked={isLocked}
      settings={<HarmonicsSettings result={result} recipe={recipe} change={change} />}
      finding={finding}
      aside={
        result ? (
          <>
            <HarmonicsTable result={result} display={display} />
            <PeriodFacts result={result} />
            <StageWarnings warnings={result.warnings} stage="harmonics" />
          </>
        ) : null
      }
    >
      <div ref={holder}>
        {result?.worm && finding ? (
          <PhasorChart
            harmonics={result.worm.harmonics}
            summary={findingText(finding)}
            columns={width > 0 && width < 520 ? 2 : 4}
            display={display}
          />
        ) : result?.wormPeriodIntervalSeconds ? (
          <PictureSpace heightPx={120}>
            {`The record allows any worm period between ${result.wormPeriodIntervalSeconds.map((each) => formatNumber(each, 0)).join(' and ')} s.`}
          </PictureSpace>
        ) : (
          <PictureSpace heightPx={result ? 120 : 262}>
            {result ? 'There is no worm figure to draw.' : 'The harmonics appear here.'}
          </PictureSpace>
        )}
      </div>
      {result?.worm ? (
        <p className="mt-2 max-w-[85ch] text-sm text-pretty text-soft">
          {harmonicCountSentence(result.modelChoice, recipe)} {errorModelSentence(result.errorModel)}
        </p>
      ) : null}
    </Stage>
  )
}

function HarmonicsSettings({ result, recipe, change }: Pick<StageInput, 'result' | 'recipe' | 'change'>) {
  const { driveTrain } = recipe
  return (
    <>
      <ChoiceSetting
        label="How many"
        value={String(recipe.harmonicCount)}
        options={[
          { value: 'auto', label: 'by evidence' },
          ...Array.from({ length: 12 }, (_, index) => ({ value: String(index + 1), label: String(index + 1) })),
        ]}
        onValue={(value) =>
          change('harmonicCount', { ...recipe, harmonicCount: value === 'auto' ? 'auto' : Number(value) })
        }
      />
      <ChoiceSetting
        label="Period"
        value={recipe.wormPeriod}
        options={[
          { value: 'fitted', label: 'fitted' },
          { value: 'gear', label: 'of the gears', isDisabled: driveTrain.wheelTeeth === null },
          { value: 'typed', label: 'typed' },
        ]}
        onValue={(wormPeriod) => change('wormPeriod', withPeriod({ ...recipe, wormPeriod }, result))}
      />
      {recipe.wormPeriod === 'typed' ? (
        <NumberSetting
          label="Typed"
          unit="s"
          min={0.1}
          max={1e6}
          value={recipe.typedPeriodSeconds}
          onValue={(typedPeriodSeconds) => change('typedPeriodSeconds', { ...recipe, typedPeriodSeconds })}
        />
      ) : null}
      <NumberSetting
        label="Wheel teeth"
        min={1}
        max={100_000}
        isInteger
        value={driveTrain.wheelTeeth}
        onValue={(wheelTeeth) => change('wheelTeeth', { ...recipe, driveTrain: { ...driveTrain, wheelTeeth } })}
        onEmpty={() => change('wheelTeeth', { ...recipe, driveTrain: { ...driveTrain, wheelTeeth: null } })}
      />
      {result ? <FactSetting label="Errors for">{errorModelWords(result.errorModel)}</FactSetting> : null}
    </>
  )
}

/** A typed period starts from the one that is known. */
function withPeriod(recipe: Recipe, result: AnalysisResult | null): Recipe {
  if (recipe.wormPeriod !== 'typed' || recipe.typedPeriodSeconds !== null) return recipe
  const known = result?.worm?.periodSeconds.value ?? null
  return { ...recipe, typedPeriodSeconds: known === null ? 480 : Number(known.toFixed(2)) }
}

function HarmonicsTable({ result, display }: { result: AnalysisResult; display: Display }) {
  if (!result.worm) return null
  return (
    <SmallTable
      caption="Worm harmonics"
      head={['order', swingHead(display), 'phase °']}
      rows={result.worm.harmonics.map(({ order, amplitudeArcsec, phaseDegrees, isPhaseMeaningful }) => [
        order,
        shortEstimate(shownSwing(amplitudeArcsec, display)),
        isPhaseMeaningful ? shortEstimate(phaseDegrees) : ABSENT,
      ])}
    />
  )
}

function PeriodFacts({ result }: { result: AnalysisResult }) {
  const { worm } = result
  if (!worm) return null
  const source = { fitted: 'fitted', gear: 'held at the gears’', typed: 'held as typed' }[worm.periodSource]
  return (
    <AsideGroup title="Worm period, s">
      <Facts
        rows={[
          [source, formatEstimate(worm.periodSeconds, { significantDigits: 7 })],
          ...(worm.fittedPeriodSeconds
            ? ([['as the record has it', formatEstimate(worm.fittedPeriodSeconds)]] as [string, string][])
            : []),
          ...(worm.gearPeriodSeconds === null
            ? []
            : ([['of the gears', formatNumber(worm.gearPeriodSeconds, 2)]] as [string, string][])),
        ]}
      />
    </AsideGroup>
  )
}

'use client'

import { SpanChart } from '@/components/charts/span-chart'
import { FindingText } from '@/components/findings/finding-text'
import { advice } from '@/lib/findings/advice'
import { sizedDisplacement } from '@/lib/display-units'
import { findingText } from '@/lib/findings/finding'
import { spansFinding } from '@/lib/findings/spans-finding'
import { formatDuration, formatPercent, formatSignificant } from '@/lib/units'
import { AsideGroup, Facts, StageWarnings } from './aside'
import { PictureSpace } from './picture-space'
import { NumberSetting } from './setting-rows'
import { Stage } from './stage'
import type { StageInput } from './stage-props'

export function SpansStage({ result, recipe, display, change, isLocked }: StageInput) {
  const finding = result ? spansFinding(result, display) : null
  const given = result ? advice(result, recipe, display) : null
  return (
    <Stage
      number={5}
      title="Spans"
      question={
        result
          ? `Where the ${sizedDisplacement(result.spans.rawArcsec, display)} of the raw track come from, one part taken away after another.`
          : 'Where the span of the raw track comes from, one part taken away after another.'
      }
      isLocked={isLocked}
      settings={
        <>
          <NumberSetting
            label="Tolerance"
            unit="″ sky"
            min={0.01}
            max={3600}
            value={recipe.toleranceSkyArcsec}
            onValue={(toleranceSkyArcsec) => change('toleranceSkyArcsec', { ...recipe, toleranceSkyArcsec })}
          />
          <NumberSetting
            label="Exposure"
            unit="s"
            min={0.01}
            max={36_000}
            value={recipe.pictureExposureSeconds}
            onValue={(pictureExposureSeconds) =>
              change('pictureExposureSeconds', { ...recipe, pictureExposureSeconds })
            }
          />
        </>
      }
      finding={finding}
      aside={
        result ? (
          <>
            <AsideGroup title="What that means for pictures">
              <Facts
                rows={[
                  [
                    'steepest rate',
                    result.worm ? formatSignificant(result.rate.steepestArcsecPerSecond, 3, { unit: '″/s' }) : '–',
                  ],
                  [
                    'with drift and lines',
                    formatSignificant(result.rate.steepestWithDriftArcsecPerSecond, 3, { unit: '″/s' }),
                  ],
                  ['of the sidereal rate', formatSignificant(result.rate.percentOfSidereal, 2, { unit: '%' })],
                  [
                    'guide at least every',
                    result.rate.longestCorrectionIntervalSeconds === null
                      ? 'never needed'
                      : formatDuration(result.rate.longestCorrectionIntervalSeconds),
                  ],
                  [
                    `unguided ${formatDuration(recipe.pictureExposureSeconds)} kept`,
                    formatPercent(result.rate.framesKeptShare),
                  ],
                  [
                    'seeing floor',
                    `${result.residual.isSeeingFloorLowerBound ? '≥ ' : ''}${sizedDisplacement(result.residual.seeingFloorArcsec, display)}`,
                  ],
                ]}
              />
            </AsideGroup>
            <AsideGroup title="Spans of the parts alone">
              <Facts
                rows={[
                  ['drift', sizedDisplacement(result.spans.driftArcsec, display)],
                  ['worm', result.worm ? sizedDisplacement(result.spans.wormArcsec, display) : '–'],
                  ['raw without the worm', sizedDisplacement(result.spans.rawWithoutWormArcsec, display)],
                ]}
              />
            </AsideGroup>
            <StageWarnings warnings={result.warnings} stage="spans" />
          </>
        ) : null
      }
    >
      {result && finding ? (
        <>
          <SpanChart spans={result.spans} summary={findingText(finding)} display={display} />
          {given ? (
            <div className="mt-5 border-t border-rule pt-3">
              <p className="max-w-[72ch] font-semibold text-pretty">
                <FindingText finding={given.sentence} />
              </p>
              <p className="mt-0.5 max-w-[72ch] text-sm text-soft">The rule: {lowerFirst(given.rule)}</p>
            </div>
          ) : null}
        </>
      ) : (
        <PictureSpace heightPx={150}>The spans appear here.</PictureSpace>
      )}
    </Stage>
  )
}

function lowerFirst(text: string): string {
  return text.charAt(0).toLowerCase() + text.slice(1)
}

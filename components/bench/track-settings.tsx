'use client'

import type { AnalysisResult, Recipe } from '@/lib/analysis/types'
import { formatCount, formatNumber } from '@/lib/units'
import { ChoiceSetting, FactSetting, MoreSettings, NumberSetting, SwitchSetting } from './setting-rows'

interface TrackSettingsProps {
  result: AnalysisResult | null
  recipe: Recipe
  change: (key: string, next: Recipe) => void
}

export function TrackSettings({ result, recipe, change }: TrackSettingsProps) {
  const { conversion } = recipe
  const convert = (key: keyof Recipe['conversion'], value: Recipe['conversion'][typeof key]) =>
    change(key, { ...recipe, conversion: { ...conversion, [key]: value } })

  return (
    <>
      {conversion.displacementUnit === 'px' ? (
        <NumberSetting
          label="Image scale"
          unit="″/px"
          min={0.001}
          max={1000}
          value={conversion.imageScaleArcsecPerPx}
          onValue={(value) => convert('imageScaleArcsecPerPx', value)}
          onEmpty={() => convert('imageScaleArcsecPerPx', null)}
        />
      ) : null}
      {conversion.displacementUnit !== 'ra-seconds' && conversion.frame === 'sky' ? (
        <NumberSetting
          label="Declination"
          unit="°"
          min={-88.9}
          max={88.9}
          value={conversion.declinationDegrees}
          onValue={(value) => convert('declinationDegrees', value)}
          onEmpty={() => convert('declinationDegrees', null)}
        />
      ) : null}
      <ChoiceSetting
        label="Sense"
        value={conversion.senseBasis}
        options={[
          { value: 'proven', label: 'proven' },
          { value: 'assumed', label: 'assumed' },
        ]}
        onValue={(value) => convert('senseBasis', value)}
      />
      {result ? (
        <FactSetting label="Cadence">{formatNumber(result.run.medianCadenceSeconds, 2, { unit: 's' })}</FactSetting>
      ) : null}
      {result ? (
        <FactSetting label="Left out">
          {formatCount(result.rows - result.used)} of {formatCount(result.rows)}
        </FactSetting>
      ) : null}
      <SwitchSetting
        label="Stray points"
        isOn={recipe.isStrayPointFilterOn}
        onLabel="left out"
        offLabel="kept"
        onValue={(isStrayPointFilterOn) => change('isStrayPointFilterOn', { ...recipe, isStrayPointFilterOn })}
      />
      <ChoiceSetting
        label="Drift"
        value={String(recipe.driftDegree)}
        options={[
          { value: 'auto', label: 'by evidence' },
          { value: '0', label: 'none' },
          { value: '1', label: 'straight' },
          { value: '2', label: 'bent once' },
          { value: '3', label: 'bent twice' },
        ]}
        onValue={(value) =>
          change('driftDegree', {
            ...recipe,
            driftDegree: value === 'auto' ? 'auto' : (Number(value) as 0 | 1 | 2 | 3),
          })
        }
      />
      <MoreSettings>
        <ChoiceSetting
          label="Growing is"
          value={conversion.positiveMeans}
          options={[
            { value: 'ahead', label: 'ahead' },
            { value: 'behind', label: 'behind' },
          ]}
          onValue={(value) => convert('positiveMeans', value)}
        />
        {conversion.displacementUnit === 'ra-seconds' ? null : (
          <ChoiceSetting
            label="Measured"
            value={conversion.frame}
            options={[
              { value: 'sky', label: 'on the sky' },
              { value: 'axis', label: 'on the axis' },
            ]}
            onValue={(value) => convert('frame', value)}
          />
        )}
        <NumberSetting
          label="Scale error"
          unit="%"
          min={0}
          max={100}
          value={conversion.imageScaleUncertaintyPercent}
          onValue={(value) => convert('imageScaleUncertaintyPercent', value)}
          onEmpty={() => convert('imageScaleUncertaintyPercent', null)}
        />
        <NumberSetting
          label="Exposure"
          unit="s"
          min={0}
          max={3600}
          value={conversion.exposureSeconds}
          onValue={(value) => convert('exposureSeconds', value)}
          onEmpty={() => convert('exposureSeconds', null)}
        />
        <ChoiceSetting
          label="Time stamp"
          value={conversion.timeStamp}
          options={[
            { value: 'start', label: 'start' },
            { value: 'mid', label: 'middle' },
            { value: 'end', label: 'end' },
          ]}
          onValue={(value) => convert('timeStamp', value)}
        />
      </MoreSettings>
    </>
  )
}

'use client'

import type { AnalysisResult, Recipe, TableSettings } from '@/lib/analysis/types'
import { harmonicName } from '@/lib/findings/words'
import { ChoiceSetting, NumberSetting } from './setting-rows'

interface CorrectionSettingsProps {
  result: AnalysisResult | null
  recipe: Recipe
  change: (key: string, next: Recipe) => void
  hasWormAngle: boolean
}

const WRITTEN: { value: TableSettings['unit']; label: string }[] = [
  { value: 'arcsec', label: 'position ″' },
  { value: 'arcsec-per-second', label: 'rate ″/s' },
  { value: 'percent-sidereal', label: 'rate %' },
]

export function CorrectionSettings({ result, recipe, change, hasWormAngle }: CorrectionSettingsProps) {
  const { table } = recipe
  const set = (key: string, part: Partial<TableSettings>) =>
    change(`table.${key}`, { ...recipe, table: { ...table, ...part } })
  return (
    <>
      <NumberSetting
        label="Bins"
        min={8}
        max={4096}
        isInteger
        value={table.binCount}
        onValue={(binCount) => set('binCount', { binCount })}
      />
      <ChoiceSetting
        label="Written as"
        value={table.unit}
        options={WRITTEN}
        onValue={(unit) => set('unit', { unit, quantity: unit === 'arcsec' ? 'position' : 'rate' })}
      />
      <ChoiceSetting
        label="It says"
        value={table.meaning}
        options={[
          { value: 'correction', label: 'what to do' },
          { value: 'error', label: 'what is wrong' },
        ]}
        onValue={(meaning) => set('meaning', { meaning })}
      />
      <ChoiceSetting
        label="Angle"
        value={table.angleDirection}
        options={[
          { value: 'increasing', label: 'grows' },
          { value: 'decreasing', label: 'falls' },
        ]}
        onValue={(angleDirection) => set('angleDirection', { angleDirection })}
      />
      <ChoiceSetting
        label="Zero at"
        value={table.origin.kind}
        options={[
          { value: 'run-start', label: 'run start' },
          { value: 'index-time', label: 'index mark' },
          { value: 'worm-angle-column', label: 'angle column', isDisabled: !hasWormAngle },
        ]}
        onValue={(kind) =>
          set('origin', {
            origin: kind === 'index-time' ? { kind, timeSeconds: result?.run.firstUsedTimeSeconds ?? 0 } : { kind },
          })
        }
      />
      {table.origin.kind === 'index-time' ? (
        <NumberSetting
          label="Mark at"
          unit="s"
          value={table.origin.timeSeconds}
          onValue={(timeSeconds) => set('origin', { origin: { kind: 'index-time', timeSeconds } })}
        />
      ) : null}
      <NumberSetting
        label="Offset"
        unit="°"
        min={-360}
        max={360}
        value={table.offsetDegrees}
        onValue={(offsetDegrees) => set('offsetDegrees', { offsetDegrees })}
      />
      <OrdersSetting result={result} table={table} set={set} />
      <NumberSetting
        label="Share taken out"
        min={0.01}
        max={2}
        value={table.gain}
        onValue={(gain) => set('gain', { gain })}
      />
      <ChoiceSetting
        label="Played"
        value={table.playback}
        options={[
          { value: 'interpolated', label: 'in slopes' },
          { value: 'held-from-start', label: 'held from start' },
          { value: 'held-at-centre', label: 'held at centre' },
        ]}
        onValue={(playback) => set('playback', { playback })}
      />
    </>
  )
}

interface OrdersSettingProps {
  result: AnalysisResult | null
  table: TableSettings
  set: (key: string, part: Partial<TableSettings>) => void
}

/** Which harmonics the table holds: by evidence, or those that are ticked. */
function OrdersSetting({ result, table, set }: OrdersSettingProps) {
  const fitted = result?.worm?.harmonics.map(({ order }) => order) ?? []
  const chosen = table.orders === 'default' ? (result?.table?.orders ?? fitted) : table.orders
  const offered = [...new Set([...fitted, ...chosen])].sort((a, b) => a - b)
  return (
    <>
      <ChoiceSetting
        label="Harmonics"
        value={table.orders === 'default' ? 'default' : 'chosen'}
        options={[
          { value: 'default', label: 'by evidence' },
          { value: 'chosen', label: 'chosen' },
        ]}
        onValue={(value) => set('orders', { orders: value === 'default' ? 'default' : [...chosen] })}
      />
      {table.orders === 'default' ? null : (
        <fieldset className="flex flex-wrap gap-x-3 gap-y-1 border-b border-dotted border-steel py-1.5 text-sm">
          <legend className="sr-only">Harmonics in the table</legend>
          {offered.map((order) => (
            <label key={order} className="inline-flex items-center gap-1.5 pointer-coarse:min-h-11">
              <input
                type="checkbox"
                checked={chosen.includes(order)}
                onChange={(event) =>
                  set('orders', {
                    orders: event.target.checked
                      ? [...chosen, order].sort((a, b) => a - b)
                      : chosen.filter((each) => each !== order),
                  })
                }
              />
              {harmonicName(order)}
            </label>
          ))}
        </fieldset>
      )}
    </>
  )
}

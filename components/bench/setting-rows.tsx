'use client'

import { useId, useState, type ReactNode } from 'react'
import { NumberInput } from '@/components/ui/number-input'
import type { SelectOption } from '@/components/ui/select'

function Row({
  id,
  label,
  children,
  fault,
}: {
  id: string
  label: ReactNode
  children: ReactNode
  fault?: string | null
}) {
  return (
    <div className="border-b border-dotted border-steel py-0.5">
      <div className="flex items-center justify-between gap-2">
        <label htmlFor={id} className="shrink-0 text-sm">
          {label}
        </label>
        <div className="min-w-0 flex-1">{children}</div>
      </div>
      {fault ? (
        <p role="alert" className="pb-1 text-right text-xs text-oxide">
          {fault}
        </p>
      ) : null}
    </div>
  )
}

interface NumberSettingProps {
  label: string
  value: number | null
  onValue: (value: number) => void
  /** Given, the field may be empty. */
  onEmpty?: () => void
  unit?: string
  min?: number
  max?: number
  isInteger?: boolean
}

/** A setting that is one number. What was typed stays; what is wrong with it stands below. */
export function NumberSetting({ label, value, onValue, onEmpty, unit, min, max, isInteger }: NumberSettingProps) {
  const id = useId()
  const [fault, setFault] = useState<string | null>(null)
  return (
    <Row id={id} label={label} fault={fault}>
      <span className="flex items-center justify-end">
        <NumberInput
          id={id}
          className="setting-control"
          value={value}
          min={min}
          max={max}
          isInteger={isInteger}
          isRequired={!onEmpty}
          onFault={setFault}
          onValue={(next) => {
            if (next !== null) onValue(next)
            else onEmpty?.()
          }}
        />
        {unit ? <span className="figures shrink-0 pr-0.5 text-xs text-soft">{unit}</span> : null}
      </span>
    </Row>
  )
}

interface ChoiceSettingProps<Value extends string> {
  label: string
  value: Value
  options: readonly (SelectOption<Value> & { value: Value })[]
  onValue: (value: Value) => void
}

export function ChoiceSetting<Value extends string>({ label, value, options, onValue }: ChoiceSettingProps<Value>) {
  const id = useId()
  return (
    <Row id={id} label={label}>
      <span className="relative block">
        <select
          id={id}
          className="control figures setting-control"
          value={value}
          onChange={(event) => onValue(event.target.value as Value)}
        >
          {options.map((option) => (
            <option key={option.value} value={option.value} disabled={option.isDisabled}>
              {option.label}
            </option>
          ))}
        </select>
        <svg
          aria-hidden="true"
          viewBox="0 0 12 12"
          className="pointer-events-none absolute top-1/2 right-0 size-2.5 -translate-y-1/2 text-soft"
        >
          <path d="M2 4.5 6 8.5 10 4.5" fill="none" stroke="currentColor" strokeWidth="1.6" />
        </svg>
      </span>
    </Row>
  )
}

interface SwitchSettingProps {
  label: string
  isOn: boolean
  onLabel?: string
  offLabel?: string
  onValue: (isOn: boolean) => void
}

/** A yes or no, as words rather than a box. */
export function SwitchSetting({ label, isOn, onLabel = 'on', offLabel = 'off', onValue }: SwitchSettingProps) {
  return (
    <ChoiceSetting
      label={label}
      value={isOn ? 'on' : 'off'}
      options={[
        { value: 'on', label: onLabel },
        { value: 'off', label: offLabel },
      ]}
      onValue={(value) => onValue(value === 'on')}
    />
  )
}

/** A fact between the settings that can't be changed here. */
export function FactSetting({ label, children }: { label: string; children: ReactNode }) {
  return (
    <p className="flex items-center justify-between gap-2 border-b border-rule py-1.5 text-sm">
      <span>{label}</span>
      <span className="figures px-0.5 text-right whitespace-nowrap">{children}</span>
    </p>
  )
}

/** Settings that are seldom touched, folded below the others. */
export function MoreSettings({ children }: { children: ReactNode }) {
  return (
    <details className="no-print mt-1">
      <summary className="py-1 text-sm text-soft pointer-coarse:py-3.5">More settings</summary>
      {children}
    </details>
  )
}

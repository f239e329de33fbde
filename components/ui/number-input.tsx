'use client'

import { useState, type ComponentProps } from 'react'
import { classNames } from './class-names'
import { numberText, parseNumberText } from './number-text'

interface NumberInputProps extends Omit<ComponentProps<'input'>, 'value' | 'onChange' | 'type' | 'min' | 'max'> {
  value: number | null
  /** Called with every readable number while typing, and with null when the field is emptied. */
  onValue: (value: number | null) => void
  /** Called when the text becomes unreadable as a number or out of range, and with null when it reads again. */
  onFault?: (fault: string | null) => void
  unit?: string
  min?: number
  max?: number
  isInteger?: boolean
}

/** A field for one number. What was typed stays in the field, also when it can't be read. */
export function NumberInput(props: NumberInputProps) {
  const { value, onValue, onFault, unit, min, max, isInteger = false, className, onBlur, ...rest } = props
  const [draft, setDraft] = useState<{ text: string; value: number | null } | null>(null)
  const text = draft && draft.value === value ? draft.text : numberText(value)
  const fault = faultIn(text, { min, max, isInteger })

  function take(typed: string) {
    const parsed = parseNumberText(typed)
    const typedFault = faultIn(typed, { min, max, isInteger })
    onFault?.(typedFault)
    if (typedFault || parsed === 'not-a-number') {
      setDraft({ text: typed, value })
      return
    }
    setDraft({ text: typed, value: parsed })
    onValue(parsed)
  }

  return (
    <span className="relative block">
      <input
        {...rest}
        type="text"
        inputMode={isInteger && (min ?? -1) >= 0 ? 'numeric' : 'decimal'}
        autoComplete="off"
        className={classNames('control figures', className)}
        style={unit ? { paddingRight: `${unit.length + 2}ch` } : undefined}
        aria-invalid={fault ? true : rest['aria-invalid']}
        title={fault ?? rest.title}
        value={text}
        onChange={(event) => take(event.target.value)}
        onBlur={(event) => {
          if (!fault) setDraft(null)
          onBlur?.(event)
        }}
      />
      {unit ? (
        <span className="figures pointer-events-none absolute inset-y-0 right-2.5 flex items-center text-sm text-soft">
          {unit}
        </span>
      ) : null}
    </span>
  )
}

function faultIn(text: string, { min, max, isInteger }: { min?: number; max?: number; isInteger: boolean }) {
  const value = parseNumberText(text)
  if (value === 'not-a-number') return 'This is not a number'
  if (value === null) return null
  if (isInteger && !Number.isInteger(value)) return 'A whole number, please'
  if (min !== undefined && value < min) return `At least ${numberText(min)}`
  if (max !== undefined && value > max) return `At most ${numberText(max)}`
  return null
}

'use client'

import { useEffect, useRef, useState, type ComponentProps, type ReactNode } from 'react'
import { Field } from './field'
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
  /** An empty field is a fault; it gives no number. */
  isRequired?: boolean
}

/** A field for one number. While it has the focus, and as long as it can't be read, what was typed stays in it. */
export function NumberInput(props: NumberInputProps) {
  const {
    value,
    onValue,
    onFault,
    unit,
    min,
    max,
    isInteger = false,
    isRequired = false,
    className,
    onBlur,
    ...rest
  } = props
  const [draft, setDraft] = useState<string | null>(null)
  const text = draft ?? numberText(value)
  const limits = { min, max, isInteger, isRequired }
  const fault = faultIn(text, limits)
  const input = useRef<HTMLInputElement>(null)

  // So that a form can ask all its fields at once whether they may be sent.
  useEffect(() => input.current?.setCustomValidity(fault ?? ''), [fault])

  function take(typed: string) {
    setDraft(typed)
    const typedFault = faultIn(typed, limits)
    onFault?.(typedFault)
    const parsed = parseNumberText(typed)
    if (typedFault || parsed === 'not-a-number') return
    onValue(parsed)
  }

  return (
    <span className="relative block">
      <input
        {...rest}
        ref={input}
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

interface NumberFieldProps extends Omit<NumberInputProps, 'id' | 'onFault'> {
  label: ReactNode
  hint?: ReactNode
  error?: string | null
}

/** A number with its label; what is wrong with it stands below it. */
export function NumberField({ label, hint, error, ...rest }: NumberFieldProps) {
  const [fault, setFault] = useState<string | null>(null)
  return (
    <Field label={label} hint={hint} error={fault ?? error}>
      {(control) => <NumberInput {...control} {...rest} onFault={setFault} />}
    </Field>
  )
}

interface Limits {
  min?: number
  max?: number
  isInteger: boolean
  isRequired: boolean
}

function faultIn(text: string, { min, max, isInteger, isRequired }: Limits): string | null {
  const value = parseNumberText(text)
  if (value === 'not-a-number') return 'This is not a number'
  if (value === null) return isRequired ? 'Type a number' : null
  if (isInteger && !Number.isInteger(value)) return 'A whole number, please'
  if (min !== undefined && value < min) return `At least ${numberText(min)}`
  if (max !== undefined && value > max) return `At most ${numberText(max)}`
  return null
}

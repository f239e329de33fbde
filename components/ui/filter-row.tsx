'use client'

import { useEffect, useId, useState, type ReactNode } from 'react'
import { FIRST_DAY, LAST_DAY } from '@/lib/schemas/lists'
import { Button } from './button'
import { classNames } from './class-names'
import { Select, type SelectOption } from './select'
import { TextInput } from './text-input'

/** Long enough for a word to be typed, short enough to feel at once. */
const PAUSE_MILLISECONDS = 300

interface FilterRowProps {
  /** “Filter runs”: the name of the text field. */
  label: string
  placeholder: string
  text: string
  /** Called once the typing pauses. */
  onText: (text: string) => void
  /** How many of the further filters are set: a phone folds them away. */
  setCount: number
  children?: ReactNode
}

/** What narrows a list, in one quiet row: a text to look for, and further choices that fold on a phone. */
export function FilterRow({ label, placeholder, text, onText, setCount, children }: FilterRowProps) {
  const [isOpen, setIsOpen] = useState(false)
  const id = useId()
  return (
    <div
      role="search"
      aria-label={label}
      className="no-print flex flex-wrap items-end gap-x-4 gap-y-3 border-b border-rule px-5 py-3 max-sm:px-4"
    >
      <TypedText label={label} placeholder={placeholder} text={text} onText={onText} />
      {children ? (
        <>
          <Button
            className="sm:hidden"
            aria-expanded={isOpen}
            aria-controls={id}
            onClick={() => setIsOpen((before) => !before)}
          >
            Filters{setCount > 0 ? ` (${setCount})` : ''}
          </Button>
          <div
            id={id}
            className={classNames(
              'flex flex-wrap items-end gap-x-4 gap-y-3 max-sm:w-full max-sm:flex-col max-sm:items-stretch',
              !isOpen && 'max-sm:hidden',
            )}
          >
            {children}
          </div>
        </>
      ) : null}
    </div>
  )
}

function TypedText({
  label,
  placeholder,
  text,
  onText,
}: Pick<FilterRowProps, 'label' | 'placeholder' | 'text' | 'onText'>) {
  const [typed, setTyped] = useState(text)
  const [sent, setSent] = useState(text)
  const [known, setKnown] = useState(text)
  // Changed from elsewhere (“Show all”, the browser's Back), not by what was typed here.
  if (text !== known) {
    setKnown(text)
    if (text !== sent) {
      setTyped(text)
      setSent(text)
    }
  }
  useEffect(() => {
    if (typed === sent) return
    const timer = setTimeout(() => {
      setSent(typed)
      onText(typed)
    }, PAUSE_MILLISECONDS)
    return () => clearTimeout(timer)
  }, [typed, sent, onText])
  return (
    <TextInput
      type="search"
      aria-label={label}
      placeholder={placeholder}
      maxLength={200}
      value={typed}
      onChange={(event) => setTyped(event.target.value)}
      className="max-w-64 min-w-40 flex-1"
    />
  )
}

interface FilterSelectProps<Value extends string> {
  label: string
  value: Value | undefined
  /** Without one for “any”, which comes first. */
  options: readonly SelectOption<Value>[]
  /** What is said where nothing is chosen. */
  anyLabel?: string
  onValue: (value: Value | undefined) => void
}

export function FilterSelect<Value extends string>(props: FilterSelectProps<Value>) {
  const { label, value, options, anyLabel = 'any', onValue } = props
  const id = useId()
  return (
    <div className="flex flex-col gap-0.5">
      <label htmlFor={id} className="text-sm text-soft">
        {label}
      </label>
      <Select
        id={id}
        value={value ?? ''}
        options={[{ value: '', label: anyLabel }, ...options]}
        onChange={(event) => onValue(options.find((option) => option.value === event.target.value)?.value)}
      />
    </div>
  )
}

interface FilterDayProps {
  label: string
  value: string | undefined
  onValue: (value: string | undefined) => void
}

export function FilterDay({ label, value, onValue }: FilterDayProps) {
  const id = useId()
  return (
    <div className="flex flex-col gap-0.5">
      <label htmlFor={id} className="text-sm text-soft">
        {label}
      </label>
      <TextInput
        id={id}
        type="date"
        // Beyond these years the browser lets a half-typed year through.
        min={FIRST_DAY}
        max={LAST_DAY}
        value={value ?? ''}
        onChange={(event) => {
          if (event.target.validity.valid) onValue(event.target.value || undefined)
        }}
      />
    </div>
  )
}

import type { ComponentProps } from 'react'
import { classNames } from './class-names'

export interface SelectOption<Value extends string = string> {
  value: Value
  label: string
  isDisabled?: boolean
}

interface SelectProps extends ComponentProps<'select'> {
  options: readonly SelectOption[]
}

/** The browser's own list, drawn by us where it allows it (app/globals.css), so that it stays within the theme. */
export function Select({ options, className, ...rest }: SelectProps) {
  return (
    <span className={classNames('relative block', className)}>
      <select className="control block pr-8" {...rest}>
        {options.map(({ value, label, isDisabled }) => (
          <option key={value} value={value} disabled={isDisabled}>
            {label}
          </option>
        ))}
      </select>
      <svg
        aria-hidden="true"
        viewBox="0 0 12 12"
        // A long choice runs out below the arrow, not through it.
        className="pointer-events-none absolute top-1/2 right-px box-content size-3 -translate-y-1/2 rounded-control bg-card pr-2.25 pl-1 text-soft"
      >
        <path d="M2 4.5 6 8.5 10 4.5" fill="none" stroke="currentColor" strokeWidth="1.6" />
      </svg>
    </span>
  )
}

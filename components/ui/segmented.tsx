import { useId } from 'react'
import { classNames } from './class-names'

interface SegmentedProps<Value extends string> {
  /** Read to those who can't see the group. */
  label: string
  value: Value | null
  options: readonly { value: Value; label: string }[]
  onValue: (value: Value) => void
  className?: string
}

/** One choice out of a few, side by side. A radio group underneath, so the arrow keys move within it. */
export function Segmented<Value extends string>({ label, value, options, onValue, className }: SegmentedProps<Value>) {
  const name = useId()
  return (
    <div
      role="radiogroup"
      aria-label={label}
      className={classNames('inline-flex overflow-hidden rounded-control border border-rule bg-card', className)}
    >
      {options.map((option) => (
        <label
          key={option.value}
          className={classNames(
            'relative cursor-pointer px-3 py-1 text-sm leading-5 max-sm:px-2 pointer-coarse:min-w-11 pointer-coarse:py-3 text-center',
            'has-focus-visible:outline-2 has-focus-visible:-outline-offset-2 has-focus-visible:outline-brass',
            option.value === value ? 'bg-faint font-semibold text-ink' : 'text-soft hover:text-ink',
          )}
        >
          <input
            type="radio"
            name={name}
            value={option.value}
            checked={option.value === value}
            onChange={() => onValue(option.value)}
            className="absolute inset-0 size-full cursor-pointer opacity-0"
          />
          {option.label}
        </label>
      ))}
    </div>
  )
}

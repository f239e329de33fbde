import { useId, type ComponentProps, type ReactNode } from 'react'
import { classNames } from './class-names'

interface CheckboxProps extends Omit<ComponentProps<'input'>, 'type'> {
  label: ReactNode
  hint?: ReactNode
  error?: string | null
}

/** A box to tick with its label beside it. */
export function Checkbox({ label, hint, error, className, ...rest }: CheckboxProps) {
  const noteId = useId()
  const note = error ?? hint
  return (
    <div className={classNames('flex flex-col gap-0.5', className)}>
      <label className="flex items-start gap-2.5 pointer-coarse:min-h-11 pointer-coarse:items-center">
        <input
          type="checkbox"
          className="mt-0.5"
          aria-describedby={note ? noteId : undefined}
          aria-invalid={error ? true : undefined}
          {...rest}
        />
        <span>{label}</span>
      </label>
      {note ? (
        <p
          id={noteId}
          role={error ? 'alert' : undefined}
          className={classNames('pl-7 text-sm', error ? 'text-oxide' : 'text-soft')}
        >
          {note}
        </p>
      ) : null}
    </div>
  )
}

import { useId, type ComponentProps, type ReactNode } from 'react'
import { classNames } from './class-names'

interface ChoiceProps extends Omit<ComponentProps<'input'>, 'type'> {
  label: ReactNode
  hint?: ReactNode
  error?: string | null
}

export function Checkbox(props: ChoiceProps) {
  return <Choice type="checkbox" {...props} />
}

export function Radio(props: ChoiceProps) {
  return <Choice type="radio" {...props} />
}

function Choice({ label, hint, error, className, type, ...rest }: ChoiceProps & { type: 'checkbox' | 'radio' }) {
  const noteId = useId()
  const note = error ?? hint
  return (
    <div className={classNames('flex flex-col gap-0.5', className)}>
      <label className="flex items-start gap-2.5 pointer-coarse:min-h-11 pointer-coarse:items-center">
        <input
          type={type}
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

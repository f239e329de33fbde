import { useId, type ReactNode } from 'react'
import { classNames } from './class-names'

/** What a Field hands to the control inside it, so that label, hint and fault belong to it. */
export interface ControlProps {
  id: string
  'aria-describedby': string | undefined
  'aria-invalid': true | undefined
}

interface FieldProps {
  label: ReactNode
  hint?: ReactNode
  /** What is wrong, in words; shown beside the control and read with it. */
  error?: string | null
  className?: string
  /** `<Field label="Name">{(control) => <TextInput {...control} />}</Field>` */
  children: (control: ControlProps) => ReactNode
}

export function Field({ label, hint, error, className, children }: FieldProps) {
  const id = useId()
  const hintId = `${id}-hint`
  const errorId = `${id}-error`
  const described = [error ? errorId : null, hint ? hintId : null].filter(Boolean).join(' ')
  return (
    <div className={classNames('flex flex-col gap-1', className)}>
      <label htmlFor={id} className="font-medium">
        {label}
      </label>
      {children({ id, 'aria-describedby': described || undefined, 'aria-invalid': error ? true : undefined })}
      {error ? (
        <p id={errorId} role="alert" className="text-sm text-oxide">
          <span aria-hidden="true">▲ </span>
          {error}
        </p>
      ) : null}
      {hint ? (
        <p id={hintId} className="text-sm text-soft">
          {hint}
        </p>
      ) : null}
    </div>
  )
}

/** A group of controls under one heading, with its own fault. */
export function FieldGroup({ legend, hint, children }: { legend: ReactNode; hint?: ReactNode; children: ReactNode }) {
  return (
    <fieldset className="flex flex-col gap-3">
      <legend className="mb-1 font-semibold">{legend}</legend>
      {hint ? <p className="text-sm text-soft">{hint}</p> : null}
      {children}
    </fieldset>
  )
}

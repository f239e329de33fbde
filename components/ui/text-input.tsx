import type { ComponentProps } from 'react'
import { classNames } from './class-names'

export function TextInput({ className, type = 'text', ...rest }: ComponentProps<'input'>) {
  return <input type={type} className={classNames('control', className)} {...rest} />
}

/** Without the browser's resize corner, which no style can tint and Night can't have. */
export function TextArea({ className, rows = 4, ...rest }: ComponentProps<'textarea'>) {
  return <textarea rows={rows} className={classNames('control resize-none', className)} {...rest} />
}

import type { ComponentProps } from 'react'
import { classNames } from './class-names'

export function TextInput({ className, type = 'text', ...rest }: ComponentProps<'input'>) {
  return <input type={type} className={classNames('control', className)} {...rest} />
}

export function TextArea({ className, rows = 4, ...rest }: ComponentProps<'textarea'>) {
  return <textarea rows={rows} className={classNames('control', className)} {...rest} />
}

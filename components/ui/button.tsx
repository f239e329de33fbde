import Link from 'next/link'
import type { ComponentProps } from 'react'
import { classNames } from './class-names'

export type ButtonVariant = 'primary' | 'plain' | 'quiet' | 'danger'

const base =
  'inline-flex items-center justify-center gap-2 rounded-control border whitespace-nowrap pointer-coarse:min-h-11'

const sizes = {
  usual: 'min-h-9 px-3.5 py-1.5 text-base leading-5',
  small: 'min-h-8 px-2.5 py-1 text-sm leading-5',
  icon: 'size-9 pointer-coarse:size-11',
}

const variants: Record<ButtonVariant, string> = {
  primary: 'border-ink bg-ink font-semibold text-sheet hover:border-soft hover:bg-soft',
  plain: 'border-rule bg-sheet text-ink hover:border-steel hover:bg-faint',
  quiet: 'border-transparent bg-transparent text-ink hover:bg-faint',
  danger: 'border-oxide bg-card text-oxide hover:bg-faint',
}

const disabled = 'disabled:border-rule disabled:bg-faint disabled:text-soft disabled:font-normal'

interface Look {
  variant?: ButtonVariant
  size?: keyof typeof sizes
}

export function Button({
  variant = 'plain',
  size = 'usual',
  className,
  type = 'button',
  ...rest
}: ComponentProps<'button'> & Look) {
  return (
    <button type={type} className={classNames(base, sizes[size], variants[variant], disabled, className)} {...rest} />
  )
}

/** A link that looks like a button: it leads somewhere, it does nothing by itself. */
export function ButtonLink({
  variant = 'plain',
  size = 'usual',
  className,
  ...rest
}: ComponentProps<typeof Link> & Look) {
  return <Link className={classNames(base, sizes[size], variants[variant], className)} {...rest} />
}

/** The same for a download or another address that is not a page. */
export function ButtonAnchor({ variant = 'plain', size = 'usual', className, ...rest }: ComponentProps<'a'> & Look) {
  return <a className={classNames(base, sizes[size], variants[variant], className)} {...rest} />
}

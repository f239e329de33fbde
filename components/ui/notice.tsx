import type { ReactNode } from 'react'
import { classNames } from './class-names'

export type NoticeTone = 'note' | 'good' | 'warning' | 'error'

const tones: Record<NoticeTone, { bar: string; word: string | null }> = {
  note: { bar: 'border-plum', word: null },
  good: { bar: 'border-verdigris', word: null },
  warning: { bar: 'border-brass-fill', word: 'Caution' },
  error: { bar: 'border-oxide', word: 'Problem' },
}

interface NoticeProps {
  tone?: NoticeTone
  title?: ReactNode
  children: ReactNode
  actions?: ReactNode
  /** Read out as soon as it appears: for what has just happened, not for what was there from the start. */
  isLive?: boolean
  className?: string
}

/** A remark beside the work. The tone is said in a word as well as by the bar. */
export function Notice({ tone = 'note', title, children, actions, isLive = false, className }: NoticeProps) {
  const { bar, word } = tones[tone]
  const heading = title ?? word
  return (
    <div
      role={isLive ? (tone === 'error' ? 'alert' : 'status') : undefined}
      className={classNames('min-w-0 border-l-3 py-0.5 pl-3 text-base wrap-anywhere', bar, className)}
    >
      {heading ? <p className={classNames('font-semibold', tone === 'error' && 'text-oxide')}>{heading}</p> : null}
      <div>{children}</div>
      {actions ? <div className="mt-2 flex flex-wrap gap-2">{actions}</div> : null}
    </div>
  )
}

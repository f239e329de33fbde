import type { ReactNode } from 'react'
import { classNames } from '@/components/ui/class-names'

/** The width and spacing of a page; its parts lie one below the other. */
export function PageFrame({ children, isNarrow = false }: { children: ReactNode; isNarrow?: boolean }) {
  return (
    <div
      className={classNames(
        'mx-auto flex w-full flex-col gap-5 px-8 pt-7 pb-16 max-sm:px-4 max-sm:pt-5 print:p-0',
        isNarrow ? 'max-w-xl' : 'max-w-[1680px]',
      )}
    >
      {children}
    </div>
  )
}

'use client'

import { useEffect, useId, useRef, type ReactNode } from 'react'
import { classNames } from './class-names'

interface DialogProps {
  isOpen: boolean
  onClose: () => void
  title: ReactNode
  children: ReactNode
  className?: string
}

/** The browser's own modal dialog: it keeps the focus inside, closes on Escape and gives the focus back. */
export function Dialog({ isOpen, onClose, title, children, className }: DialogProps) {
  const dialog = useRef<HTMLDialogElement>(null)
  const titleId = useId()

  useEffect(() => {
    const element = dialog.current
    if (!element) return
    if (isOpen && !element.open) element.showModal()
    if (!isOpen && element.open) element.close()
  }, [isOpen])

  return (
    <dialog
      ref={dialog}
      aria-labelledby={titleId}
      // Told also when we closed it ourselves, and by then another dialog may stand in its place.
      onClose={() => isOpen && onClose()}
      className={classNames(
        'm-auto w-full max-w-lg rounded-card border border-steel bg-card p-6 wrap-anywhere text-ink outline-none max-sm:max-w-[calc(100vw-1.5rem)] max-sm:p-4',
        className,
      )}
    >
      <h2 id={titleId} className="mb-3 text-finding font-semibold">
        {title}
      </h2>
      {isOpen ? children : null}
    </dialog>
  )
}

/** The row of buttons that ends a dialog or a form. */
export function Actions({ children, className }: { children: ReactNode; className?: string }) {
  return <div className={classNames('mt-5 flex flex-wrap items-center justify-end gap-2', className)}>{children}</div>
}

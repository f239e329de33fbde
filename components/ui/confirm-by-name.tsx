'use client'

import { useState, type ReactNode } from 'react'
import { Button } from './button'
import { Actions, Dialog } from './dialog'
import { Field } from './field'
import { Notice } from './notice'
import { TextInput } from './text-input'

interface ConfirmByNameProps {
  isOpen: boolean
  onClose: () => void
  title: string
  /** The name that must be typed. */
  name: string
  /** What will be lost, in words. */
  children: ReactNode
  confirmLabel: string
  onConfirm: () => Promise<void>
}

/** Asks for the name of a thing before it is removed for good. */
export function ConfirmByName({ isOpen, onClose, title, name, children, confirmLabel, onConfirm }: ConfirmByNameProps) {
  const [typed, setTyped] = useState('')
  const [isBusy, setBusy] = useState(false)
  const [fault, setFault] = useState<string | null>(null)

  async function confirm() {
    setBusy(true)
    setFault(null)
    try {
      await onConfirm()
      setTyped('')
    } catch (error) {
      setFault(error instanceof Error ? error.message : 'It did not work. Try again.')
    } finally {
      setBusy(false)
    }
  }

  return (
    <Dialog isOpen={isOpen} onClose={onClose} title={title}>
      <form
        onSubmit={(event) => {
          event.preventDefault()
          if (typed.trim() === name) void confirm()
        }}
      >
        <div className="mb-4">{children}</div>
        <Field label={`Type “${name}” to confirm`}>
          {(control) => (
            <TextInput
              {...control}
              value={typed}
              autoComplete="off"
              onChange={(event) => setTyped(event.target.value)}
            />
          )}
        </Field>
        {fault ? (
          <Notice tone="error" isLive className="mt-3">
            {fault}
          </Notice>
        ) : null}
        <Actions>
          <Button onClick={onClose}>Keep it</Button>
          <Button type="submit" variant="danger" disabled={isBusy || typed.trim() !== name}>
            {confirmLabel}
          </Button>
        </Actions>
      </form>
    </Dialog>
  )
}

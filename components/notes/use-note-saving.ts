'use client'

import { useState } from 'react'
import { RequestError } from '@/lib/client/fetcher'
import { noteSchema, type Note } from '@/lib/schemas/api'

/** Why a note was not saved; in each case what was typed stays. */
export type NoteTrouble =
  | { kind: 'changed'; theirs: Note; changedBy?: string; changedAt?: string }
  | { kind: 'deleted' }
  | { kind: 'signed-out'; message: string }
  | { kind: 'fault'; message: string }

/** Saving what is in a note’s editor, and what came of it. */
export function useNoteSaving(isNew: boolean) {
  const [trouble, setTrouble] = useState<NoteTrouble | null>(null)
  const [isBusy, setBusy] = useState(false)

  /** Whether it was saved. */
  async function save(send: () => void | Promise<void>): Promise<boolean> {
    setBusy(true)
    setTrouble(null)
    try {
      await send()
      return true
    } catch (error) {
      setTrouble(troubleOf(error, isNew))
      return false
    } finally {
      setBusy(false)
    }
  }

  return { save, isBusy, trouble, setTrouble }
}

function troubleOf(error: unknown, isNew: boolean): NoteTrouble {
  if (error instanceof RequestError) {
    const theirs = error.isConflict ? noteSchema.safeParse(error.current) : null
    if (theirs?.success) {
      return { kind: 'changed', theirs: theirs.data, changedBy: error.changedBy, changedAt: error.changedAt }
    }
    if (error.code === 'not-found' && !isNew) return { kind: 'deleted' }
    if (error.isSignedOut) return { kind: 'signed-out', message: error.message }
    return { kind: 'fault', message: error.fields.mentions ?? error.fields.text ?? error.message }
  }
  const message = error instanceof Error ? error.message : 'The note could not be saved. Try again.'
  return { kind: 'fault', message }
}

'use client'

import { useState } from 'react'
import type { z } from 'zod'
import { RequestError } from '@/lib/client/fetcher'

export interface SaveConflict<Thing> {
  changedBy?: string
  changedAt?: string
  current: Thing
}

/**
 * Saving one versioned thing: busy, saved, refused, or changed by somebody else meanwhile. The form keeps what was typed;
 * this keeps the rest.
 */
export function useSave<Thing extends z.ZodType>(schema: Thing) {
  type Value = z.output<Thing>
  const [isBusy, setBusy] = useState(false)
  const [isSaved, setSaved] = useState(false)
  const [fault, setFault] = useState<string | null>(null)
  const [fields, setFields] = useState<Record<string, string>>({})
  const [conflict, setConflict] = useState<SaveConflict<Value> | null>(null)

  async function save(send: () => Promise<Value>): Promise<Value | null> {
    setBusy(true)
    setSaved(false)
    setFault(null)
    setFields({})
    try {
      const saved = await send()
      setConflict(null)
      setSaved(true)
      return saved
    } catch (error) {
      if (!(error instanceof RequestError)) throw error
      const current = error.isConflict ? schema.safeParse(error.current) : null
      if (current?.success) {
        setConflict({ changedBy: error.changedBy, changedAt: error.changedAt, current: current.data })
      } else {
        setFault(error.message)
        setFields(error.fields)
      }
      return null
    } finally {
      setBusy(false)
    }
  }

  return { save, isBusy, isSaved, fault, fields, conflict, dropConflict: () => setConflict(null) }
}

import { useState } from 'react'
import type { FieldValues, Path, UseFormSetError } from 'react-hook-form'
import { showServerFaults } from '@/lib/client/server-fields'

/** What became of the last try to send a form: a fault to show above its button, or a sentence that says what was done. */
export function useAccountForm<Values extends FieldValues>(
  fields: readonly Path<Values>[],
  setError: UseFormSetError<Values>,
) {
  const [fault, setFault] = useState<string | null>(null)
  const [done, setDone] = useState<string | null>(null)

  /** @param send answers the sentence that says what was done */
  async function run(send: () => Promise<string>) {
    setFault(null)
    setDone(null)
    try {
      setDone(await send())
    } catch (error) {
      setFault(showServerFaults(error, fields, setError))
    }
  }

  return { fault, done, run }
}

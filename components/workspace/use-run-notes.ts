'use client'

import useSWR from 'swr'
import type { NoteAnchor } from '@/components/bench/notes'
import { getJson, RequestError, sendJson, sendOnly } from '@/lib/client/fetcher'
import { noteListSchema, noteSchema, type Note } from '@/lib/schemas/api'

/** The notes of one saved analysis and what can be done with them; none while the analysis has not been saved. */
export function useRunNotes(projectId: string, analysisId: string | null) {
  const base = `/api/projects/${projectId}`
  const key = analysisId ? `${base}/analyses/${analysisId}/notes` : null
  const { data, mutate } = useSWR(key, (url: string) => getJson(url, noteListSchema))

  async function refreshOnConflict<T>(work: Promise<T>): Promise<T> {
    try {
      return await work
    } catch (error) {
      if (error instanceof RequestError && error.isConflict) await mutate()
      throw error
    }
  }

  return {
    notes: data?.notes ?? [],
    add: key
      ? async (anchor: NoteAnchor, text: string) => {
          await sendJson('POST', key, { anchor, text }, noteSchema)
          await mutate()
        }
      : undefined,
    change: async ({ id, version, anchor }: Note, text: string) => {
      await refreshOnConflict(sendJson('PATCH', `${base}/notes/${id}`, { version, anchor, text }, noteSchema))
      await mutate()
    },
    remove: async ({ id }: Note) => {
      await sendOnly('DELETE', `${base}/notes/${id}`)
      await mutate()
    },
  }
}

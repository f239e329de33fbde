'use client'

import { useMemo } from 'react'
import useSWR from 'swr'
import type { NoteActions } from '@/components/notes/note-types'
import { getJson, sendJson, sendOnly } from '@/lib/client/fetcher'
import { useMembers } from '@/lib/client/project-data'
import { noteListSchema, noteSchema, type Note, type Project } from '@/lib/schemas/api'
import { canManageProject } from '@/lib/schemas/rights'

/** How often notes of other people are asked for while the page is seen. */
const REFRESH_MS = 30_000

interface RunNotesOptions {
  project: Project
  /** Null while the analysis has not been saved: it has no notes then. */
  analysisId: string | null
  /** Who looks. */
  userId: string
}

/** The notes of one saved analysis and what this person can do with them. */
export function useRunNotes({ project, analysisId, userId }: RunNotesOptions): { notes: Note[]; actions: NoteActions } {
  const base = `/api/projects/${project.id}`
  const key = analysisId ? `${base}/analyses/${analysisId}/notes` : null
  const { data, mutate } = useSWR(key, (url: string) => getJson(url, noteListSchema), {
    refreshInterval: REFRESH_MS,
    revalidateOnFocus: true,
  })
  const { data: members } = useMembers(project.id)
  const canManage = canManageProject(project)

  const actions = useMemo((): NoteActions => {
    if (!key || !analysisId) return {}
    /** Shows at once what is so now, also when it is not what was wanted. */
    async function andRefresh<T>(work: Promise<T>): Promise<void> {
      try {
        await work
      } finally {
        await mutate()
      }
    }
    return {
      onAdd: (written) => andRefresh(sendJson('POST', key, written, noteSchema)),
      onChange: ({ id, version }, written) =>
        andRefresh(sendJson('PATCH', `${base}/notes/${id}`, { ...written, version }, noteSchema)),
      onDelete: ({ id }) => andRefresh(sendOnly('DELETE', `${base}/notes/${id}`)),
      onResolve: ({ id, version }, isResolved) =>
        andRefresh(sendJson('PUT', `${base}/notes/${id}/resolution`, { version, isResolved }, noteSchema)),
      canChange: ({ authorId }) => canManage || authorId === userId,
      people: members?.members.filter((member) => member.userId !== userId),
      presentIds: data?.notes.map(({ id }) => id),
      draftScope: analysisId,
    }
  }, [key, analysisId, base, canManage, userId, members, data, mutate])

  return { notes: data?.notes ?? [], actions }
}

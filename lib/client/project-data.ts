'use client'

import useSWR from 'swr'
import type { z } from 'zod'
import {
  analysisSchema,
  correctionSchema,
  memberListSchema,
  opticsPresetListSchema,
  projectContentsSchema,
  projectSchema,
} from '@/lib/schemas/api'
import { historySchema, runListSchema } from '@/lib/schemas/lists'
import { getJson } from './fetcher'
import { latestRunsKey } from './list-keys'

export type Member = z.output<typeof memberListSchema>['members'][number]
export type OpticsPreset = z.output<typeof opticsPresetListSchema>['presets'][number]

export const projectKey = (projectId: string) => `/api/projects/${projectId}`

export const projectsKey = '/api/projects'

/** Every view of the list of projects, for `mutate`: a project came, went or changed. */
export const isProjectsKey = (key: unknown) => typeof key === 'string' && key.split('?')[0] === projectsKey

/**
 * Asks again when the page is come back to: somebody may have put the project away or deleted it meanwhile. SWR tells only
 * one of all who use an address that the page is back, so every use of the project has to want it.
 */
export function useProject(projectId: string) {
  return useSWR<z.output<typeof projectSchema>, Error>(
    projectKey(projectId),
    (url: string) => getJson(url, projectSchema),
    { revalidateOnFocus: true, focusThrottleInterval: 2000 },
  )
}

/** The last runs that were brought in, and counts of all. */
export function useLatestRuns(projectId: string) {
  return useSWR<z.output<typeof runListSchema>, Error>(latestRunsKey(projectId), (url: string) =>
    getJson(url, runListSchema),
  )
}

export function useHistory(projectId: string) {
  return useSWR<z.output<typeof historySchema>, Error>(`${projectKey(projectId)}/history`, (url: string) =>
    getJson(url, historySchema),
  )
}

/** One analysis with its figures; nothing is asked while the id is not known. */
export function useAnalysis(projectId: string, analysisId: string | null) {
  return useSWR<z.output<typeof analysisSchema>, Error>(
    analysisId ? `${projectKey(projectId)}/analyses/${analysisId}` : null,
    (url: string) => getJson(url, analysisSchema),
  )
}

export function useCorrection(projectId: string, correctionId: string) {
  return useSWR<z.output<typeof correctionSchema>, Error>(
    `${projectKey(projectId)}/corrections/${correctionId}`,
    (url: string) => getJson(url, correctionSchema),
  )
}

export function useMembers(projectId: string) {
  return useSWR<z.output<typeof memberListSchema>, Error>(`${projectKey(projectId)}/members`, (url: string) =>
    getJson(url, memberListSchema),
  )
}

export function useOpticsPresets(projectId: string) {
  return useSWR<z.output<typeof opticsPresetListSchema>, Error>(
    `${projectKey(projectId)}/optics-presets`,
    (url: string) => getJson(url, opticsPresetListSchema),
  )
}

/** What goes with the project when it is deleted; asked for while `isWanted`, and then afresh. */
export function useProjectContents(projectId: string, isWanted: boolean) {
  return useSWR<z.output<typeof projectContentsSchema>, Error>(
    isWanted ? `${projectKey(projectId)}/contents` : null,
    (url: string) => getJson(url, projectContentsSchema),
  )
}

'use client'

import useSWR, { type SWRResponse } from 'swr'
import type { z } from 'zod'
import {
  analysisListSchema,
  analysisSchema,
  correctionListSchema,
  correctionSchema,
  memberListSchema,
  opticsPresetListSchema,
  projectContentsSchema,
  projectListSchema,
  projectSchema,
  runListSchema,
} from '@/lib/schemas/api'
import { getJson } from './fetcher'
import { getAllPages } from './all-pages'

export type RunRow = z.output<typeof runListSchema>['runs'][number]
export type AnalysisRow = z.output<typeof analysisListSchema>['analyses'][number]
export type CorrectionRow = z.output<typeof correctionListSchema>['corrections'][number]
export type Member = z.output<typeof memberListSchema>['members'][number]
export type OpticsPreset = z.output<typeof opticsPresetListSchema>['presets'][number]

export const projectKey = (projectId: string) => `/api/projects/${projectId}`

export const projectsKey = '/api/projects'

export function useProjects() {
  return useSWR<z.output<typeof projectListSchema>, Error>(projectsKey, (url: string) =>
    getJson(url, projectListSchema),
  )
}

export function useProject(projectId: string) {
  return useSWR<z.output<typeof projectSchema>, Error>(projectKey(projectId), (url: string) =>
    getJson(url, projectSchema),
  )
}

export function useRuns(projectId: string): SWRResponse<RunRow[], Error> {
  return useSWR<RunRow[], Error>(`${projectKey(projectId)}/runs`, (url: string) =>
    getAllPages(url, runListSchema, (page) => page.runs),
  )
}

export function useAnalyses(projectId: string): SWRResponse<AnalysisRow[], Error> {
  return useSWR<AnalysisRow[], Error>(`${projectKey(projectId)}/analyses`, (url: string) =>
    getAllPages(url, analysisListSchema, (page) => page.analyses),
  )
}

/** One analysis with its figures; nothing is asked while the id is not known. */
export function useAnalysis(projectId: string, analysisId: string | null) {
  return useSWR<z.output<typeof analysisSchema>, Error>(
    analysisId ? `${projectKey(projectId)}/analyses/${analysisId}` : null,
    (url: string) => getJson(url, analysisSchema),
  )
}

export function useCorrections(projectId: string): SWRResponse<CorrectionRow[], Error> {
  return useSWR<CorrectionRow[], Error>(`${projectKey(projectId)}/corrections`, (url: string) =>
    getAllPages(url, correctionListSchema, (page) => page.corrections),
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

/** Asks again when the page is come back to: somebody may have put the project away or deleted it meanwhile. */
export function useProjectStanding(projectId: string) {
  return useSWR<z.output<typeof projectSchema>, Error>(
    projectKey(projectId),
    (url: string) => getJson(url, projectSchema),
    { revalidateOnFocus: true, focusThrottleInterval: 2000 },
  )
}

import { listSearch, runQuerySchema } from '@/lib/schemas/lists'

/* Addresses that a page fills beforehand and a hook asks for: both must write them alike. */

export const LATEST_RUNS = runQuerySchema.parse({ sort: 'created', limit: 5 })

export function latestRunsKey(projectId: string): string {
  return `/api/projects/${projectId}/runs${listSearch(runQuerySchema, LATEST_RUNS)}`
}

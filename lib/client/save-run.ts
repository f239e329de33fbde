import {
  analysisSchema,
  newAnalysisSchema,
  importRunSchema,
  runSchema,
  type Analysis,
  type Run,
} from '@/lib/schemas/api'
import type { z } from 'zod'
import { sendBytes, sendJson } from './fetcher'

export interface RunToSave {
  projectId: string
  runName: string
  fileName: string
  bytes: Uint8Array<ArrayBuffer>
  settings: z.infer<typeof importRunSchema>['settings']
  conversion: z.infer<typeof importRunSchema>['conversion']
  facts: z.infer<typeof importRunSchema>['facts']
}

/** Stores the file byte for byte; the answer's status is 'uploaded' until it has been read by importRun. */
export function uploadRun({ projectId, runName, fileName, bytes }: RunToSave): Promise<Run> {
  const query = new URLSearchParams({ name: runName, fileName })
  return sendBytes(`/api/projects/${projectId}/runs?${query}`, bytes, runSchema)
}

/** Has the server read the stored file with the columns and units that were chosen here. */
export function importRun(run: Run, { settings, conversion, facts }: Omit<RunToSave, 'bytes'>): Promise<Run> {
  const body = importRunSchema.parse({ version: run.version, settings, conversion, facts })
  return sendJson('PUT', `/api/projects/${run.projectId}/runs/${run.id}/import`, body, runSchema)
}

/** Saves the figures as they stand on the bench. */
export function saveAnalysis(projectId: string, analysis: z.input<typeof newAnalysisSchema>): Promise<Analysis> {
  return sendJson('POST', `/api/projects/${projectId}/analyses`, newAnalysisSchema.parse(analysis), analysisSchema)
}

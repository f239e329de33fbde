import type { z } from 'zod'
import {
  analysisSchema,
  importRunSchema,
  newAnalysisSchema,
  runSchema,
  type Analysis,
  type Run,
} from '@/lib/schemas/api'
import { RequestError, sendBytes, sendJson } from './fetcher'

export interface FileToStore {
  projectId: string
  runName: string
  fileName: string
  bytes: Uint8Array<ArrayBuffer>
}

export type ReadingChoices = Omit<z.infer<typeof importRunSchema>, 'version'>

/** Stores the file byte for byte; the answer's status is 'uploaded' until it has been read by importRun. */
export function uploadRun({ projectId, runName, fileName, bytes }: FileToStore): Promise<Run> {
  const query = new URLSearchParams({ name: runName, fileName })
  return sendBytes(`/api/projects/${projectId}/runs?${query}`, bytes, runSchema)
}

/**
 * Has the server read the stored file with the columns and units that were chosen here. Where it has done so already and
 * only its answer was lost, asking again is no conflict.
 */
export async function importRun(run: Run, { settings, conversion, facts }: ReadingChoices): Promise<Run> {
  const body = importRunSchema.parse({ version: run.version, settings, conversion, facts })
  try {
    return await sendJson('PUT', `/api/projects/${run.projectId}/runs/${run.id}/import`, body, runSchema)
  } catch (error) {
    const current = error instanceof RequestError && error.isConflict ? runSchema.safeParse(error.current) : null
    if (current?.success && isReadAs(current.data, body)) return current.data
    throw error
  }
}

/** Whether the run was read with these very choices; parsed values name their fields in the schema's order. */
function isReadAs(run: Run, { settings, conversion }: ReadingChoices): boolean {
  const isSame = (a: unknown, b: unknown) => JSON.stringify(a) === JSON.stringify(b)
  return run.status === 'ready' && isSame(run.importSettings, settings) && isSame(run.conversion, conversion)
}

/** Saves the figures as they stand on the bench. */
export function saveAnalysis(projectId: string, analysis: z.input<typeof newAnalysisSchema>): Promise<Analysis> {
  return sendJson('POST', `/api/projects/${projectId}/analyses`, newAnalysisSchema.parse(analysis), analysisSchema)
}

/** The run's stored columns, packed; they travel as a gzip file, and the worker unpacks what it holds. */
export function readPackedColumns({ projectId, id }: Run): Promise<Uint8Array> {
  return fetchPackedColumns(`/api/projects/${projectId}/runs/${id}/columns`)
}

/** Columns behind any address that answers them as a gzip file. */
export async function fetchPackedColumns(url: string): Promise<Uint8Array> {
  const response = await fetch(url)
  if (!response.ok) throw new Error('The stored columns could not be fetched. Reload the page to try again.')
  const packed = response.body?.pipeThrough(new DecompressionStream('gzip'))
  return new Uint8Array(await new Response(packed).arrayBuffer())
}

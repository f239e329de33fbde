import { proxy, releaseProxy, wrap } from 'comlink'
import type { AnalysisOutcome, Progress, Recipe } from '@/lib/analysis/types'
import type { ImportSettings, PreviewOutcome } from '@/lib/formats/types'
import type { AnalysisWorkerApi, LoadOutcome } from './analysis-worker-api'

type ProgressListener = (progress: Progress) => void

/** The worker with ordinary functions for listeners, and an end. */
export interface AnalysisClient {
  preview(bytes: Uint8Array, layout?: Partial<ImportSettings['layout']>): Promise<PreviewOutcome>
  loadFile(bytes: Uint8Array, settings: ImportSettings, onProgress?: ProgressListener): Promise<LoadOutcome>
  loadPacked(packed: Uint8Array): Promise<LoadOutcome>
  /** Null: overtaken by a newer call or cancelled. */
  analyse(recipe: Recipe, onProgress?: ProgressListener): Promise<AnalysisOutcome | null>
  cancel(): Promise<void>
  /** Ends the worker; calls that are under way never answer. */
  dispose(): void
}

/**
 * Starts the analysis worker. Only in a browser: call it from an effect or an event.
 *
 * @param onFault told when the worker itself breaks down (it could not be loaded, or ran out of memory)
 */
export function createAnalysisClient(onFault?: (message: string) => void): AnalysisClient {
  const worker = new Worker(new URL('../../workers/analysis.worker.ts', import.meta.url), { type: 'module' })
  worker.addEventListener('error', (event) => onFault?.(event.message))
  const remote = wrap<AnalysisWorkerApi>(worker)
  const listener = (onProgress?: ProgressListener) => (onProgress ? proxy(onProgress) : undefined)
  return {
    preview: (bytes, layout) => remote.preview(bytes, layout),
    loadFile: (bytes, settings, onProgress) => remote.loadFile(bytes, settings, listener(onProgress)),
    loadPacked: (packed) => remote.loadPacked(packed),
    analyse: (recipe, onProgress) => remote.analyse(recipe, listener(onProgress)),
    cancel: () => remote.cancel(),
    dispose() {
      remote[releaseProxy]()
      worker.terminate()
    },
  }
}

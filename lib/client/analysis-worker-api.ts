import type { AnalysisOutcome, Progress, Recipe } from '@/lib/analysis/types'
import type { ImportSettings, ImportFault, ParsedRun, PreviewOutcome } from '@/lib/formats/types'

/** What is known of a run once the worker has read it; the samples themselves stay in the worker. */
export type LoadOutcome =
  | ({ ok: true; hasDeclination: boolean; hasWormAngle: boolean } & Omit<ParsedRun, 'ok' | 'columns'>)
  | { ok: false; fault: ImportFault }

/**
 * The analysis worker as the page sees it through Comlink. One worker holds one run; a new load replaces it.
 * A call to `analyse` that is overtaken by a newer one, or cancelled, answers null.
 */
export interface AnalysisWorkerApi {
  /** Guesses the layout of a file's text from its first part; `layout` holds what the user has corrected. */
  preview(bytes: Uint8Array, layout?: Partial<ImportSettings['layout']>): Promise<PreviewOutcome>
  /** Reads the whole file and keeps its columns. */
  loadFile(bytes: Uint8Array, settings: ImportSettings, onProgress?: (progress: Progress) => void): Promise<LoadOutcome>
  /** Takes columns that were stored packed (lib/formats/packed-columns.ts). */
  loadPacked(packed: Uint8Array): Promise<LoadOutcome>
  analyse(recipe: Recipe, onProgress?: (progress: Progress) => void): Promise<AnalysisOutcome | null>
  cancel(): Promise<void>
}

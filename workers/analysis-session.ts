import { createAnalyser } from '@/lib/analysis/analyse'
import type { Analyser } from '@/lib/analysis/analyse'
import type { AnalysisOutcome, Progress, Recipe, RunColumns } from '@/lib/analysis/types'
import { unpackColumns } from '@/lib/formats/packed-columns'
import { parseTable } from '@/lib/formats/parse-table'
import { previewTable } from '@/lib/formats/preview-table'
import type { ImportFault, ImportSettings, ParsedRun, PreviewOutcome } from '@/lib/formats/types'

type ProgressListener = (progress: Progress) => void

/** What is known of a run once it has been read; the samples stay here. */
type Loaded =
  | ({ ok: true; hasDeclination: boolean; hasWormAngle: boolean } & Omit<ParsedRun, 'ok' | 'columns'>)
  | { ok: false; fault: ImportFault }

export interface SessionClock {
  /** Lets waiting messages be heard: answers in a later task, not in a microtask. */
  pause(): Promise<void>
  /** Milliseconds, from any origin. */
  now(): number
}

/** How long the session computes before it listens. */
const SLICE_MS = 20

/**
 * One run and its analyses. Long work is done in slices of about 20 ms; a newer analysis, a newer run or a cancel makes
 * an older analysis answer null at its next pause.
 */
export function createAnalysisSession({ pause, now }: SessionClock) {
  let analyser: Analyser | null = null
  let latestAnalysis = 0
  let latestLoad = 0

  async function inSlices<Step, Result>(
    steps: Generator<Step, Result>,
    { onStep, isWanted }: { onStep: (step: Step) => void; isWanted: () => boolean },
  ): Promise<Result | null> {
    let sliceStart = now()
    for (;;) {
      const step = steps.next()
      if (step.done) return isWanted() ? step.value : null
      if (now() - sliceStart < SLICE_MS) continue
      onStep(step.value)
      await pause()
      if (!isWanted()) return null
      sliceStart = now()
    }
  }

  function keep(columns: RunColumns): void {
    analyser = createAnalyser(columns)
    latestAnalysis += 1
  }

  return {
    async preview(bytes: Uint8Array, layout?: Partial<ImportSettings['layout']>): Promise<PreviewOutcome> {
      return previewTable(bytes, layout)
    },

    async loadFile(bytes: Uint8Array, settings: ImportSettings, onProgress?: ProgressListener): Promise<Loaded> {
      const load = ++latestLoad
      const parsed = await inSlices(parseTable(bytes, settings), {
        onStep: (fraction) => onProgress?.({ stage: 'reading', fraction }),
        // A file is read to its end even when another was chosen meanwhile; only its samples are then not kept.
        isWanted: () => true,
      })
      if (parsed === null) throw new Error('reading ended without an answer')
      if (!parsed.ok) return parsed
      const { columns, ...known } = parsed
      if (load === latestLoad) keep(columns)
      return { ...known, ...kindsOf(columns) }
    },

    async loadPacked(packed: Uint8Array): Promise<Loaded> {
      latestLoad += 1
      const { columns, startedAtMs } = unpackColumns(packed)
      keep(columns)
      return { ok: true, startedAtMs, rowCount: columns.timeSeconds.length, skipped: [], ...kindsOf(columns) }
    },

    async analyse(recipe: Recipe, onProgress?: ProgressListener): Promise<AnalysisOutcome | null> {
      const analysis = ++latestAnalysis
      if (analyser === null) throw new Error('there is no run to analyse: load one first')
      // Several settings changed in a row arrive as several messages; only the last one is worth starting.
      await pause()
      if (analysis !== latestAnalysis) return null
      return inSlices(analyser.run(recipe), {
        onStep: (progress) => onProgress?.(progress),
        isWanted: () => analysis === latestAnalysis,
      })
    },

    async cancel(): Promise<void> {
      latestAnalysis += 1
    },
  }
}

function kindsOf(columns: RunColumns) {
  return {
    hasDeclination: columns.declinationDisplacement !== null,
    hasWormAngle: columns.wormAngleDegrees !== null,
  }
}

import { expose, releaseProxy, transfer } from 'comlink'
import type { AnalysisOutcome, Progress, Recipe } from '@/lib/analysis/types'
import type { ImportSettings } from '@/lib/formats/types'
import { createAnalysisSession } from './analysis-session'

/** A macrotask, unlike a promise, lets messages in; unlike setTimeout it is not held back by 4 ms. */
const channel = new MessageChannel()
const waiting: (() => void)[] = []
channel.port1.onmessage = () => waiting.shift()?.()
const pause = () =>
  new Promise<void>((resolve) => {
    waiting.push(resolve)
    channel.port2.postMessage(null)
  })

const session = createAnalysisSession({ pause, now: () => performance.now() })

type Listener = ((progress: Progress) => void) & { [releaseProxy]?: () => void }

const api = {
  ...session,

  async loadFile(bytes: Uint8Array, settings: ImportSettings, onProgress?: Listener) {
    try {
      return await session.loadFile(bytes, settings, onProgress)
    } finally {
      onProgress?.[releaseProxy]?.()
    }
  },

  async analyse(recipe: Recipe, onProgress?: Listener) {
    try {
      const outcome = await session.analyse(recipe, onProgress)
      return outcome === null ? null : handOver(outcome)
    } finally {
      onProgress?.[releaseProxy]?.()
    }
  },
}

export type AnalysisWorkerExports = typeof api

/** The page gets copies of the curves without another copy on the way; the session keeps its own for the next recipe. */
function handOver(outcome: AnalysisOutcome): AnalysisOutcome {
  if (!outcome.ok) return outcome
  const views = structuredClone(outcome.views)
  const buffers: ArrayBuffer[] = []
  const collect = (value: unknown): void => {
    if (value instanceof Float64Array) buffers.push(value.buffer as ArrayBuffer)
    else if (typeof value === 'object' && value !== null) Object.values(value).forEach(collect)
  }
  collect(views)
  return transfer({ ...outcome, views }, [...new Set(buffers)])
}

expose(api)

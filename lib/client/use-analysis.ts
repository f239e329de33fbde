'use client'

import { useCallback, useEffect, useMemo, useRef, useState } from 'react'
import type { AnalysisOutcome, Progress, Recipe } from '@/lib/analysis/types'
import type { ImportSettings, PreviewOutcome } from '@/lib/formats/types'
import { createAnalysisClient } from './analysis-client'
import type { AnalysisClient } from './analysis-client'
import type { LoadOutcome } from './analysis-worker-api'

export interface BenchAnalysis {
  /** The last outcome; it stays while a newer one is computed. Null before the first and after a new load. */
  outcome: AnalysisOutcome | null
  /** The recipe that the outcome was computed from. */
  outcomeRecipe: Recipe | null
  /** Whether the outcome is that of the present recipe: not while one is computed, nor after a cancel. */
  isCurrent: boolean
  progress: Progress | null
  isComputing: boolean
  /** The run that is in the worker; null before the first load and while one is being read. */
  loaded: LoadOutcome | null
  /** The worker broke down: what it said. The page must be loaded anew. */
  fault: string | null
  preview(bytes: Uint8Array, layout?: Partial<ImportSettings['layout']>): Promise<PreviewOutcome>
  loadFile(bytes: Uint8Array, settings: ImportSettings): Promise<LoadOutcome>
  loadPacked(packed: Uint8Array): Promise<LoadOutcome>
  /** Gives the running analysis up; the last outcome stays. */
  cancel(): void
}

interface State {
  outcome: AnalysisOutcome | null
  outcomeRecipe: Recipe | null
  progress: Progress | null
  isComputing: boolean
  loaded: LoadOutcome | null
  fault: string | null
}

const EMPTY: State = {
  outcome: null,
  outcomeRecipe: null,
  progress: null,
  isComputing: false,
  loaded: null,
  fault: null,
}

/**
 * One run in the worker, analysed with the recipe anew whenever either changes. The newest recipe wins: what an older
 * one answers is dropped.
 *
 * @param recipe null while there is nothing to analyse with
 * @param createClient how the worker is made; exchanged in tests
 */
export function useBenchAnalysis(
  recipe: Recipe | null,
  createClient: (onFault: (message: string) => void) => AnalysisClient = createAnalysisClient,
): BenchAnalysis {
  const [state, setState] = useState<State>(EMPTY)
  const [loadCount, setLoadCount] = useState(0)
  const clientRef = useRef<AnalysisClient | null>(null)
  const newestLoad = useRef(0)

  const client = useCallback(() => {
    clientRef.current ??= createClient((fault) =>
      setState((now) => ({ ...now, fault, isComputing: false, progress: null })),
    )
    return clientRef.current
  }, [createClient])

  useEffect(
    () => () => {
      clientRef.current?.dispose()
      clientRef.current = null
    },
    [],
  )

  // Recipes that say the same are the same, whatever object they stand in.
  const recipeText = recipe === null ? null : JSON.stringify(recipe)
  const isLoaded = state.loaded?.ok === true

  useEffect(() => {
    if (recipeText === null || !isLoaded) return
    let isNewest = true
    const wanted = JSON.parse(recipeText) as Recipe
    const start = async () => {
      setState((now) => ({ ...now, isComputing: true, progress: null }))
      try {
        const onProgress = (progress: Progress) => isNewest && setState((now) => ({ ...now, progress }))
        const outcome = await client().analyse(wanted, onProgress)
        if (!isNewest) return
        setState((now) => ({
          ...now,
          ...(outcome === null ? {} : { outcome, outcomeRecipe: wanted }),
          isComputing: false,
          progress: null,
        }))
      } catch (error) {
        if (isNewest) setState((now) => ({ ...now, fault: messageOf(error), isComputing: false, progress: null }))
      }
    }
    void start()
    return () => {
      isNewest = false
    }
  }, [client, recipeText, isLoaded, loadCount])

  const load = useCallback(async (read: (onProgress: (progress: Progress) => void) => Promise<LoadOutcome>) => {
    const number = ++newestLoad.current
    const isNewest = () => number === newestLoad.current
    setState((now) => ({ ...EMPTY, fault: now.fault, isComputing: true }))
    try {
      const loaded = await read((progress) => isNewest() && setState((now) => ({ ...now, progress })))
      if (isNewest()) {
        setState((now) => ({ ...now, loaded, progress: null, isComputing: false }))
        setLoadCount(number)
      }
      return loaded
    } catch (error) {
      if (isNewest()) setState((now) => ({ ...now, fault: messageOf(error), isComputing: false, progress: null }))
      throw error
    }
  }, [])

  const actions = useMemo(
    () => ({
      preview: (bytes: Uint8Array, layout?: Partial<ImportSettings['layout']>) => client().preview(bytes, layout),
      loadFile: (bytes: Uint8Array, settings: ImportSettings) =>
        load((onProgress) => client().loadFile(bytes, settings, onProgress)),
      loadPacked: (packed: Uint8Array) => load(() => client().loadPacked(packed)),
      cancel: () => void clientRef.current?.cancel(),
    }),
    [client, load],
  )
  const isCurrent =
    !state.isComputing && state.outcomeRecipe !== null && JSON.stringify(state.outcomeRecipe) === recipeText
  return { ...state, ...actions, isCurrent }
}

function messageOf(error: unknown): string {
  return error instanceof Error ? error.message : String(error)
}

'use client'

import { useEffect, useRef, useState } from 'react'
import type { AnalysisOutcome, Progress, Recipe } from '@/lib/analysis/types'
import { fetchPackedColumns } from '@/lib/client/save-run'
import { useBenchAnalysis } from '@/lib/client/use-analysis'

export interface ReportViews {
  outcome: AnalysisOutcome | null
  progress: Progress | null
  /** Why there are no pictures, in words; null while there is hope. */
  fault: string | null
  /** Nothing more is to come. */
  isSettled: boolean
}

const NO_PICTURES =
  'The recording behind this report can’t be had just now, so the pictures that need it are missing. Text, tables and figures are those that were saved.'

/** The pictures of a report, computed in the reader’s browser from the stored columns; null: there are none to ask for. */
export function useReportViews(columnsUrl: string | null, recipe: Recipe): ReportViews {
  const bench = useBenchAnalysis(recipe)
  const { loadPacked } = bench
  const [isMissing, setMissing] = useState(columnsUrl === null)
  const isStarted = useRef(false)
  useEffect(() => {
    if (isStarted.current || columnsUrl === null) return
    isStarted.current = true
    const load = async () => {
      try {
        const loaded = await loadPacked(await fetchPackedColumns(columnsUrl))
        if (!loaded.ok) setMissing(true)
      } catch {
        setMissing(true)
      }
    }
    void load()
  }, [loadPacked, columnsUrl])

  const fault = isMissing || bench.fault !== null ? NO_PICTURES : null
  return {
    outcome: bench.outcome,
    progress: bench.progress,
    fault,
    isSettled: fault !== null || (bench.outcome !== null && !bench.isComputing),
  }
}

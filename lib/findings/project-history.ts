/** One analysed run in the history of a mount. */
export interface HistoryPoint {
  analysisId: string
  runId: string
  runName: string
  analysisName: string
  /** When the run was recorded; where nobody noted that, when it was brought in. ISO 8601. */
  at: string
  isRecordingTimeKnown: boolean
  wormAmplitudeArcsec: number
  peakToPeakArcsec: number
  wormPeriodSeconds: number | null
}

interface AnalysisEntry {
  id: string
  name: string
  runId: string
  runName: string
  createdAt: string
  wormPeriodSeconds: number | null
  wormAmplitudeArcsec: number | null
  peakToPeakArcsec: number | null
}

interface RunEntry {
  id: string
  createdAt: string
  facts: { startedAt: string | null }
}

/** The newest analysis of each run that has a figure for the worm, in the order in which the runs were recorded. */
export function projectHistory(analyses: readonly AnalysisEntry[], runs: readonly RunEntry[]): HistoryPoint[] {
  const newestOfRun = new Map<string, AnalysisEntry>()
  for (const analysis of analyses) {
    const known = newestOfRun.get(analysis.runId)
    if (!known || analysis.createdAt > known.createdAt) newestOfRun.set(analysis.runId, analysis)
  }
  const runById = new Map(runs.map((run) => [run.id, run]))
  const points = [...newestOfRun.values()].flatMap((analysis): HistoryPoint[] => {
    if (analysis.wormAmplitudeArcsec === null || analysis.peakToPeakArcsec === null) return []
    const run = runById.get(analysis.runId)
    const startedAt = run?.facts.startedAt ?? null
    return [
      {
        analysisId: analysis.id,
        runId: analysis.runId,
        runName: analysis.runName,
        analysisName: analysis.name,
        at: startedAt ?? run?.createdAt ?? analysis.createdAt,
        isRecordingTimeKnown: startedAt !== null,
        wormAmplitudeArcsec: analysis.wormAmplitudeArcsec,
        peakToPeakArcsec: analysis.peakToPeakArcsec,
        wormPeriodSeconds: analysis.wormPeriodSeconds,
      },
    ]
  })
  return points.sort((a, b) => Date.parse(a.at) - Date.parse(b.at))
}

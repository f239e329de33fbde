import type { z } from 'zod'
import type { Estimate } from '@/lib/analysis/types'
import type { historyPointSchema } from '@/lib/schemas/lists'

/** One analysed run in the history of a mount: the newest of its analyses. */
export type HistoryPoint = z.infer<typeof historyPointSchema>

export function amplitudeOf(point: Pick<HistoryPoint, 'wormAmplitudeArcsec' | 'wormAmplitudeStderrArcsec'>): Estimate {
  return { value: point.wormAmplitudeArcsec, stderr: point.wormAmplitudeStderrArcsec }
}

export function peakToPeakOf(point: Pick<HistoryPoint, 'peakToPeakArcsec' | 'peakToPeakStderrArcsec'>): Estimate {
  return { value: point.peakToPeakArcsec, stderr: point.peakToPeakStderrArcsec }
}

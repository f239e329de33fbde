import type { AnalysisResult } from '@/lib/analysis/types'
import { finding, worm, type Finding } from './finding'
import { arcsec } from './words'

/** Why the raw span says little about the worm: what it would be without it, and what the drift alone spans. */
export function spansFinding({ spans, worm: wormResult, drift }: AnalysisResult): Finding {
  const raw = arcsec(spans.rawArcsec)
  const ofDrift = arcsec(spans.driftArcsec)
  if (!wormResult) {
    return drift.degree === 0
      ? finding`The raw track spans ${worm(raw)}.`
      : finding`The raw track spans ${worm(raw)}; the drift alone spans ${ofDrift}.`
  }
  const without = arcsec(spans.rawWithoutWormArcsec)
  const isDriftMost = spans.driftArcsec > 0.5 * spans.rawWithoutWormArcsec
  return isDriftMost
    ? finding`Without the worm the raw track would still span ${worm(without)}, because the drift alone spans ${ofDrift}.`
    : finding`Without the worm the raw track would span ${worm(without)} instead of ${raw}; the drift alone spans ${ofDrift}.`
}

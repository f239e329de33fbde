import type { AnalysisResult } from '@/lib/analysis/types'
import { PLAIN_DISPLAY, sizedDisplacement, type Display } from '@/lib/display-units'
import { finding, worm, type Finding } from './finding'

/** Why the raw span says little about the worm: what it would be without it, and what the drift alone spans. */
export function spansFinding(
  { spans, worm: wormResult, drift }: AnalysisResult,
  display: Display = PLAIN_DISPLAY,
): Finding {
  const raw = sizedDisplacement(spans.rawArcsec, display)
  const ofDrift = sizedDisplacement(spans.driftArcsec, display)
  if (!wormResult) {
    return drift.degree === 0
      ? finding`The raw track spans ${worm(raw)}.`
      : finding`The raw track spans ${worm(raw)}; the drift alone spans ${ofDrift}.`
  }
  const without = sizedDisplacement(spans.rawWithoutWormArcsec, display)
  const isDriftMost = spans.driftArcsec > 0.5 * spans.rawWithoutWormArcsec
  return isDriftMost
    ? finding`Without the worm the raw track would still span ${worm(without)}, because the drift alone spans ${ofDrift}.`
    : finding`Without the worm the raw track would span ${worm(without)} instead of ${raw}; the drift alone spans ${ofDrift}.`
}

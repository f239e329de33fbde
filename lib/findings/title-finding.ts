import type { AnalysisResult, Recipe } from '@/lib/analysis/types'
import { advice } from './advice'
import { finding, type Finding } from './finding'
import { reasonTitle } from './reason-sentence'
import { arcsec } from './words'

/** The one sentence over the whole sheet; titles have no full stop. */
export function titleFinding(result: AnalysisResult, recipe: Recipe): Finding {
  const { worm, turn } = result
  if (!worm) {
    const interval = result.wormPeriodIntervalSeconds
    return interval
      ? finding`The strongest swing takes between ${interval[0].toFixed(0)} and ${interval[1].toFixed(0)} s; the run is too short to say more`
      : finding`${reasonTitle(result.wormReason ?? 'no-period')}`
  }
  const swing = `The worm swings the axis ${arcsec(worm.peakToPeakArcsec.value)} each turn`
  if (advice(result, recipe).verdict === 'leave') return finding`${swing}, little enough to leave alone`
  if (!turn || turn.heldOutReduction === null) return finding`${swing}; more turns would show how well that repeats`
  return turn.heldOutReduction >= 0.5
    ? finding`${swing}, and repeats well enough to correct`
    : finding`${swing}, but repeats too poorly to correct`
}

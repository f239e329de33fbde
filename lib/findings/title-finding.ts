import type { AnalysisResult, Recipe } from '@/lib/analysis/types'
import { PLAIN_DISPLAY, sizedDisplacement, type Display } from '@/lib/display-units'
import { formatPercent } from '@/lib/units'
import { advice } from './advice'
import { finding, type Finding } from './finding'
import { reasonTitle } from './reason-sentence'

/** The one sentence over the whole sheet; titles have no full stop. */
export function titleFinding(result: AnalysisResult, recipe: Recipe, display: Display = PLAIN_DISPLAY): Finding {
  const { worm, turn } = result
  if (!worm) {
    const interval = result.wormPeriodIntervalSeconds
    return interval
      ? finding`The strongest swing takes between ${interval[0].toFixed(0)} and ${interval[1].toFixed(0)} s; the run is too short to say more`
      : finding`${reasonTitle(result.wormReason ?? 'no-period')}`
  }
  const swing = `The worm swings the axis ${sizedDisplacement(worm.peakToPeakArcsec.value, display)} each turn`
  if (advice(result, recipe).verdict === 'leave') return finding`${swing}, little enough to leave alone`
  if (!turn || turn.heldOutReduction === null) return finding`${swing}; more turns would show how well that repeats`
  if (turn.heldOutReduction >= 0.5) return finding`${swing}, and repeats well enough to correct`
  // Noise keeps a table's share down as much as a swing that does not repeat: the share is all that is known.
  return turn.heldOutReduction > 0
    ? finding`${swing}, but a table would take only ${formatPercent(turn.heldOutReduction)} off the RMS`
    : finding`${swing}, but a table would take nothing off the RMS`
}

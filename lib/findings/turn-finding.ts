import type { AnalysisResult } from '@/lib/analysis/types'
import { formatNumber, formatPercent } from '@/lib/units'
import { finding, worm, type Finding } from './finding'
import { reasonSentence } from './reason-sentence'

/** Which share of the swing repeats from turn to turn, as variance and as what a perfect table would leave. */
export function turnFinding(result: AnalysisResult): Finding {
  const { turn } = result
  if (!turn) return finding`${reasonSentence({ reason: result.wormReason ?? 'short-run' })}`
  if (turn.completeTurns < 2) {
    return finding`With ${worm(formatNumber(result.run.turns ?? 0, 1))} turns there is nothing to compare a turn with; two or more would show what repeats.`
  }
  if (turn.repeatability <= 0) return finding`Nothing repeats from turn to turn: no table could help.`
  return finding`${worm(formatPercent(turn.repeatability, 1))} of the variance repeats each turn; a perfect table leaves ${formatPercent(turn.rmsShareLeft)} of the RMS.`
}

import type { AnalysisResult } from '@/lib/analysis/types'
import { formatPercent } from '@/lib/units'
import { finding, worm, type Finding } from './finding'
import { reasonSentence } from './reason-sentence'

/** Which share of the swing repeats from turn to turn, as variance and as what a perfect table would leave. */
export function turnFinding(result: AnalysisResult): Finding {
  const { turn } = result
  if (!turn) return finding`${reasonSentence({ reason: result.wormReason ?? 'short-run' })}`
  if (turn.repeatability <= 0) return finding`Nothing repeats from turn to turn: no table could help.`
  return finding`${worm(formatPercent(turn.repeatability, 1))} of the variance repeats each turn; a perfect table leaves ${formatPercent(turn.rmsShareLeft)} of the RMS.`
}

import type { AnalysisResult, LeftOutCount } from '@/lib/analysis/types'
import { formatDuration, formatNumber } from '@/lib/units'
import { finding, worm, type Finding } from './finding'
import { counted, listed } from './words'

/** How long the run is in turns of the worm, and what of it is not used. */
export function trackFinding(result: AnalysisResult): Finding {
  const { turns, durationSeconds } = result.run
  const missing = missingPart(result)
  return turns === null
    ? finding`The run lasts ${worm(formatDuration(durationSeconds))}${missing}.`
    : finding`The run covers ${worm(formatNumber(turns, 1) + (turns.toFixed(1) === '1.0' ? ' turn' : ' turns'))} of the worm${missing}.`
}

function missingPart(result: AnalysisResult): string {
  const gaps = result.run.gaps.map(({ startSeconds, endSeconds }) => endSeconds - startSeconds)
  const items: { text: string; isOne: boolean }[] = []
  if (gaps.length === 1) items.push({ text: `a gap of ${formatDuration(gaps[0])}`, isOne: true })
  if (gaps.length > 1) {
    const total = gaps.reduce((sum, gap) => sum + gap, 0)
    items.push({ text: `${counted(gaps.length, 'gap')} of ${formatDuration(total)} together`, isOne: false })
  }
  for (const { reason, count } of result.leftOut) {
    if (count > 0) items.push({ text: leftOutText(reason, count), isOne: count === 1 })
  }
  if (items.length === 0) return '; nothing is left out'
  const verb = items.length === 1 && items[0].isOne ? 'is' : 'are'
  return `; ${listed(items.map(({ text }) => text))} ${verb} left out`
}

function leftOutText(reason: LeftOutCount['reason'], count: number): string {
  const words: Record<LeftOutCount['reason'], string> = {
    missing: counted(count, 'missing value'),
    'not-finite': counted(count, 'value that is no number', 'values that are no numbers'),
    'repeated-time': counted(count, 'repeated time'),
    excluded: counted(count, 'sample by hand', 'samples by hand'),
    stray: counted(count, 'stray point'),
  }
  return words[reason]
}

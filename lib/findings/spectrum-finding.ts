import type { AnalysisResult, LineResult, Recipe } from '@/lib/analysis/types'
import { formatNumber, formatPeriod, formatProbability } from '@/lib/units'
import { finding, joinFindings, line, worm, type Finding } from './finding'
import { capitalised, countWord, counted, withinSentence } from './words'

const MOST_NAMED = 3

/** Which harmonics of the worm stand clear of noise (three standard errors), and which lines stand beside them. */
export function spectrumFinding(result: AnalysisResult, recipe: Recipe): Finding {
  const clear = result.worm?.harmonics.filter(({ isPhaseMeaningful }) => isPhaseMeaningful).length ?? 0
  const { lines } = result
  if (lines.length === 0) return finding`${wormPart(result, clear)}, ${noLines(recipe, result.worm !== null)}.`
  const named = lines.slice(0, MOST_NAMED).map(linePart)
  const more = lines.length - named.length
  const tail = more > 0 ? finding`, and ${countWord(more)} more` : []
  return finding`${wormPart(result, clear)}, and ${counted(lines.length, result.worm ? 'line more' : 'line', result.worm ? 'lines more' : 'lines')}: ${joinFindings(named, ', ')}${tail}.`
}

function wormPart(result: AnalysisResult, clear: number): string {
  if (!result.worm) return 'Nothing can be told to be the worm’s'
  if (clear === 0) return 'No harmonic of the worm stands clear of noise'
  return `${capitalised(counted(clear, 'worm harmonic'))} ${clear === 1 ? 'stands' : 'stand'} clear of noise`
}

function noLines(recipe: Recipe, hasWorm: boolean): string {
  if (!recipe.isLineSearchOn) return 'and other lines were not looked for'
  const chance = formatProbability(recipe.chanceLevel)
  return `and no ${hasWorm ? 'other ' : ''}line passes what chance reaches ${chance.includes(' in ') ? `${chance} times` : `with a probability of ${chance}`}`
}

function linePart({ order, periodSeconds, source }: LineResult): Finding {
  const place = order
    ? finding`order ${worm(formatNumber(order.value, 3))}`
    : finding`${line(formatPeriod(periodSeconds.value))}`
  return source === null ? finding`${place} has no known source` : finding`${place} fits the ${withinSentence(source)}`
}

import type { AnalysisResult, HarmonicResult, ModelChoice, Recipe } from '@/lib/analysis/types'
import { PLAIN_DISPLAY, formatSwing, type Display } from '@/lib/display-units'
import { formatPercent, formatProbability } from '@/lib/units'
import { finding, worm, type Finding } from './finding'
import { reasonSentence } from './reason-sentence'
import { capitalised, fromEndToEnd, ordinalWord } from './words'

/** Which harmonic carries the swing. */
export function harmonicsFinding(result: AnalysisResult, display: Display = PLAIN_DISPLAY): Finding {
  if (!result.worm) return finding`${reasonSentence({ reason: result.wormReason ?? 'no-period' })}`
  const { harmonics, fundamentalPowerShare } = result.worm
  const fundamental = harmonics.find(({ order }) => order === 1)
  const rest = harmonics.filter(({ order }) => order !== 1).sort(byPower)
  if (!fundamental) return finding`The worm’s fundamental was not fitted.`
  const size = formatSwing(fundamental.amplitudeArcsec, display)
  const measured = `${size}${fromEndToEnd(display)}`
  if (rest.length === 0) {
    const ends = fromEndToEnd(display) || ' to either side'
    return finding`The worm’s swing is one plain sine of ${worm(size)}${ends}.`
  }
  const share = formatPercent(fundamentalPowerShare)
  if (power(rest[0]) > power(fundamental)) {
    return finding`The ${ordinalWord(rest[0].order)} harmonic swings most; the worm’s fundamental, ${measured}, carries only ${worm(share)} of the swing’s power.`
  }
  const isMost = power(rest[0]) > 0.5 * rest.reduce((sum, harmonic) => sum + power(harmonic), 0)
  const tail = isMost
    ? `the ${ordinalWord(rest[0].order)} harmonic most of the rest`
    : `the rest is spread over the others`
  return finding`The worm’s fundamental, ${measured}, carries ${worm(share)} of the swing’s power; ${tail}.`
}

/** How the number of harmonics came about. */
export function harmonicCountSentence(choice: ModelChoice | null, recipe: Recipe): string {
  if (recipe.harmonicCount !== 'auto') return 'The number of harmonics was set by hand.'
  if (!choice) return 'There was no choice to make.'
  const { nextHarmonicProbability: next } = choice
  const base =
    'As many as the record supports: the Bayesian information criterion is least, counting linked samples once.'
  return next === null
    ? base
    : `${base} Noise alone would make one more look this useful with a chance of ${formatProbability(next)}.`
}

/** Words for the estimate of error that was largest, hence reported. */
export function errorModelWords(model: AnalysisResult['errorModel']): string {
  const words: Record<AnalysisResult['errorModel'], string> = {
    white: 'plain noise',
    ar1: 'linked noise',
    'power-law': 'red noise',
    'local-spectrum': 'noise nearby',
  }
  return words[model]
}

export function errorModelSentence(model: AnalysisResult['errorModel']): string {
  const words: Record<AnalysisResult['errorModel'], string> = {
    white: 'neighbouring samples err independently',
    ar1: 'neighbouring samples err alike, and fade from one to the next',
    'power-law': 'slow errors are larger than fast ones, over the whole run',
    'local-spectrum': 'what is left near each line is taken for its noise',
  }
  return `${capitalised(words[model])}: of the estimates made, this one gave the largest standard errors, so these are shown.`
}

function power(harmonic: HarmonicResult): number {
  return harmonic.amplitudeArcsec.value ** 2
}

function byPower(a: HarmonicResult, b: HarmonicResult): number {
  return power(b) - power(a)
}

import type { AnalysisResult, Recipe } from '@/lib/analysis/types'
import { PLAIN_DISPLAY, sizedSwing, type Display } from '@/lib/display-units'
import { formatDuration, formatPercent } from '@/lib/units'
import { finding, limit, worm, type Finding } from './finding'
import { arcsec, fromEndToEnd } from './words'

export type Verdict = 'leave' | 'guide' | 'correct' | 'inspect' | 'unknown'

export interface Advice {
  verdict: Verdict
  sentence: Finding
  /** The rule that led here, so that anyone can judge it. */
  rule: string
}

/** Share of pictures within the tolerance from which the swing may be left alone; our choice, no source. */
const ENOUGH_FRAMES = 0.95
/** RMS that a table must take off turns it was not made from to be worth making; our choice, no source. */
const WORTHWHILE_REDUCTION = 0.5
/** A guider needs about this long to expose and act; common practice, no source. */
const SHORTEST_GUIDING_SECONDS = 1

/** Leave it, guide it out, correct it, or look at the mount: the first of the stated rules that applies. */
export function advice(result: AnalysisResult, recipe: Recipe, display: Display = PLAIN_DISPLAY): Advice {
  const { worm: wormResult, turn, rate, lines } = result
  if (!wormResult || !turn) {
    return {
      verdict: 'unknown',
      sentence: finding`Nothing can be advised yet: record at least three turns of the worm.`,
      rule: 'There is no worm figure.',
    }
  }
  const kept = formatPercent(rate.framesKeptShare)
  const exposure = formatDuration(recipe.pictureExposureSeconds)
  const tolerance = arcsec(recipe.toleranceSkyArcsec)
  if (rate.framesKeptShare >= ENOUGH_FRAMES) {
    return {
      verdict: 'leave',
      sentence: finding`${worm('Leave it')}: ${kept} of unguided pictures of ${exposure} stay within ${tolerance}.`,
      rule: `At least ${formatPercent(ENOUGH_FRAMES)} of unguided pictures stay within the tolerance.`,
    }
  }
  // Under two turns no phase is met twice, so nothing is known of what repeats.
  const reduction = turn.heldOutReduction ?? (turn.completeTurns >= 2 ? 1 - turn.rmsShareLeft : null)
  const fundamental = wormResult.harmonics[0]?.amplitudeArcsec.value ?? 0
  const strongest = lines.reduce((most, each) => Math.max(most, each.amplitudeArcsec.value), 0)
  const isLost = reduction !== null && reduction < WORTHWHILE_REDUCTION
  if (isLost || strongest > fundamental) {
    const cause =
      strongest > fundamental
        ? `a line beside the worm swings ${sizedSwing(strongest, display)}${fromEndToEnd(display)}, more than the worm itself, and no table can take it out`
        : `only ${formatPercent(Math.max(0, reduction ?? 0))} of the RMS is the same from turn to turn, unless the air was poor`
    return {
      verdict: 'inspect',
      sentence: finding`${limit('Look at the mount')}: ${cause}.`,
      rule: `A table would take off less than ${formatPercent(WORTHWHILE_REDUCTION)} of the RMS, or a line beside the worm is larger than its fundamental.`,
    }
  }
  const interval = rate.longestCorrectionIntervalSeconds
  const every =
    interval === null ? '' : ` a guide correction every ${formatDuration(interval)} holds it within ${tolerance}`
  if (turn.heldOutReduction !== null) {
    const alone =
      interval === null
        ? ''
        : `; guiding alone must act at least every ${formatDuration(interval)} to stay within ${tolerance}`
    return {
      verdict: 'correct',
      sentence: finding`${worm('Correct it')}: a table takes ${formatPercent(turn.heldOutReduction)} off the RMS of turns it was not made from${alone}.`,
      rule: `A table takes at least ${formatPercent(WORTHWHILE_REDUCTION)} off the RMS of turns that it was not made from.`,
    }
  }
  if (interval === null || interval >= SHORTEST_GUIDING_SECONDS) {
    return {
      verdict: 'guide',
      sentence: finding`${worm('Guide it out')} for now:${every || ' it stays within the tolerance'}; three turns or more would show whether a table is worth making.`,
      rule: `Too few turns to rehearse a table, and a guider has at least ${formatDuration(SHORTEST_GUIDING_SECONDS)} between corrections.`,
    }
  }
  return {
    verdict: 'inspect',
    sentence: finding`${limit('Look at the mount')}: it moves ${tolerance} within ${formatDuration(interval)}, faster than a guider acts, and there are too few turns to rehearse a table.`,
    rule: `Too few turns to rehearse a table, and less than ${formatDuration(SHORTEST_GUIDING_SECONDS)} between guide corrections.`,
  }
}

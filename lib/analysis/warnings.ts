import type { AnalysisWarning } from './types'

/**
 * Words for what a person should know beside the figures; lib/findings makes the sentences. Details are listed with
 * each word, numbers in the unit that their names say.
 */
export const WARNING_CODES = {
  /** Beyond 80° noise is magnified more than 5.76 times: declinationDegrees. */
  'high-declination': 'high-declination',
  /** The sense of the displacement is assumed, not proven. */
  'sense-assumed': 'sense-assumed',
  /** Stamps mark start or end of an exposure whose length is unknown, so phases are off by half of it. */
  'time-stamp-uncorrected': 'time-stamp-uncorrected',
  /** More than 5 % of the samples are stray: percent. */
  'many-strays': 'many-strays',
  /** The run is too short for what was asked: turns, neededTurns. */
  'short-run': 'short-run',
  /** The drive train gives no period, so the record's own was used or none: no details. */
  'gear-unknown': 'gear-unknown',
  /** Fitted and predicted worm period differ by more than 3 standard errors: fittedSeconds, gearSeconds, standardErrors. */
  'period-differs-from-gear': 'period-differs-from-gear',
  /** An unexplained line is far stronger than the fundamental at the predicted period: lineSeconds, gearSeconds. */
  'stronger-line-than-worm': 'stronger-line-than-worm',
  /** The strongest swing is a harmonic; the worm turns this many times slower: factor, periodSeconds. */
  'sub-harmonic-taken': 'sub-harmonic-taken',
  /** Two lines lie closer than 1/T: periodSeconds. */
  'line-unresolved': 'line-unresolved',
  /** What is left swings closer to a harmonic or line than the record can tell apart: periodSeconds. */
  'swing-beside-worm': 'swing-beside-worm',
  /** The search for lines stopped at its limit: count. */
  'line-limit': 'line-limit',
  /** Fewer harmonics than asked for could be fitted: wanted, kept. */
  'harmonics-dropped': 'harmonics-dropped',
  /** The fit had not settled after its last step. */
  'not-converged': 'not-converged',
  /** Under four turns in correlated noise errors may be a fifth too small, under two by far more: turns. */
  'errors-may-be-small': 'errors-may-be-small',
  /** The drive moves within a few frames, σ₁/σ₂ of the residual: ratio. */
  'fast-motion': 'fast-motion',
  /** The exposure averages over half of a swing or more; its amplitude is not corrected: periodSeconds, factor. */
  'exposure-too-long': 'exposure-too-long',
  /** Under three turns only a straight drift can be told from the worm: turns. */
  'drift-taken-straight': 'drift-taken-straight',
  /** Without teeth, too few turns to see whether the worm turns half as fast: turns, neededTurns. */
  'period-may-be-harmonic': 'period-may-be-harmonic',
  /** The table counts from a worm angle that was recorded in the other direction: recorded ('rising' or 'falling'). */
  'angle-direction-differs': 'angle-direction-differs',
  /** A predicted order is too fast for the cadence and shows at another period: name, order, aliasSeconds. */
  'predicted-order-aliased': 'predicted-order-aliased',
} as const

export type WarningCode = keyof typeof WARNING_CODES

export function warning(code: WarningCode, details: Record<string, number | string> = {}): AnalysisWarning {
  return { code, details }
}

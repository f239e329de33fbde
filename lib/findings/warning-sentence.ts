import type { AnalysisWarning } from '@/lib/analysis/types'
import type { WarningCode } from '@/lib/analysis/warnings'
import { ABSENT, formatNumber, formatPeriod } from '@/lib/units'
import { counted } from './words'

export type Stage = 'track' | 'spectrum' | 'harmonics' | 'turn' | 'spans' | 'correction'

export interface WarningText {
  /** The stage of the worksheet that the warning belongs to. */
  stage: Stage
  text: string
}

type Details = AnalysisWarning['details']

interface Words {
  stage: Stage
  say: (details: Details) => string
}

const WORDS: Record<WarningCode, Words> = {
  'high-declination': {
    stage: 'track',
    say: (d) =>
      `At a declination of ${figure(d.declinationDegrees, 0)}° the axis moves far more than the star: noise is magnified, and an error of the declination counts. Record nearer to the equator.`,
  },
  'sense-assumed': {
    stage: 'track',
    say: () =>
      'The sense is only assumed: ahead and behind may be the other way round. One deliberate guide pulse to the west settles it: the star must jump east.',
  },
  'time-stamp-uncorrected': {
    stage: 'track',
    say: () =>
      'The time stamps mark one end of exposures whose length is not given, so every phase is off by half an exposure. Give the exposure of the frames.',
  },
  'many-strays': {
    stage: 'track',
    say: (d) =>
      `${figure(d.percent, 1)} % of the samples are stray points. See whether the star was lost, or the filter takes real motion.`,
  },
  'short-run': {
    stage: 'track',
    say: (d) =>
      `The run covers ${figure(d.turns, 1)} turns of the worm; what is asked here needs at least ${figure(d.neededTurns, 0)}.`,
  },
  'gear-unknown': {
    stage: 'harmonics',
    say: () => 'The drive train gives no period for the worm. Give the number of teeth of the wheel to have one.',
  },
  'period-differs-from-gear': {
    stage: 'harmonics',
    say: (d) =>
      `The fitted period of ${period(d.fittedSeconds)} is ${figure(d.standardErrors, 1)} standard errors away from the ${period(d.gearSeconds)} of the drive train. Look at the count of teeth, the tracking rate and the clock of the recording.`,
  },
  'stronger-line-than-worm': {
    stage: 'harmonics',
    say: (d) =>
      `A swing of ${period(d.lineSeconds)} that the drive train does not explain is far stronger than the one at the worm’s ${period(d.gearSeconds)}. See whether the count of teeth is right.`,
  },
  'sub-harmonic-taken': {
    stage: 'harmonics',
    say: (d) =>
      `The strongest swing is taken for a harmonic: the worm turns ${figure(d.factor, 0)} times slower, once in ${period(d.periodSeconds)}.`,
  },
  'line-unresolved': {
    stage: 'spectrum',
    say: (d) =>
      `The line near ${period(d.periodSeconds)} lies closer to its neighbour than this run can tell apart; a longer run would.`,
  },
  'swing-beside-worm': {
    stage: 'spectrum',
    say: (d) =>
      `Something near ${period(d.periodSeconds)} swings beside a harmonic or a line, closer to it than this run can tell apart: the worm’s period and harmonics may be off by more than their standard errors.`,
  },
  'line-limit': {
    stage: 'spectrum',
    say: (d) => `The search ended at its limit of ${counted(Number(d.count), 'line')}; there may be more.`,
  },
  'harmonics-dropped': {
    stage: 'harmonics',
    say: (d) => `${figure(d.wanted, 0)} harmonics were asked for; the samples are enough for ${figure(d.kept, 0)}.`,
  },
  'not-converged': {
    stage: 'harmonics',
    say: () => 'The fit had not settled after its last step: take these figures with care.',
  },
  'errors-may-be-small': {
    stage: 'harmonics',
    say: (d) =>
      Number(d.turns) < 2
        ? `With ${figure(d.turns, 1)} turns slow noise passes for harmonics of the worm: the standard errors may be far too small.`
        : `With ${figure(d.turns, 1)} turns and noise that lingers, the standard errors may be a fifth too small.`,
  },
  'fast-motion': {
    stage: 'spans',
    say: (d) =>
      `From one frame to the next the axis moves ${figure(d.ratio, 1)} times as much as seeing explains: something in the drive moves fast.`,
  },
  'exposure-too-long': {
    stage: 'spectrum',
    say: (d) =>
      `The exposure smooths over the swing of ${period(d.periodSeconds)}: only ${figure(100 * Number(d.factor), 0)} % of it is seen, and its size is not corrected.`,
  },
  'drift-taken-straight': {
    stage: 'harmonics',
    say: (d) =>
      `In ${figure(d.turns, 1)} turns a bent drift cannot be told from the worm, so the drift is taken as straight. If it bends, swing and phase are off by more than their standard errors.`,
  },
  'period-may-be-harmonic': {
    stage: 'harmonics',
    say: (d) =>
      `Without the number of teeth, a record of ${figure(d.turns, 1)} such swings does not show whether the worm itself turns half as fast; ${figure(d.neededTurns, 0)} would. Give the teeth of the wheel.`,
  },
  'angle-direction-differs': {
    stage: 'correction',
    say: (d) =>
      `The recorded worm angle is ${d.recorded ?? ABSENT}, the table’s is not: a mount that counts as the file does would play it backwards. Turn the direction of the table round.`,
  },
  'predicted-order-aliased': {
    stage: 'spectrum',
    say: (d) =>
      `${d.name} (order ${figure(d.order, 1)}) is too fast for this cadence; it would show at ${period(d.aliasSeconds)} instead.`,
  },
}

/** A warning of the core as a sentence or two, and the stage it belongs to. */
export function warningSentence({ code, details }: AnalysisWarning): WarningText {
  if (!isKnown(code)) return { stage: 'track', text: `The analysis warns of “${code.replaceAll('-', ' ')}”.` }
  const { stage, say } = WORDS[code]
  return { stage, text: say(details) }
}

function isKnown(code: string): code is WarningCode {
  return Object.hasOwn(WORDS, code)
}

function figure(value: number | string | undefined, decimals: number): string {
  return typeof value === 'number' ? formatNumber(value, decimals) : (value ?? ABSENT)
}

function period(value: number | string | undefined): string {
  return formatPeriod(typeof value === 'number' ? value : null)
}

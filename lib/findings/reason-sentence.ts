import type { Failure, Reason } from '@/lib/analysis/types'
import { countWord } from './words'

interface ReasonWords {
  /** What is the matter, as a sentence. */
  what: string
  /** What to do about it, as a sentence. */
  next: string
}

const WORDS: Record<Reason, ReasonWords> = {
  'few-points': {
    what: 'There are too few usable samples to say anything.',
    next: 'Record for longer, or leave less out.',
  },
  'short-run': {
    what: 'The run is too short: a worm figure takes one whole turn where the teeth are known, three where they are not.',
    next: 'Record at least three turns, with guiding off.',
  },
  'not-finite': {
    what: 'More than a fifth of the values are missing or are no numbers.',
    next: 'Look at the columns that were chosen, and at the file itself.',
  },
  'not-increasing': {
    what: 'The times run backwards somewhere in the file.',
    next: 'Choose the right time column, or sort the file by time.',
  },
  singular: {
    what: 'The values do not vary enough to fit anything to them.',
    next: 'See whether the column that was chosen is the right one.',
  },
  'out-of-range': {
    what: 'A setting lies outside what can be computed.',
    next: 'Look at image scale, declination and the counts of teeth.',
  },
  'no-period': {
    what: 'No worm period is known, and the record shows none of its own.',
    next: 'Give the number of teeth of the worm wheel, or type the period.',
  },
  'no-index': {
    what: 'There is no index mark to count the worm angle from.',
    next: 'Give the time of the mark, or choose the start of the run as zero.',
  },
}

/** A reason word as two sentences: what is the matter, with the counts where they are known, and what to do next. */
export function reasonSentence({ reason, needed, got }: Omit<Failure, 'ok'>): string {
  const { what, next } = WORDS[reason]
  const counts =
    needed === undefined
      ? ''
      : ` ${needed} are needed${got === undefined ? '' : `, ${got === 0 ? countWord(0) : got} ${got === 1 ? 'is' : 'are'} there`}.`
  return `${what}${reason === 'few-points' ? counts : ''} ${next}`
}

/** Only what is the matter, for titles. */
export function reasonTitle(reason: Reason): string {
  return WORDS[reason].what.replace(/\.$/, '')
}

import { cellKind, numberOfText } from './cell-kinds'
import type { ColumnHead } from './column-names'
import type { ColumnChoice, PreviewColumn, TextLayout } from './types'
import { unitOfText } from './unit-words'

/** What the numbers of one column do over the rows that were looked at. */
export interface ColumnFacts extends ColumnHead {
  index: number
  isNumeric: boolean
  /** Time stamps that mostly differ from row to row; a date beside a time of day does not. */
  isTimeStamps: boolean
  smallest: number | null
  largest: number | null
  first: number | null
  /** Never falls, and rises nearly always. */
  isRising: boolean
  /** Rises by exactly one from row to row, like a frame counter. */
  isCounting: boolean
  /** 1 where all steps are equal, as a clock's are; 0 where they spread as widely as they are long. */
  evenness: number
  isConstant: boolean
  medianStep: number
}

type Role = NonNullable<PreviewColumn['guess']>

/** Words of ordinary language that name a quantity; matched as whole words. */
const TIME_WORDS = [
  'time',
  'timestamp',
  'stamp',
  'date',
  'datetime',
  'elapsed',
  'clock',
  'utc',
  'jd',
  'mjd',
  'julian',
  't',
  'zeit',
  'temps',
  'tiempo',
]
const DISPLACEMENT_WORDS = [
  'displacement',
  'offset',
  'error',
  'deviation',
  'position',
  'shift',
  'track',
  'drift',
  'x',
  'dx',
]
const RIGHT_ASCENSION_WORDS = ['ra', 'dra', 'rightascension', 'ascension']
const DECLINATION_WORDS = ['dec', 'ddec', 'declination', 'y', 'dy']
const WORM_WORDS = ['worm', 'wormangle', 'wormphase']
const ANGLE_WORDS = ['angle', 'phase', 'encoder', 'shaft', 'rotation']
const COUNTER_WORDS = ['frame', 'number', 'no', 'nr', 'index', 'row', 'count', 'id', 'sample', 'image', 'n', 'line']
/** Quantities that are recorded beside the motion. */
const OTHER_WORDS = [
  'snr',
  'flux',
  'mass',
  'brightness',
  'magnitude',
  'mag',
  'temperature',
  'temp',
  'fwhm',
  'exposure',
  'quality',
  'peak',
  'pulse',
  'duration',
  'width',
  'intensity',
  'background',
  'voltage',
  'humidity',
  'rms',
]

/** Fewest points for a guess; one clear word or unit, or a behaviour nothing else has, is enough. */
const LEAST_SCORE = 3

export function columnFacts(
  head: ColumnHead,
  cells: { index: number; texts: string[]; decimalMark: TextLayout['decimalMark'] },
): ColumnFacts {
  const filled = cells.texts
    .map((text) => ({ text, kind: cellKind(text, cells.decimalMark) }))
    .filter(({ kind }) => kind !== 'missing')
  const numbers = filled
    .filter(({ kind }) => kind === 'number')
    .map(({ text }) => numberOfText(text, cells.decimalMark))
  const stamps = filled.filter(({ kind }) => kind === 'time-stamp').map(({ text }) => text)
  const steps = numbers.slice(1).map((value, i) => value - numbers[i])
  const sortedSteps = [...steps].sort((a, b) => a - b)
  const rises = steps.filter((step) => step > 0).length
  const medianStep = sortedSteps[Math.floor(sortedSteps.length / 2)] ?? 0
  const decile = (share: number) => sortedSteps[Math.floor(share * (sortedSteps.length - 1))]
  const spread = steps.length > 0 && medianStep !== 0 ? (decile(0.9) - decile(0.1)) / Math.abs(medianStep) : 1
  const isNumeric = numbers.length > 0 && numbers.length >= 0.8 * filled.length
  return {
    ...head,
    index: cells.index,
    isNumeric,
    isTimeStamps: stamps.length > 0.8 * filled.length && new Set(stamps).size > 0.2 * stamps.length,
    smallest: isNumeric ? numbers.reduce((a, b) => Math.min(a, b)) : null,
    largest: isNumeric ? numbers.reduce((a, b) => Math.max(a, b)) : null,
    first: isNumeric ? numbers[0] : null,
    isRising: steps.length >= 2 && rises >= 0.95 * steps.length && sortedSteps[0] >= 0,
    isCounting: steps.length >= 2 && steps.every((step) => step === 1),
    evenness: 1 - Math.min(1, spread),
    isConstant: steps.length > 0 && steps.every((step) => step === 0),
    medianStep,
  }
}

/** Best column for each role, each column used once; roles without enough evidence are left out. */
export function guessRoles(columns: ColumnFacts[]): Map<number, Role> {
  const roles = new Map<number, Role>()
  const take = (role: Role, score: (column: ColumnFacts) => number) => {
    const open = columns
      .filter((column) => !roles.has(column.index))
      .map((column) => ({ column, score: score(column) }))
    const best = open.reduce((a, b) => (b.score > a.score ? b : a), { column: columns[0], score: LEAST_SCORE - 1e-9 })
    if (best.score >= LEAST_SCORE) roles.set(best.column.index, role)
  }
  take('time', timeScore)
  take('worm-angle', wormScore)
  take('declination', declinationScore)
  take('displacement', displacementScore)
  if (![...roles.values()].includes('displacement')) guessUnnamedDisplacement(columns, roles)
  return roles
}

/** The unit that a column has in each role that it may be given, by its name, its unit and its numbers. */
export function guessUnits(column: ColumnFacts): PreviewColumn['unitIf'] {
  return {
    time: guessTimeUnit(column),
    displacement: guessDisplacementUnit(column),
    wormAngle: guessWormAngleUnit(column),
  }
}

/** The choice that the guesses make, null unless both time and displacement were found. */
export function suggestChoice(columns: ColumnFacts[], roles: Map<number, Role>): ColumnChoice | null {
  const of = (role: Role) => columns.find((column) => roles.get(column.index) === role)
  const [time, displacement, declination, wormAngle] = [
    of('time'),
    of('displacement'),
    of('declination'),
    of('worm-angle'),
  ]
  if (!time || !displacement) return null
  return {
    time: time.index,
    timeUnit: guessTimeUnit(time),
    displacement: displacement.index,
    displacementUnit: guessDisplacementUnit(displacement),
    declination: declination?.index ?? null,
    wormAngle: wormAngle?.index ?? null,
    wormAngleUnit: wormAngle ? guessWormAngleUnit(wormAngle) : 'degrees',
  }
}

function guessTimeUnit(column: ColumnFacts): ColumnChoice['timeUnit'] {
  if (column.isTimeStamps) return 'iso-8601'
  const unit = column.unitText === null ? undefined : unitOfText(column.unitText)
  if (unit === 'julian-date' || isJulianRange(column)) return 'julian-date'
  if (unit === 'seconds' || unit === 'milliseconds' || unit === 'minutes') return unit
  const words = wordsOf(column.name)
  for (const word of words) {
    const named = unitOfText(word)
    if (word.length > 1 && (named === 'seconds' || named === 'milliseconds' || named === 'minutes')) return named
  }
  // Whole numbers 50 or more apart: as seconds that would be a frame a minute, as milliseconds it is a usual cadence.
  const isWhole =
    Number.isInteger(column.smallest) && Number.isInteger(column.largest) && Number.isInteger(column.medianStep)
  return isWhole && column.medianStep >= 50 ? 'milliseconds' : 'seconds'
}

function guessDisplacementUnit(column: ColumnFacts): ColumnChoice['displacementUnit'] {
  const unit = column.unitText === null ? undefined : unitOfText(column.unitText)
  if (unit === 'px' || unit === 'arcsec' || unit === 'ra-seconds') return unit
  if (unit === 'seconds' && hasWord(column, RIGHT_ASCENSION_WORDS)) return 'ra-seconds'
  return wordsOf(column.name).some((word) => unitOfText(word) === 'px' || word === 'x' || word === 'dx')
    ? 'px'
    : 'arcsec'
}

function guessWormAngleUnit(column: ColumnFacts): ColumnChoice['wormAngleUnit'] {
  const unit = column.unitText === null ? undefined : unitOfText(column.unitText)
  if (unit === 'degrees' || unit === 'turns') return unit
  return column.smallest !== null && column.largest !== null && column.smallest >= 0 && column.largest <= 1.001
    ? 'turns'
    : 'degrees'
}

function timeScore(column: ColumnFacts): number {
  if (column.isTimeStamps) return 6 + (hasWord(column, TIME_WORDS) ? 1 : 0)
  if (!column.isNumeric || !column.isRising) return 0
  const unit = column.unitText === null ? undefined : unitOfText(column.unitText)
  const isTimeUnit = unit === 'seconds' || unit === 'milliseconds' || unit === 'minutes' || unit === 'julian-date'
  let score = 3
  if (hasWord(column, TIME_WORDS)) score += 4
  if (isTimeUnit) score += 4
  if (isJulianRange(column)) score += 4
  if (hasWord(column, COUNTER_WORDS)) score -= 5
  score += column.evenness
  if (column.isCounting) score -= 1
  if (hasWord(column, [...WORM_WORDS, ...ANGLE_WORDS, ...RIGHT_ASCENSION_WORDS, ...DECLINATION_WORDS])) score -= 4
  if (unit === 'px' || unit === 'arcsec' || unit === 'degrees' || unit === 'turns') score -= 6
  return score
}

function displacementScore(column: ColumnFacts): number {
  if (!column.isNumeric || column.isConstant || isForeign(column)) return 0
  const unit = column.unitText === null ? undefined : unitOfText(column.unitText)
  let score = 0
  if (hasWord(column, RIGHT_ASCENSION_WORDS)) score += 5
  if (hasWord(column, DISPLACEMENT_WORDS)) score += 3
  if (unit === 'px' || unit === 'arcsec' || unit === 'ra-seconds') score += 3
  if (hasWord(column, DECLINATION_WORDS)) score -= 6
  if (unit === 'degrees' || unit === 'turns') score -= 4
  if (column.isCounting) score -= 4
  return score
}

function declinationScore(column: ColumnFacts): number {
  if (!column.isNumeric || isForeign(column)) return 0
  // In degrees it is where the telescope points, not how far the star has moved.
  if (column.unitText !== null && unitOfText(column.unitText) === 'degrees') return 0
  return hasWord(column, DECLINATION_WORDS) && !hasWord(column, RIGHT_ASCENSION_WORDS) ? 4 : 0
}

function wormScore(column: ColumnFacts): number {
  if (!column.isNumeric || column.isConstant) return 0
  const unit = column.unitText === null ? undefined : unitOfText(column.unitText)
  let score = 0
  if (hasWord(column, WORM_WORDS)) score += 3
  if (hasWord(column, ANGLE_WORDS)) score += 1
  if (unit === 'degrees' || unit === 'turns') score += 2
  if (unit === 'px' || unit === 'arcsec' || hasWord(column, RIGHT_ASCENSION_WORDS)) score -= 6
  return score
}

/** Without telling names: the only column of numbers that is left, or the first one where no column has a name. */
function guessUnnamedDisplacement(columns: ColumnFacts[], roles: Map<number, Role>): void {
  const isNameless = columns.every((column) => /^Column \d+$/.test(column.name))
  const open = columns.filter(
    (column) => column.isNumeric && !column.isConstant && !column.isCounting && !roles.has(column.index),
  )
  const plain = open.filter((column) => !isForeign(column))
  if (plain.length === 1 || (isNameless && plain.length > 0)) roles.set(plain[0].index, 'displacement')
}

function isForeign(column: ColumnFacts): boolean {
  return hasWord(column, OTHER_WORDS) || (hasWord(column, COUNTER_WORDS) && column.isCounting)
}

function isJulianRange(column: ColumnFacts): boolean {
  return (
    column.smallest !== null && column.largest !== null && column.smallest > 2_400_000 && column.largest < 2_500_000
  )
}

function hasWord(column: ColumnFacts, words: string[]): boolean {
  const own = wordsOf(column.name)
  return words.some((word) => own.includes(word))
}

function wordsOf(name: string): string[] {
  if (/^Column \d+$/.test(name)) return []
  const words = name
    .replace(/(\p{Ll})(\p{Lu})/gu, '$1 $2')
    .toLowerCase()
    .split(/[^\p{L}]+/u)
    .filter(Boolean)
  return [...words, words.join('')]
}

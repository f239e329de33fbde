import type { Recipe } from '@/lib/analysis/types'
import type { Display } from '@/lib/display-units'
import { formatNumber } from '@/lib/units'

const SMALL = ['no', 'one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine', 'ten', 'eleven', 'twelve']
const ORDINALS = [
  'zeroth',
  'first',
  'second',
  'third',
  'fourth',
  'fifth',
  'sixth',
  'seventh',
  'eighth',
  'ninth',
  'tenth',
]

/** Counts up to twelve in words. */
export function countWord(count: number): string {
  return SMALL[count] ?? String(count)
}

/** "three stray points", "one stray point"; the plural is the singular with s unless given. */
export function counted(count: number, singular: string, plural = `${singular}s`): string {
  return `${countWord(count)} ${count === 1 ? singular : plural}`
}

export function ordinalWord(number: number): string {
  if (ORDINALS[number]) return ORDINALS[number]
  const teen = number % 100 >= 11 && number % 100 <= 13
  const ending = teen ? 'th' : (['th', 'st', 'nd', 'rd'][number % 10] ?? 'th')
  return `${number}${ending}`
}

export function capitalised(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1)
}

/** A name as it stands within a sentence: “Motor shaft” loses its capital, “RA gear” keeps it. */
export function withinSentence(name: string): string {
  return /^\p{Lu}\p{Ll}/u.test(name) ? name.charAt(0).toLowerCase() + name.slice(1) : name
}

/** "a", "a and b", "a, b and c". */
export function listed(items: readonly string[]): string {
  if (items.length < 2) return items.join('')
  return `${items.slice(0, -1).join(', ')} and ${items.at(-1)}`
}

/** "worm", "worm ×2": the name of a harmonic in pictures and tables. */
export function harmonicName(order: number): string {
  return order === 1 ? 'worm' : `worm ×${order}`
}

/** Arc seconds with digits that suit their size: 33″, 16.0″, 0.42″, 0.034″. */
export function arcsec(value: number): string {
  const size = Math.abs(value)
  const decimals = size >= 100 ? 0 : size >= 1 ? 1 : size >= 0.1 || size === 0 ? 2 : 3
  return formatNumber(value, decimals, { unit: '″' })
}

/** Behind a swing’s size in a sentence that would else be read as an amplitude. */
export function fromEndToEnd({ swingMeasure }: Pick<Display, 'swingMeasure'>): string {
  return swingMeasure === 'peak-to-peak' ? ' from end to end' : ''
}

export function degrees(value: number): string {
  return formatNumber(value, 0, { unit: '°' })
}

/**
 * What stands behind every "ahead" and "behind" while the sense of the recording is only assumed; which way the axis
 * errs is then unknown, and a table made from it may double the error.
 */
export function senseMark(basis: Recipe['conversion']['senseBasis']): string {
  return basis === 'assumed' ? ' (sense assumed)' : ''
}

/** How the zero of the worm angle is called on axes and in sentences. */
export function originName(origin: Recipe['table']['origin']): string {
  if (origin.kind === 'index-time') return 'the index mark'
  return origin.kind === 'worm-angle-column' ? 'the zero of the file’s column' : 'run start'
}

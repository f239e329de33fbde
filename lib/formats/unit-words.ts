import type { ColumnChoice } from './types'

type Unit = ColumnChoice['timeUnit'] | ColumnChoice['displacementUnit'] | ColumnChoice['wormAngleUnit']

/** Ways in which people and standards write units; the last meaning is by the role of the column (s may be RA). */
const UNIT_WORDS: Record<string, Unit> = {
  s: 'seconds',
  sec: 'seconds',
  secs: 'seconds',
  second: 'seconds',
  seconds: 'seconds',
  ms: 'milliseconds',
  msec: 'milliseconds',
  millis: 'milliseconds',
  millisecond: 'milliseconds',
  milliseconds: 'milliseconds',
  min: 'minutes',
  mins: 'minutes',
  minute: 'minutes',
  minutes: 'minutes',
  iso: 'iso-8601',
  'iso 8601': 'iso-8601',
  utc: 'iso-8601',
  jd: 'julian-date',
  mjd: 'julian-date',
  'julian date': 'julian-date',
  'julian day': 'julian-date',
  px: 'px',
  pix: 'px',
  pixel: 'px',
  pixels: 'px',
  arcsec: 'arcsec',
  arcsecs: 'arcsec',
  arcsecond: 'arcsec',
  arcseconds: 'arcsec',
  'arc seconds': 'arcsec',
  'arc sec': 'arcsec',
  asec: 'arcsec',
  '"': 'arcsec',
  '″': 'arcsec',
  '”': 'arcsec',
  "''": 'arcsec',
  'seconds of ra': 'ra-seconds',
  'ra seconds': 'ra-seconds',
  'ra s': 'ra-seconds',
  'time seconds': 'ra-seconds',
  deg: 'degrees',
  degs: 'degrees',
  degree: 'degrees',
  degrees: 'degrees',
  '°': 'degrees',
  turn: 'turns',
  turns: 'turns',
  rev: 'turns',
  revs: 'turns',
  revolutions: 'turns',
}

/** Units that are no use to us but mark a row of units. */
const OTHER_UNITS = new Set([
  '-',
  '—',
  '1',
  'mm',
  'um',
  'µm',
  'mag',
  'adu',
  'counts',
  'count',
  '%',
  'c',
  '°c',
  'k',
  'v',
  'hz',
  'h',
  'd',
  'days',
  'rad',
  'steps',
  '#',
  'n/a',
  'none',
  'bool',
  'text',
])

/** The unit that a text stands for; brackets round it are ignored. Undefined where it is none that we read. */
export function unitOfText(text: string): Unit | undefined {
  return UNIT_WORDS[bare(text)]
}

/** Whether a cell could stand in a row of units. */
export function isUnitText(text: string): boolean {
  return unitOfText(text) !== undefined || OTHER_UNITS.has(bare(text))
}

/** Splits "RA (px)", "time [s]", "dec / arcsec", "ra_px" into name and unit; the unit is null where the text has none. */
export function splitNameAndUnit(text: string): { name: string; unitText: string | null } {
  const bracketed = /^(.*?)\s*[([{<]\s*([^)\]}>]{1,30})\s*[)\]}>]\s*$/s.exec(text)
  if (bracketed && bracketed[1] !== '') return { name: bracketed[1].trim(), unitText: bracketed[2].trim() }
  const parted = /^(.+?)\s*(?:\s\/\s|,\s|\s+in\s+|[\s_])\s*([^\s_]+(?: of RA)?)$/su.exec(text)
  if (parted && unitOfText(parted[2]) !== undefined) return { name: parted[1].trim(), unitText: parted[2] }
  return { name: text.trim(), unitText: null }
}

function bare(text: string): string {
  const inner = (/^\s*[([{<]\s*(.*?)\s*[)\]}>]\s*$/s.exec(text)?.[1] ?? text).trim().toLowerCase()
  const plain = inner
    .replace(/\.$/, '')
    .replace(/[\s_-]+/g, ' ')
    .trim()
  return plain === '' ? inner : plain
}

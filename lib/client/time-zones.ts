import { zoneName } from './dates'

/** Every zone the browser knows, UTC first: some leave it out of their list. */
export function everyTimeZone(): string[] {
  return ['UTC', ...Intl.supportedValuesOf('timeZone').filter((zone) => zone !== 'UTC')]
}

/** The zones whose place, region or name holds every word that was typed, those that begin with it first. */
export function findTimeZones(zones: readonly string[], typed: string): string[] {
  const words = plain(typed).split(' ').filter(Boolean)
  if (words.length === 0) return []
  const matches = zones.filter((zone) => words.every((word) => searched(zone).includes(word)))
  const isFirst = (zone: string) => plain(zoneName(zone)).startsWith(words[0])
  return [...matches.filter(isFirst), ...matches.filter((zone) => !isFirst(zone))]
}

/** 05:13 GMT+13: the time there now. */
export function timeNowIn(timeZone: string, now: Date): string {
  return new Intl.DateTimeFormat('en-GB', {
    timeZone,
    hour: '2-digit',
    minute: '2-digit',
    timeZoneName: 'short',
  }).format(now)
}

/** People look for New Zealand as well as for Auckland; the long name of a zone holds the country or region. */
function searched(timeZone: string): string {
  const known = searchTexts.get(timeZone)
  if (known !== undefined) return known
  const long = new Intl.DateTimeFormat('en-GB', { timeZone, timeZoneName: 'longGeneric' })
    .formatToParts(new Date(0))
    .find(({ type }) => type === 'timeZoneName')
  const text = plain(`${timeZone} ${zoneName(timeZone)} ${long?.value ?? ''}`)
  searchTexts.set(timeZone, text)
  return text
}

const searchTexts = new Map<string, string>()

function plain(text: string): string {
  return text
    .normalize('NFD')
    .replace(/\p{Diacritic}/gu, '')
    .toLowerCase()
    .replace(/[\s_/]+/g, ' ')
    .trim()
}

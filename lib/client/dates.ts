/** Dates and times of one time zone. */
export interface Dates {
  timeZone: string
  /** The zone in words, for heads of columns and beside fields: “UTC”, “Auckland time”. */
  zoneName: string
  /** 14 Nov 2026. */
  day: (iso: string | null) => string
  /** 14 Nov, 21:40 CET. */
  minute: (iso: string | null) => string
  /** 14 Nov 2026, 21:40, for a column whose head names the zone. */
  dayAndTime: (iso: string | null) => string
  /** 14 Nov 2026, 21:40 CET. */
  dayAndTimeWithZone: (iso: string | null) => string
}

const kept = new Map<string, Dates>()

/** The formats of a zone; making them is slow, so each zone’s are made once. */
export function datesIn(timeZone: string): Dates {
  const known = kept.get(timeZone)
  if (known) return known
  const made = makeDates(timeZone)
  kept.set(timeZone, made)
  return made
}

function makeDates(timeZone: string): Dates {
  const day = { day: 'numeric', month: 'short', year: 'numeric', timeZone } as const
  const time = { hour: '2-digit', minute: '2-digit' } as const
  const formats = {
    day: new Intl.DateTimeFormat('en-GB', day),
    minute: new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', timeZone, ...time }),
    dayAndTime: new Intl.DateTimeFormat('en-GB', { ...day, ...time }),
  }
  const write = (format: Intl.DateTimeFormat, iso: string | null) => (iso === null ? '–' : format.format(new Date(iso)))
  const withZone = (text: string, iso: string | null) => (iso === null ? text : `${text} ${shortZone(timeZone, iso)}`)
  return {
    timeZone,
    zoneName: zoneName(timeZone),
    day: (iso) => write(formats.day, iso),
    minute: (iso) => withZone(write(formats.minute, iso), iso),
    dayAndTime: (iso) => write(formats.dayAndTime, iso),
    dayAndTimeWithZone: (iso) => withZone(write(formats.dayAndTime, iso), iso),
  }
}

/** The zone as it is called at an instant, summer or winter: UTC, CET, GMT+13. */
export function shortZone(timeZone: string, iso: string): string {
  const parts = new Intl.DateTimeFormat('en-GB', { timeZone, timeZoneName: 'short' }).formatToParts(new Date(iso))
  return parts.find(({ type }) => type === 'timeZoneName')?.value ?? timeZone
}

/** Browsers list some zones under the name that a place had once; people know it by the one that it has now. */
const RENAMED: Readonly<Record<string, string>> = {
  'America/Buenos_Aires': 'America/Argentina/Buenos_Aires',
  'America/Godthab': 'America/Nuuk',
  'America/Indianapolis': 'America/Indiana/Indianapolis',
  'Asia/Calcutta': 'Asia/Kolkata',
  'Asia/Katmandu': 'Asia/Kathmandu',
  'Asia/Rangoon': 'Asia/Yangon',
  'Asia/Saigon': 'Asia/Ho_Chi_Minh',
  'Atlantic/Faeroe': 'Atlantic/Faroe',
  'Europe/Kiev': 'Europe/Kyiv',
  'Pacific/Enderbury': 'Pacific/Kanton',
  'Pacific/Ponape': 'Pacific/Pohnpei',
  'Pacific/Truk': 'Pacific/Chuuk',
}

/** “Auckland time” for Pacific/Auckland; a head of a column holds for summer and winter, so it names no offset. */
export function zoneName(timeZone: string): string {
  if (/^(Etc\/)?(UTC|UCT|Universal|Zulu|GMT)$/.test(timeZone)) return 'UTC'
  const present = RENAMED[timeZone] ?? timeZone
  const place =
    present.includes('/') && !present.startsWith('Etc/') ? present.split('/').slice(1).reverse().join(', ') : present
  return `${place.replaceAll('_', ' ')} time`
}

/** 14 Nov 2026, in UTC. */
export function formatDay(iso: string | null): string {
  return datesIn('UTC').day(iso)
}

/** 14 Nov, 21:40 UTC. */
export function formatMinute(iso: string | null): string {
  return datesIn('UTC').minute(iso)
}

/** 14 Nov 2026, 21:40, for a column whose head says that it is UTC. */
export function formatDayAndTime(iso: string | null): string {
  return datesIn('UTC').dayAndTime(iso)
}

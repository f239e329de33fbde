/**
 * Clock times of a zone to instants and back, with the nights on which clocks are changed: a time may come twice in autumn
 * and not at all in spring. Intl knows the rules; no library is needed.
 */

export interface Reading {
  /** ISO 8601 in UTC. */
  iso: string
  /** Minutes that the zone was ahead of UTC then. */
  offsetMinutes: number
}

export type WallTime =
  | { kind: 'once'; readings: [Reading] }
  /** The clocks were set back: first and second time round. */
  | { kind: 'twice'; readings: [Reading, Reading] }
  /** The clocks were set forward over it: the readings are what clocks showed that were not set, before and after. */
  | { kind: 'never'; readings: [Reading, Reading] }

const DAY_MS = 24 * 3600 * 1000
const PATTERN = /^(\d{4})-(\d{1,2})-(\d{1,2})[T ,]+(\d{1,2}):(\d{2})(?::(\d{2}))?$/

/** The instants at which clocks of the zone show “2026-10-25 02:30” (seconds may follow); null where it is no such text. */
export function readWallTime(text: string, timeZone: string): WallTime | null {
  const wallMs = parseAsUtc(text.trim())
  if (wallMs === null) return null
  const before = offsetMinutesAt(wallMs - DAY_MS, timeZone)
  const after = offsetMinutesAt(wallMs + DAY_MS, timeZone)
  const reading = (offsetMinutes: number): Reading => ({
    iso: new Date(wallMs - offsetMinutes * 60_000).toISOString(),
    offsetMinutes,
  })
  const fitting = [...new Set([before, after])]
    .map(reading)
    .filter(({ iso, offsetMinutes }) => offsetMinutesAt(Date.parse(iso), timeZone) === offsetMinutes)
    .sort((a, b) => Date.parse(a.iso) - Date.parse(b.iso))
  if (fitting.length === 1) return { kind: 'once', readings: [fitting[0]] }
  if (fitting.length === 2) return { kind: 'twice', readings: [fitting[0], fitting[1]] }
  return { kind: 'never', readings: [reading(after), reading(before)] }
}

/**
 * The instant at which a day (2026-11-14) begins in the zone, ISO 8601 in UTC: its first midnight, or the jump of the clocks
 * that left midnight out.
 *
 * @throws {RangeError} if it is no day of the calendar
 */
export function dayStart(day: string, timeZone: string): string {
  const midnight = readWallTime(`${day} 00:00`, timeZone)
  if (!midnight) throw new RangeError(`day must be a day of the calendar, as 2026-11-14: got ${day}`)
  return midnight.kind === 'never' ? midnight.readings[1].iso : midnight.readings[0].iso
}

/** The instant at which the day after this one begins in the zone. */
export function dayEnd(day: string, timeZone: string): string {
  const next = new Date(Date.parse(`${day}T00:00:00Z`) + DAY_MS)
  return dayStart(next.toISOString().slice(0, 10), timeZone)
}

/** What clocks of the zone showed at an instant: 2026-10-25 02:30, with seconds where there are any. */
export function wallTimeOf(iso: string, timeZone: string): string {
  const ms = Date.parse(iso)
  const wall = new Date(ms + offsetMinutesAt(ms, timeZone) * 60_000).toISOString()
  const text = wall.slice(0, 16).replace('T', ' ')
  return wall.slice(17, 19) === '00' ? text : `${text}:${wall.slice(17, 19)}`
}

/** Minutes that clocks of the zone are ahead of UTC at an instant; old zones may be off by fractions. */
export function offsetMinutesAt(ms: number, timeZone: string): number {
  const parts = new Intl.DateTimeFormat('en-US', {
    timeZone,
    hourCycle: 'h23',
    year: 'numeric',
    month: 'numeric',
    day: 'numeric',
    hour: 'numeric',
    minute: 'numeric',
    second: 'numeric',
  }).formatToParts(new Date(ms))
  const part = (type: Intl.DateTimeFormatPartTypes) => Number(parts.find((each) => each.type === type)?.value)
  const wall = Date.UTC(part('year'), part('month') - 1, part('day'), part('hour'), part('minute'), part('second'))
  return (wall - Math.floor(ms / 1000) * 1000) / 60_000
}

function parseAsUtc(text: string): number | null {
  const match = PATTERN.exec(text)
  if (!match) return null
  const [year, month, day, hour, minute, second] = match.slice(1).map((digits) => Number(digits ?? 0))
  const date = new Date(Date.UTC(year, month - 1, day, hour, minute, second))
  const isReal =
    date.getUTCFullYear() === year &&
    date.getUTCMonth() === month - 1 &&
    date.getUTCDate() === day &&
    date.getUTCHours() === hour &&
    minute < 60 &&
    second < 60
  return isReal ? date.getTime() : null
}

import { scanFraction } from './number-scanner'

/**
 * One instant in two parts, so that differences keep their digits: whole days since 1970-01-01 and seconds of the day.
 * A double of clock seconds would be good to 0.2 µs, one of a Julian Date only to 40 µs.
 */
export interface TimeStamp {
  /** 0 where the stamp has no date. */
  days: number
  secondsOfDay: number
  hasDate: boolean
  hasZone: boolean
}

const SECONDS_PER_DAY = 86_400
/** Julian day number that begins at noon of 1970-01-01 (Meeus 1998, chapter 7). */
const JULIAN_DAY_OF_1970 = 2_440_588
/** JD − MJD = 2400000.5 (IAU 1997 resolution B1). */
const MODIFIED_JULIAN_OFFSET_DAYS = 2_400_000

/** Seconds from one stamp to another, from differences of equal parts. */
export function secondsBetween(from: TimeStamp, to: TimeStamp): number {
  return (to.days - from.days) * SECONDS_PER_DAY + (to.secondsOfDay - from.secondsOfDay)
}

/** Milliseconds since 1970 (UTC), rounded to whole ones; null where the stamp has no date. */
export function millisecondsOf(stamp: TimeStamp): number | null {
  return stamp.hasDate ? stamp.days * 86_400_000 + Math.floor(stamp.secondsOfDay * 1000 + 0.5) : null
}

/**
 * ISO 8601 date and time of day, extended (2031-11-14T21:03:07.25) or basic (20311114T210307), calendar or ordinal date,
 * T or one blank between, fraction after point or comma, zone Z or ±hh[:mm]; or a time of day alone (21:03:07). Without a
 * zone it is taken as UTC. A 60th second (leap second) is read. Null where the text is no such stamp.
 */
export function scanIsoStamp(bytes: Uint8Array, start: number, end: number): TimeStamp | null {
  const cursor = { bytes, at: start, end }
  let days = 0
  let hasDate = false
  const isTimeAlone = end - start >= 3 && (bytes[start + 2] === 58 || bytes[start + 1] === 58)
  if (!isTimeAlone) {
    const date = scanDate(cursor)
    if (date === null) return null
    days = date
    hasDate = true
    if (cursor.at === end) return { days, secondsOfDay: 0, hasDate, hasZone: false }
    if ((bytes[cursor.at] | 32) !== 116 && bytes[cursor.at] !== 32) return null
    cursor.at++
  }
  const seconds = scanTimeOfDay(cursor)
  if (seconds === null) return null
  if (cursor.at < end && bytes[cursor.at] === 32) cursor.at++
  if (cursor.at === end) return { days, secondsOfDay: seconds, hasDate, hasZone: false }
  const offset = scanZone(cursor)
  if (offset === null || cursor.at !== end) return null
  return { days, secondsOfDay: seconds - offset, hasDate, hasZone: true }
}

/**
 * Julian Date (or Modified Julian Date, below 100 000) with its whole days kept apart from the fraction.
 *
 * @param decimalMark byte of the decimal mark
 */
export function scanJulianDate(
  bytes: Uint8Array,
  { start, end, decimalMark }: { start: number; end: number; decimalMark: number },
): TimeStamp | null {
  let at = start
  let day = 0
  for (; at < end && isDigit(bytes[at]); at++) day = day * 10 + (bytes[at] - 48)
  if (at === start || at - start > 9) return null
  let fraction = 0
  if (at < end && bytes[at] === decimalMark) {
    for (let i = at + 1; i < end; i++) if (!isDigit(bytes[i])) return null
    fraction = scanFraction(bytes, at + 1, end)
    at = end
  }
  if (at !== end) return null
  const isModified = day < 100_000
  const isDated = isModified ? day >= 15_000 : day >= 2_300_000 && day < 2_600_000
  const days = day - JULIAN_DAY_OF_1970 + (isModified ? MODIFIED_JULIAN_OFFSET_DAYS + 1 : 0)
  return {
    days,
    secondsOfDay: (fraction + (isModified ? 0 : 0.5)) * SECONDS_PER_DAY,
    hasDate: isDated,
    hasZone: isDated,
  }
}

interface Cursor {
  bytes: Uint8Array
  at: number
  end: number
}

const isDigit = (byte: number) => byte >= 48 && byte <= 57

/** A fixed count of digits as a number, −1 where they are not there. */
function digits(cursor: Cursor, count: number): number {
  if (cursor.at + count > cursor.end) return -1
  let value = 0
  for (let i = 0; i < count; i++) {
    const byte = cursor.bytes[cursor.at + i]
    if (!isDigit(byte)) return -1
    value = value * 10 + (byte - 48)
  }
  cursor.at += count
  return value
}

function skip(cursor: Cursor, byte: number): boolean {
  if (cursor.at >= cursor.end || cursor.bytes[cursor.at] !== byte) return false
  cursor.at++
  return true
}

function scanDate(cursor: Cursor): number | null {
  const year = digits(cursor, 4)
  if (year < 0) return null
  const isExtended = skip(cursor, 45)
  let digitCount = 0
  while (cursor.at + digitCount < cursor.end && isDigit(cursor.bytes[cursor.at + digitCount])) digitCount++
  if (digitCount === 3) {
    const ordinal = digits(cursor, 3)
    return ordinal >= 1 && ordinal <= (isLeap(year) ? 366 : 365) ? daysFromCivil(year, 1, 1) + ordinal - 1 : null
  }
  const month = digits(cursor, 2)
  if (isExtended && !skip(cursor, 45)) return null
  const day = digits(cursor, 2)
  if (month < 1 || month > 12 || day < 1 || day > daysInMonth(year, month)) return null
  return daysFromCivil(year, month, day)
}

function scanTimeOfDay(cursor: Cursor): number | null {
  const isShortHour = cursor.at + 1 < cursor.end && cursor.bytes[cursor.at + 1] === 58
  const hour = digits(cursor, isShortHour ? 1 : 2)
  const isExtended = skip(cursor, 58)
  const minute = digits(cursor, 2)
  if (hour < 0 || hour > 24 || minute < 0 || minute > 59) return null
  let second = 0
  if (isExtended ? skip(cursor, 58) : cursor.at < cursor.end && isDigit(cursor.bytes[cursor.at])) {
    second = digits(cursor, 2)
    if (second < 0 || second > 60) return null
    if (skip(cursor, 46) || skip(cursor, 44)) {
      const start = cursor.at
      while (cursor.at < cursor.end && isDigit(cursor.bytes[cursor.at])) cursor.at++
      if (cursor.at > start) second += scanFraction(cursor.bytes, start, cursor.at)
    }
  }
  const seconds = hour * 3600 + minute * 60 + second
  return hour === 24 && seconds > SECONDS_PER_DAY ? null : seconds
}

/** Offset of the zone from UTC in seconds, east positive. */
function scanZone(cursor: Cursor): number | null {
  if (skip(cursor, 90) || skip(cursor, 122)) return 0
  const isWest = cursor.bytes[cursor.at] === 45
  if (!skip(cursor, 45) && !skip(cursor, 43)) return null
  const hour = digits(cursor, 2)
  if (hour < 0 || hour > 23) return null
  skip(cursor, 58)
  const minute = cursor.at < cursor.end ? digits(cursor, 2) : 0
  if (minute < 0 || minute > 59) return null
  const offset = hour * 3600 + minute * 60
  return isWest ? -offset : offset
}

function isLeap(year: number): boolean {
  return year % 4 === 0 && (year % 100 !== 0 || year % 400 === 0)
}

function daysInMonth(year: number, month: number): number {
  return month === 2 ? (isLeap(year) ? 29 : 28) : month === 4 || month === 6 || month === 9 || month === 11 ? 30 : 31
}

/** Days since 1970-01-01 in the proleptic Gregorian calendar. */
function daysFromCivil(year: number, month: number, day: number): number {
  const y = month <= 2 ? year - 1 : year
  const era = Math.floor(y / 400)
  const yearOfEra = y - era * 400
  const dayOfYear = Math.floor((153 * (month + (month > 2 ? -3 : 9)) + 2) / 5) + day - 1
  return era * 146_097 + yearOfEra * 365 + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100) + dayOfYear - 719_468
}

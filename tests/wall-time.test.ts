import { describe, expect, test } from 'vitest'
import { dayEnd, dayStart, offsetMinutesAt, readWallTime, wallTimeOf } from '@/lib/wall-time'

const BERLIN = 'Europe/Berlin'

describe('a clock time', () => {
  test.each([
    ['2026-11-14 21:40', BERLIN, '2026-11-14T20:40:00.000Z'],
    ['2026-07-14 21:40:07', BERLIN, '2026-07-14T19:40:07.000Z'],
    ['2026-11-14T21:40', 'UTC', '2026-11-14T21:40:00.000Z'],
    ['2026-11-14 21:40', 'Pacific/Auckland', '2026-11-14T08:40:00.000Z'],
    ['2026-11-14 21:40', 'Asia/Kolkata', '2026-11-14T16:10:00.000Z'],
    ['2026-11-14 00:05', 'America/Los_Angeles', '2026-11-14T08:05:00.000Z'],
  ])('%s in %s is one instant, and comes back as it was typed', (text, zone, iso) => {
    expect(readWallTime(text, zone)).toMatchObject({ kind: 'once', readings: [{ iso }] })
    expect(wallTimeOf(iso, zone)).toBe(text.replace('T', ' '))
  })

  test('that comes twice when the clocks are set back has two readings, an hour apart', () => {
    expect(readWallTime('2026-10-25 02:30', BERLIN)).toEqual({
      kind: 'twice',
      readings: [
        { iso: '2026-10-25T00:30:00.000Z', offsetMinutes: 120 },
        { iso: '2026-10-25T01:30:00.000Z', offsetMinutes: 60 },
      ],
    })
    expect(wallTimeOf('2026-10-25T00:30:00.000Z', BERLIN)).toBe('2026-10-25 02:30')
    expect(wallTimeOf('2026-10-25T01:30:00.000Z', BERLIN)).toBe('2026-10-25 02:30')
  })

  test('just outside that hour comes once', () => {
    expect(readWallTime('2026-10-25 01:59:59', BERLIN)).toMatchObject({
      kind: 'once',
      readings: [{ iso: '2026-10-24T23:59:59.000Z' }],
    })
    expect(readWallTime('2026-10-25 03:00', BERLIN)).toMatchObject({
      kind: 'once',
      readings: [{ iso: '2026-10-25T02:00:00.000Z' }],
    })
  })

  test('over which the clocks are set forward never comes; the times on either side are named', () => {
    const wall = readWallTime('2026-03-29 02:30', BERLIN)
    expect(wall?.kind).toBe('never')
    expect(wall?.readings.map(({ iso }) => wallTimeOf(iso, BERLIN))).toEqual(['2026-03-29 01:30', '2026-03-29 03:30'])
    expect(readWallTime('2026-03-29 01:59:59', BERLIN)?.kind).toBe('once')
    expect(readWallTime('2026-03-29 03:00', BERLIN)?.kind).toBe('once')
  })

  test('half an hour of change is known too', () => {
    expect(readWallTime('2026-04-05 01:45', 'Australia/Lord_Howe')?.kind).toBe('twice')
    expect(readWallTime('2026-10-04 02:15', 'Australia/Lord_Howe')?.kind).toBe('never')
  })

  test.each([
    '',
    'tonight',
    '2026-13-01 10:00',
    '2026-02-30 10:00',
    '2026-11-14',
    '2026-11-14 24:10',
    '2026-11-14 21:61',
  ])('“%s” is none', (text) => {
    expect(readWallTime(text, BERLIN)).toBeNull()
  })
})

test('the offset of an instant', () => {
  expect(offsetMinutesAt(Date.parse('2026-10-25T00:59:59.900Z'), BERLIN)).toBe(120)
  expect(offsetMinutesAt(Date.parse('2026-10-25T01:00:00Z'), BERLIN)).toBe(60)
  expect(offsetMinutesAt(Date.parse('2026-01-01T12:00:00Z'), 'America/St_Johns')).toBe(-210)
})

describe('a day', () => {
  test.each([
    ['2026-11-14', 'UTC', '2026-11-14T00:00:00.000Z', 24],
    ['2026-11-14', 'Pacific/Auckland', '2026-11-13T11:00:00.000Z', 24],
    // Clocks are set forward or back within it.
    ['2026-03-29', BERLIN, '2026-03-28T23:00:00.000Z', 23],
    ['2026-10-25', BERLIN, '2026-10-24T22:00:00.000Z', 25],
    // Midnight is left out: the day begins at one o’clock.
    ['2026-04-24', 'Africa/Cairo', '2026-04-23T22:00:00.000Z', 23],
    // Midnight comes twice: the first one counts.
    ['2026-11-01', 'America/Havana', '2026-11-01T04:00:00.000Z', 25],
    // A day that the calendar of the place left out.
    ['2011-12-30', 'Pacific/Apia', '2011-12-30T10:00:00.000Z', 0],
  ])('%s in %s begins at %s and has %i hours', (day, zone, start, hours) => {
    expect(dayStart(day, zone)).toBe(start)
    expect(Date.parse(dayEnd(day, zone)) - Date.parse(start)).toBe(hours * 3600 * 1000)
  })

  test('that no calendar has is a mistake', () => {
    expect(() => dayStart('2026-02-30', 'UTC')).toThrow(/2026-02-30/)
  })
})

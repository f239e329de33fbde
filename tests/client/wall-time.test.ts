import { describe, expect, test } from 'vitest'
import { offsetMinutesAt, readWallTime, wallTimeOf } from '@/lib/client/wall-time'

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

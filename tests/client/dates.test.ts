import { expect, test } from 'vitest'
import { datesIn, zoneName } from '@/lib/client/dates'
import { everyTimeZone, findTimeZones, timeNowIn } from '@/lib/client/time-zones'

const AT = '2026-11-14T21:40:00.000Z'

test('times are written in the zone, with its short name where no head names it', () => {
  const utc = datesIn('UTC')
  expect([utc.day(AT), utc.minute(AT), utc.dayAndTime(AT), utc.dayAndTimeWithZone(AT)]).toEqual([
    '14 Nov 2026',
    '14 Nov, 21:40 UTC',
    '14 Nov 2026, 21:40',
    '14 Nov 2026, 21:40 UTC',
  ])
  const berlin = datesIn('Europe/Berlin')
  expect(berlin.minute(AT)).toBe('14 Nov, 22:40 CET')
  expect(berlin.minute('2026-07-14T21:40:00.000Z')).toBe('14 Jul, 23:40 CEST')
})

test('the day is that of the zone', () => {
  expect(datesIn('Pacific/Auckland').day(AT)).toBe('15 Nov 2026')
  expect(datesIn('Pacific/Auckland').dayAndTimeWithZone(AT)).toBe('15 Nov 2026, 10:40 GMT+13')
  expect(datesIn('America/Los_Angeles').day('2026-11-15T03:00:00.000Z')).toBe('14 Nov 2026')
})

test('the two hours of one name are told apart by their zone', () => {
  const { minute } = datesIn('Europe/Berlin')
  expect(minute('2026-10-25T00:30:00Z')).toBe('25 Oct, 02:30 CEST')
  expect(minute('2026-10-25T01:30:00Z')).toBe('25 Oct, 02:30 CET')
})

test('what is not known is a dash, without a zone', () => {
  const { day, minute, dayAndTime, dayAndTimeWithZone } = datesIn('Europe/Berlin')
  expect([day(null), minute(null), dayAndTime(null), dayAndTimeWithZone(null)]).toEqual(['–', '–', '–', '–'])
})

test.each([
  ['UTC', 'UTC'],
  ['Etc/UTC', 'UTC'],
  ['Europe/Berlin', 'Berlin time'],
  ['America/New_York', 'New York time'],
  ['America/Argentina/Buenos_Aires', 'Buenos Aires, Argentina time'],
  ['Asia/Calcutta', 'Kolkata time'],
  ['Asia/Kolkata', 'Kolkata time'],
])('%s is called %s', (zone, name) => {
  expect(zoneName(zone)).toBe(name)
})

test('zones are found by city, by country, and without accents; UTC is always among them', () => {
  const zones = everyTimeZone()
  expect(zones.filter((zone) => zone === 'UTC')).toHaveLength(1)
  expect(findTimeZones(zones, 'berl')).toEqual(['Europe/Berlin'])
  expect(findTimeZones(zones, 'New Zealand')).toContain('Pacific/Auckland')
  expect(findTimeZones(zones, 'são paulo')).toEqual(['America/Sao_Paulo'])
  expect(findTimeZones(zones, ' ')).toEqual([])
  expect(findTimeZones(zones, 'atlantis')).toEqual([])
})

test.each([
  ['Kolkata', 'Asia/Calcutta'],
  ['Calcutta', 'Asia/Calcutta'],
  ['Kyiv', 'Europe/Kiev'],
  ['yangon', 'Asia/Rangoon'],
  ['ho chi minh', 'Asia/Saigon'],
  ['Kathmandu', 'Asia/Katmandu'],
])('“%s” finds %s, by the name of today as by the one in the list', (typed, zone) => {
  expect(findTimeZones(['Europe/Berlin', zone], typed)).toEqual([zone])
})

test('the time there now', () => {
  expect(timeNowIn('Pacific/Auckland', new Date(AT))).toBe('10:40 GMT+13')
})

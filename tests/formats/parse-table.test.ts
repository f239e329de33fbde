import Papa from 'papaparse'
import { describe, expect, test } from 'vitest'
import { scanNumber } from '@/lib/formats/number-scanner'
import { MAX_FILE_BYTES } from '@/lib/formats/limits'
import { scanIsoStamp, scanJulianDate, millisecondsOf } from '@/lib/formats/time-stamps'
import type { ImportOutcome, ImportSettings } from '@/lib/formats/types'
import {
  latin1,
  previewOf,
  read,
  readAll,
  readOk,
  seededRandom,
  settingsOf,
  swing,
  table,
  utf16,
  utf8,
} from './make-file'

const comma = (value: number | string) => String(value).replace('.', ',')
const faultOf = (outcome: ImportOutcome) => (outcome.ok ? null : outcome.fault)

describe('numbers come out to the last bit', () => {
  const scan = (text: string, mark = 46) => {
    const bytes = utf8(text)
    return scanNumber(bytes, 0, bytes.length, mark)
  }

  test('seeded numbers in many spellings equal Number(text)', () => {
    const random = seededRandom(7)
    const wrong: string[] = []
    for (let i = 0; i < 20_000; i++) {
      const value = (random() - 0.5) * 10 ** Math.floor(random() * 60 - 30)
      for (const text of [
        String(value),
        value.toFixed(4),
        value.toExponential(Math.floor(random() * 18)),
        value.toPrecision(17),
      ]) {
        if (!Object.is(scan(text), Number(text)) || !Object.is(scan(comma(text), 44), Number(text))) wrong.push(text)
      }
    }
    expect(wrong).toEqual([])
  })

  test.each([
    '9007199254740993',
    '0.1e-400',
    '1e23',
    '8.5e22',
    '123456789012345678901234567890',
    '5e-324',
    '1.7976931348623157e308',
    '.5',
    '5.',
    '+4',
    '-0',
    '00012.50',
  ])('%s', (text) => {
    expect(scan(text)).toBe(Number(text))
  })

  test('a true minus sign and a D for the exponent are read', () => {
    expect(scan('\u22121.5')).toBe(-1.5)
    expect(scan('1.5D-3')).toBe(0.0015)
  })

  test.each([
    '',
    '-',
    '.',
    'e5',
    '1e',
    '1e+',
    '1.2.3',
    '1,2',
    '0x10',
    '1e400',
    'Infinity',
    '1 2',
    '12px',
    '--1',
    'NaN',
  ])('%o is no number', (text) => {
    expect(scan(text)).toBeNaN()
  })
})

describe('time stamps', () => {
  const iso = (text: string) => {
    const bytes = utf8(text)
    const stamp = scanIsoStamp(bytes, 0, bytes.length)
    return stamp && millisecondsOf(stamp)
  }

  // The language's own parser is the outside check for the form that it reads.
  test('equal to Date.parse over seeded instants from 1900 to 2100', () => {
    const random = seededRandom(11)
    for (let i = 0; i < 3000; i++) {
      const text = new Date(Math.floor((random() * 200 - 70) * 31_556_952_000)).toISOString()
      expect(iso(text), text).toBe(Date.parse(text))
      const zoned = text.replace('Z', i % 2 ? '+05:30' : '-11:00')
      expect(iso(zoned), zoned).toBe(Date.parse(zoned))
    }
  })

  test.each([
    ['2031-11-14 21:03:07', Date.UTC(2031, 10, 14, 21, 3, 7)],
    ['20311114T210307Z', Date.UTC(2031, 10, 14, 21, 3, 7)],
    ['2031-318T21:03', Date.UTC(2031, 10, 14, 21, 3)],
    ['2031-11-14T21:03:07,250+01', Date.UTC(2031, 10, 14, 20, 3, 7, 250)],
    ['2032-02-29', Date.UTC(2032, 1, 29)],
    ['2031-11-14T24:00:00Z', Date.UTC(2031, 10, 15)],
  ])('%s', (text, expected) => expect(iso(text)).toBe(expected))

  test.each([
    '2031-02-29T00:00:00',
    '2031-13-01',
    '2031-11-14T25:00',
    '2031-11-14T21:60',
    '2031-11-14T21:03:07X',
    '2031-11-14T21:03:07+1',
    '14.11.2031',
    'yesterday',
    '2031',
  ])('%s is none', (text) => {
    expect(iso(text)).toBeNull()
  })

  // Meeus 1998, Astronomical Algorithms, chapter 7: examples 7.a and the table of dates.
  test.each([
    ['2436116.31', Date.UTC(1957, 9, 4) + Math.round(0.81 * 86_400_000)],
    ['2451545.0', Date.UTC(2000, 0, 1, 12)],
    ['2446822.5', Date.UTC(1987, 0, 27)],
  ])('Julian Date %s', (text, expected) => {
    const bytes = utf8(text)
    const stamp = scanJulianDate(bytes, { start: 0, end: bytes.length, decimalMark: 46 })
    expect(stamp && millisecondsOf(stamp)).toBe(expected)
  })

  test('a Modified Julian Date is the Julian Date less 2400000.5', () => {
    const bytes = utf8('51544.5')
    const stamp = scanJulianDate(bytes, { start: 0, end: bytes.length, decimalMark: 46 })
    expect(stamp && millisecondsOf(stamp)).toBe(Date.UTC(2000, 0, 1, 12))
  })
})

describe('every time unit gives seconds from the first row', () => {
  const startedAtMs = Date.UTC(2031, 10, 14, 21, 59, 30, 250)
  const julian = (i: number) => {
    // Exact in integers: 1e-10 days are 8.64 µs; the stamp's last digit is the only rounding.
    const tenBillionths = BigInt(Math.round((startedAtMs + i * 2500) * 1e6)) / 8640n
    const total = tenBillionths + 24405875n * 1_000_000_000n
    return `${total / 10_000_000_000n}.${String(total % 10_000_000_000n).padStart(10, '0')}`
  }
  test.each<[ImportSettings['columns']['timeUnit'], (i: number) => string, number | null, number]>([
    ['seconds', (i) => String(i * 2.5), null, 0],
    ['seconds', (i) => ((startedAtMs + i * 2500) / 1000).toFixed(3), startedAtMs, 1e-6],
    ['milliseconds', (i) => String(1000 + i * 2500), null, 0],
    ['milliseconds', (i) => String(startedAtMs + i * 2500), startedAtMs, 0],
    ['minutes', (i) => String((i * 2.5) / 60), null, 1e-12],
    ['iso-8601', (i) => new Date(startedAtMs + i * 2500).toISOString(), startedAtMs, 1e-10],
    [
      'iso-8601',
      (i) => new Date(startedAtMs + i * 2500).toISOString().replace('Z', '').replace('T', ' '),
      startedAtMs,
      1e-10,
    ],
    ['julian-date', julian, startedAtMs, 9e-6],
  ])('%s, as %s', (timeUnit, stamp, expectedStart, tolerance) => {
    const run = readOk(utf8('when,ra\n' + table(60, (i) => `${stamp(i)},${swing(i)}`)), {
      time: 0,
      displacement: 1,
      timeUnit,
    })
    expect(run.startedAtMs).toBe(expectedStart)
    expect(run.rowCount).toBe(60)
    run.columns.timeSeconds.forEach((seconds, i) => expect(Math.abs(seconds - i * 2.5)).toBeLessThanOrEqual(tolerance))
  })

  test('a time of day alone goes on past midnight and gives no date', () => {
    const clock = (i: number) => new Date(Date.UTC(2031, 10, 14, 23, 59, 0) + i * 2500).toISOString().slice(11, 21)
    const run = readOk(utf8('clock,ra\n' + table(60, (i) => `${clock(i)},${swing(i)}`)))
    expect(run.startedAtMs).toBeNull()
    expect(run.columns.timeSeconds[59]).toBeCloseTo(147.5, 9)
  })

  test('stamps without fractions at a quick cadence repeat: the first of each is kept', () => {
    const run = readOk(
      utf8(
        'when,ra\n' +
          table(60, (i) => `2031-11-14T21:03:${String(10 + Math.floor(i / 2)).padStart(2, '0')},${swing(i)}`),
      ),
    )
    expect(run.rowCount).toBe(30)
    expect(run.skipped).toEqual([{ reason: 'repeated-time', count: 30, firstRows: [3, 5, 7, 9, 11] }])
  })
})

describe('the scanner reads what Papa Parse reads', () => {
  const layouts = [
    { delimiter: ',', mark: '.' },
    { delimiter: ';', mark: ',' },
    { delimiter: '\t', mark: '.' },
  ]
  for (const { delimiter, mark } of layouts) {
    for (const lineEnd of ['\n', '\r\n', '\r']) {
      test(`delimiter ${JSON.stringify(delimiter)}, line end ${JSON.stringify(lineEnd)}, quoted cells at random`, () => {
        const random = seededRandom(delimiter.charCodeAt(0) + lineEnd.charCodeAt(0))
        const quoted = (text: string) => (random() < 0.3 ? `"${text}"` : text)
        const number = (value: number) => quoted(String(value).replace('.', mark))
        const text =
          `time${delimiter}note${delimiter}ra${lineEnd}` +
          table(
            200,
            (i) =>
              [
                number(i * 2.5),
                random() < 0.3 ? `"a ${delimiter} ""b"" line${lineEnd}end"` : 'plain',
                number(swing(i)),
              ].join(delimiter),
            lineEnd,
          )
        const run = readOk(
          utf8(text),
          { time: 0, displacement: 2 },
          { delimiter: delimiter as ',', decimalMark: mark as '.' },
        )
        const expected = Papa.parse<string[]>(text, {
          delimiter,
          newline: lineEnd as '\n',
          skipEmptyLines: true,
        }).data.slice(1)
        expect(run.rowCount).toBe(expected.length)
        expect([...run.columns.timeSeconds]).toEqual(expected.map((row) => Number(row[0].replace(mark, '.'))))
        expect([...run.columns.displacement]).toEqual(expected.map((row) => Number(row[2].replace(mark, '.'))))
      })
    }
  }

  test('blanks of any number, leading ones too', () => {
    const run = readOk(utf8(table(40, (i) => `  ${i * 2.5}\t  ${swing(i)}   `)))
    expect([...run.columns.displacement]).toEqual(Array.from({ length: 40 }, (_, i) => swing(i)))
  })

  test.each([
    ['utf-16le', (text: string) => utf16(text)],
    ['utf-16be', (text: string) => utf16(text, { isBigEndian: true, hasMark: false })],
    ['utf-8 with a mark', (text: string) => utf8(`\ufeff${text}`)],
    ['windows-1252', latin1],
  ])('%s', (_, encode) => {
    const text = 'time;d\u00e9calage (px)\r\n' + table(40, (i) => `${comma(i * 2.5)};${comma(swing(i))}`, '\r\n')
    expect([...readOk(encode(text)).columns.displacement]).toEqual(Array.from({ length: 40 }, (_, i) => swing(i)))
  })

  test('a file without a header and without a last line end loses no row', () => {
    expect(readOk(utf8(table(25, (i) => `${i},${swing(i)}`).trimEnd())).rowCount).toBe(25)
  })

  test('optional columns: missing cells are NaN, turns become degrees', () => {
    const text =
      'time,ra,dec,worm (turns)\n' +
      table(30, (i) => `${i},${swing(i)},${i === 4 ? '--' : 0.25},${i === 5 ? '' : i / 8}`)
    const { columns } = readOk(utf8(text))
    expect([...columns.declinationDisplacement!.subarray(3, 6)]).toEqual([0.25, NaN, 0.25])
    expect([...columns.wormAngleDegrees!.subarray(3, 7)]).toEqual([135, 180, NaN, 270])
  })
})

describe('rows that are passed over', () => {
  test('missing displacement stays as NaN, missing time is left out, words and comments are counted', () => {
    const words: Record<number, string> = {
      3: '3,',
      5: '5,NaN',
      7: '7,null',
      9: '9,-',
      11: '11,--',
      13: ',1.5',
      15: '# clouds',
      17: '17,lost',
      19: 'oops,2',
    }
    const run = readOk(utf8('time,ra\n' + table(60, (i) => words[i] ?? `${i},${swing(i)}`)))
    expect(run.rowCount).toBe(56)
    expect([...run.columns.displacement].filter(Number.isNaN)).toHaveLength(5)
    expect([...run.columns.timeSeconds].every(Number.isFinite)).toBe(true)
    expect(run.skipped).toEqual([
      { reason: 'missing', count: 1, firstRows: [15] },
      { reason: 'comment', count: 1, firstRows: [17] },
      { reason: 'not-a-number', count: 2, firstRows: [19, 21] },
    ])
  })

  test('notes after the last row are notes, however they look', () => {
    const run = readOk(
      utf8('time,ra\n' + table(30, (i) => `${i},${swing(i)}`) + '\nEnd of run\nmean, 3.2\nrms, 1.1, px\n'),
    )
    expect(run.rowCount).toBe(30)
    expect(run.skipped).toEqual([{ reason: 'comment', count: 3, firstRows: [33, 34, 35] }])
  })
})

describe('faults name row, column and remedy', () => {
  const head = 'time (s),RA (px)\n'
  const good = (i: number) => `${i},${swing(i)}`
  test.each<
    [string, Uint8Array, Partial<ImportSettings['columns']>, { row: number | null; column: string | null }, string]
  >([
    [
      'few-rows',
      utf8(head + table(5, good)),
      {},
      { row: null, column: null },
      'Only 5 usable rows were found; at least 20',
    ],
    [
      'few-rows',
      utf8(head + table(60, (i) => (i < 19 ? good(i) : `${i},-`))),
      {},
      { row: null, column: null },
      'Only 19 usable',
    ],
    [
      'constant',
      utf8(head + table(60, (i) => `${i},4.50`)),
      { displacement: 1, time: 0 },
      { row: null, column: 'RA' },
      '“4.50” in every row',
    ],
    [
      'time-goes-back',
      utf8(head + table(60, (i) => (i === 30 ? '3,1' : good(i)))),
      {},
      { row: 32, column: 'time' },
      'from “29” to “3”',
    ],
    [
      'not-a-number',
      utf8(head + table(60, (i) => `${i},bright`)),
      { time: 0, displacement: 1 },
      { row: 2, column: 'RA' },
      '“bright” is not a number',
    ],
    [
      'bad-time',
      utf8(head + table(60, good)),
      { time: 0, displacement: 1, timeUnit: 'iso-8601' },
      { row: 2, column: 'time' },
      'ISO 8601',
    ],
    [
      'too-many-faults',
      utf8(head + table(60, (i) => (i % 4 === 3 ? `${i},cloud` : good(i))) + '60,1\n'),
      {},
      { row: 5, column: 'RA' },
      '15 of 61 rows',
    ],
    [
      'column-missing',
      utf8(head + table(60, good)),
      { time: 0, displacement: 6 },
      { row: null, column: 'Column 7' },
      'only 2 columns',
    ],
    [
      'column-missing',
      utf8(head + table(60, good)),
      { time: 0, displacement: 1, wormAngle: 2 },
      { row: null, column: 'Column 3' },
      'the worm angle',
    ],
  ])('%s', (code, bytes, changes, place, words) => {
    const settings = {
      ...settingsOf(utf8(head + table(60, good))),
      columns: settingsOf(utf8(head + table(60, good)), changes).columns,
    }
    const fault = faultOf(readAll(bytes, settings).outcome)
    expect(fault).toMatchObject({ code, ...place })
    expect(fault!.message).toContain(words)
    expect(fault!.message).toMatch(/\. (Choose|Correct|Sort) /)
  })

  test('a bad row in five is still read, one more is not', () => {
    const bad = (count: number) => utf8(head + table(100, (i) => (i < 2 * count && i % 2 === 1 ? `${i},x` : good(i))))
    expect(read(bad(20)).ok).toBe(true)
    expect(faultOf(read(bad(21)))?.code).toBe('too-many-faults')
  })

  const settings: ImportSettings = settingsOf(utf8(head + table(30, good)))
  test.each([
    ['empty', new Uint8Array(0)],
    ['empty', utf8('  \n\n')],
    ['binary', Uint8Array.from([0x1f, 0x8b, 8, 0, 0, 0])],
    ['binary', utf8(head + table(30, good) + '\0')],
    ['too-large', new Uint8Array(MAX_FILE_BYTES + 1).fill(49)],
    ['few-rows', utf8(head)],
  ])('%s, before any row is read', (code, bytes) => {
    expect(faultOf(readAll(bytes, settings).outcome)?.code).toBe(code)
  })

  test('the text of a long or odd cell is shortened and its controls replaced', () => {
    const bytes = utf8(head + table(60, (i) => `${i},a\u0007${'z'.repeat(300)}`))
    const message = faultOf(readAll(bytes, settings).outcome)!.message
    expect(message).toContain(`“a\ufffd${'z'.repeat(37)}…”`)
  })
})

test('random bytes and random table-like text never throw, whatever the settings', () => {
  const random = seededRandom(99)
  const pick = <T>(options: readonly T[]): T => options[Math.floor(random() * options.length)]
  const alphabet = '0123456789.,;\t "-+eE#:TZ\n\r\nab'
  for (let round = 0; round < 600; round++) {
    const length = Math.floor(random() * 800)
    const bytes =
      round % 3 === 0
        ? Uint8Array.from({ length }, () => 1 + Math.floor(random() * 255))
        : utf8(Array.from({ length }, () => pick([...alphabet])).join(''))
    const settings: ImportSettings = {
      version: 1,
      layout: {
        encoding: pick(['utf-8', 'utf-16le', 'utf-16be', 'windows-1252'] as const),
        delimiter: pick([',', ';', '\t', ' '] as const),
        decimalMark: pick(['.', ','] as const),
        headerRow: pick([null, 1, 500]),
        unitsRow: pick([null, 2]),
        firstDataRow: pick([1, 2, 3, 9999]),
      },
      columns: {
        time: pick([0, 1, 499]),
        timeUnit: pick(['seconds', 'milliseconds', 'minutes', 'iso-8601', 'julian-date'] as const),
        displacement: pick([0, 1, 2]),
        displacementUnit: 'px',
        declination: pick([null, 1, 2]),
        wormAngle: pick([null, 0, 3]),
        wormAngleUnit: pick(['degrees', 'turns'] as const),
      },
    }
    const { outcome } = readAll(bytes, settings)
    if (!outcome.ok) expect(outcome.fault.message.length).toBeGreaterThan(20)
  }
})

test('a table cut off after any byte never throws and never invents a row', () => {
  const bytes = utf8('time,"ra"\n' + table(30, (i) => `${i},"${swing(i)}"`))
  const settings = settingsOf(bytes)
  for (let length = 0; length < bytes.length; length++) {
    const { outcome } = readAll(bytes.subarray(0, length), settings)
    if (outcome.ok) expect(outcome.rowCount).toBeLessThanOrEqual(30)
  }
})

test('a million rows of five columns: every row kept, progress in small steps', () => {
  const line = new Map<number, string>()
  const text =
    'time,ra,dec,snr,temperature\n' +
    table(1_000_000, (i) => {
      const rest = line.get(i % 997) ?? `${swing(i % 997)},${swing((i * 7) % 997)},31.5,4.25`
      line.set(i % 997, rest)
      return `${(i * 0.04).toFixed(2)},${rest}`
    })
  const bytes = utf8(text)
  expect(previewOf(bytes).estimatedRowCount).toBeGreaterThan(900_000)
  const settings = settingsOf(bytes)
  const { outcome, progress } = readAll(bytes, settings)
  expect(outcome.ok && outcome.rowCount).toBe(1_000_000)
  expect(outcome.ok && outcome.columns.timeSeconds[999_999]).toBe(39_999.96)
  expect(progress.length).toBeGreaterThan(3)
  progress.forEach((fraction, i) => expect(fraction).toBeGreaterThan(progress[i - 1] ?? 0))
  expect(progress.at(-1)).toBeLessThanOrEqual(1)
}, 60_000)

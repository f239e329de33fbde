import { describe, expect, test } from 'vitest'
import { previewTable } from '@/lib/formats/preview-table'
import { MAX_FILE_BYTES } from '@/lib/formats/limits'
import { latin1, previewOf, seededRandom, swing, table, utf16, utf8 } from './make-file'

const comma = (value: number) => String(value).replace('.', ',')

describe('the layout is guessed', () => {
  const plain = 'time (s),RA (arcsec),Dec (arcsec)\n' + table(40, (i) => `${i * 2.5},${swing(i)},0.1`)

  test('comma, point, header in row 1', () => {
    expect(previewOf(utf8(plain)).layout).toEqual({
      encoding: 'utf-8',
      delimiter: ',',
      decimalMark: '.',
      headerRow: 1,
      unitsRow: null,
      firstDataRow: 2,
    })
  })

  test.each([
    ['semicolons and decimal commas', table(40, (i) => `${comma(i * 2.5)};${comma(swing(i))}`), ';', ','],
    ['tabs and decimal commas', table(40, (i) => `${comma(i * 2.5)}\t${comma(swing(i))}\t${comma(0.5)}`), '\t', ','],
    ['tabs with empty cells', table(40, (i) => `${i}\t\t${swing(i)}`), '\t', '.'],
    [
      'blanks that line up',
      table(40, (i) => `${String(i * 2.5).padStart(9)}  ${String(swing(i)).padStart(12)}`),
      ' ',
      '.',
    ],
    ['blanks and decimal commas', table(40, (i) => `${comma(i * 2.5)}   ${comma(swing(i))}`), ' ', ','],
    [
      'comma and blank between points',
      table(40, (i) => `${(i * 2.5).toFixed(1)}, ${swing(i).toFixed(3)}, 4`),
      ',',
      '.',
    ],
    ['quoted cells with decimal commas', table(40, (i) => `"${comma(i * 2.5)}","${comma(swing(i))}"`), ',', ','],
    ['whole numbers between semicolons', table(40, (i) => `${i};${(i * 7) % 13}`), ';', '.'],
    ['a word among the columns', table(40, (i) => `${i * 2.5},good star,${swing(i)}`), ',', '.'],
    [
      'date and time parted by a blank, commas',
      table(40, (i) => `2031-11-14 21:03:${String(i + 10)},${swing(i)},1`),
      ',',
      '.',
    ],
  ])('%s', (_, text, delimiter, decimalMark) => {
    if (delimiter === ',' && decimalMark === ',') {
      // Comma for both is readable only because every cell is quoted; the user says so.
      expect(previewOf(utf8(text), { delimiter: ',', decimalMark: ',' }).rows[1].cells[0]).toBe('2,5')
      return
    }
    expect(previewOf(utf8(text)).layout).toMatchObject({ delimiter, decimalMark, headerRow: null, firstDataRow: 1 })
  })

  test('preamble, pairs, units row, comments; row numbers count every line', () => {
    const text = [
      '# Hillside observatory, west pillar',
      '# mount: Hillside',
      '# focal length = 1200 mm, binning = 2',
      '# exposure: 2.0 s',
      '',
      'elapsed;right ascension;declination;temperature',
      's;px;px;°C',
      ...Array.from({ length: 30 }, (_, i) => `${comma(i * 2.5)};${comma(swing(i))};${comma(0.25)};4,5`),
    ].join('\r\n')
    const preview = previewOf(utf8(text))
    expect(preview.layout).toMatchObject({
      delimiter: ';',
      decimalMark: ',',
      headerRow: 6,
      unitsRow: 7,
      firstDataRow: 8,
    })
    expect(preview.metadata).toEqual({
      mount: 'Hillside',
      'focal length': '1200 mm',
      binning: '2',
      exposure: '2.0 s',
    })
    expect(preview.preamble).toHaveLength(4)
    expect(preview.columns.map(({ name, unitText, guess }) => [name, unitText, guess])).toEqual([
      ['elapsed', 's', 'time'],
      ['right ascension', 'px', 'displacement'],
      ['declination', 'px', 'declination'],
      ['temperature', '°C', null],
    ])
    expect(preview.rows).toHaveLength(12)
    expect(preview.rows[0]).toEqual({ rowNumber: 8, cells: ['0', '0', '0,25', '4,5'] })
    expect(preview.estimatedRowCount).toBe(30)
    expect(preview.suggested).toEqual({
      time: 0,
      timeUnit: 'seconds',
      displacement: 1,
      displacementUnit: 'px',
      declination: 2,
      wormAngle: null,
      wormAngleUnit: 'degrees',
    })
  })

  test.each([
    ['units below the names', 'time;RA;Dec;snr\ns;px;px;-\n', 1, 2],
    ['units above the names', '[s];[px];[px];[-]\ntime;RA;Dec;snr\n', 2, 1],
    ['units between blanks lines', 'time;RA;Dec;snr\n\n(s);(px);(px);\n\n', 1, 3],
  ])('%s', (_, head, headerRow, unitsRow) => {
    const preview = previewOf(utf8(head + table(30, (i) => `${i};${swing(i)};0.12;30`)))
    expect(preview.layout).toMatchObject({ headerRow, unitsRow })
    expect(preview.columns.slice(0, 3).map(({ name, unitText }) => [name, unitText])).toEqual([
      ['time', 's'],
      ['RA', 'px'],
      ['Dec', 'px'],
    ])
    expect(preview.suggested).toMatchObject({ time: 0, displacement: 1, displacementUnit: 'px', declination: 2 })
  })

  test('a header behind a comment mark, blanks between columns', () => {
    const text = '# t_s  ra_px  worm_deg\n' + table(30, (i) => `${i * 2.5} ${swing(i)} ${(i * 1.6) % 360}`)
    const preview = previewOf(utf8(text))
    expect(preview.layout).toMatchObject({ delimiter: ' ', headerRow: 1, firstDataRow: 2 })
    expect(preview.suggested).toMatchObject({
      time: 0,
      displacement: 1,
      displacementUnit: 'px',
      wormAngle: 2,
      wormAngleUnit: 'degrees',
    })
  })

  test('a header cell that holds a line end, as spreadsheets write it', () => {
    const text = '"time\n(s)","RA\n(px)"\n' + table(30, (i) => `${i},${swing(i)}`)
    const preview = previewOf(utf8(text))
    expect(preview.layout).toMatchObject({ headerRow: 1, firstDataRow: 4 })
    expect(preview.columns.map(({ name, unitText }) => [name, unitText])).toEqual([
      ['time', 's'],
      ['RA', 'px'],
    ])
    expect(preview.rows[0].rowNumber).toBe(4)
  })

  test('an arc second mark in a header opens no quoted cell', () => {
    const preview = previewOf(utf8('time (s),RA ("),Dec (")\n' + table(30, (i) => `${i},${swing(i)},0.5`)))
    expect(preview.suggested).toMatchObject({ displacement: 1, displacementUnit: 'arcsec', declination: 2 })
  })

  test('what the user corrected is kept and the rest follows', () => {
    const text = 'a;b\n' + table(30, (i) => `${i};${swing(i)}`)
    expect(previewOf(utf8(text), { headerRow: null }).columns.map(({ name }) => name)).toEqual(['Column 1', 'Column 2'])
    expect(previewOf(utf8(text), { firstDataRow: 11 }).rows[0].rowNumber).toBe(11)
    expect(previewOf(utf8(text), { delimiter: ',' }).layout).toMatchObject({ delimiter: ',' })
    expect(previewOf(utf8(text), { delimiter: ',', decimalMark: ',' }).suggested).toBeNull()
  })
})

describe('the encoding is guessed', () => {
  const text = 'Zeit (s);Verschiebung (″)\r\n' + table(30, (i) => `${comma(i * 2.5)};${comma(swing(i))}`, '\r\n')
  test.each([
    ['utf-8', utf8(text)],
    ['utf-8', utf8(`\ufeff${text}`)],
    ['utf-16le', utf16(text)],
    ['utf-16be', utf16(text, { isBigEndian: true })],
    ['utf-16le', utf16(text, { hasMark: false })],
    ['utf-16be', utf16(text, { isBigEndian: true, hasMark: false })],
  ])('%s', (encoding, bytes) => {
    const preview = previewOf(bytes)
    expect(preview.layout).toMatchObject({ encoding, delimiter: ';', decimalMark: ',', headerRow: 1 })
    expect(preview.columns[0].name).toBe('Zeit')
    expect(preview.columns[1].unitText).toBe('″')
  })

  test('windows-1252: a degree sign that is no valid UTF-8', () => {
    const preview = previewOf(
      latin1('temps (s);angle (\u00b0);d\u00e9calage (px)\n' + table(30, (i) => `${i};${i % 360};${swing(i)}`)),
    )
    expect(preview.layout.encoding).toBe('windows-1252')
    expect(preview.columns.map(({ name, unitText }) => [name, unitText])).toEqual([
      ['temps', 's'],
      ['angle', '°'],
      ['décalage', 'px'],
    ])
  })

  test('a sample that ends inside a character is still UTF-8', () => {
    const head = `t;r\n${'# °\n'.repeat(10)}`
    const text = head + table(60_000, (i) => `${i};${swing(i)};°`)
    for (let pad = 0; pad < 4; pad++) expect(previewOf(utf8('x'.repeat(pad) + text)).layout.encoding).toBe('utf-8')
  })
})

describe('the columns are guessed by name, unit and behaviour', () => {
  test.each([
    [
      'frame counter first',
      'frame,time,ra,snr\n',
      (i: number) => `${i},${i * 2.5},${swing(i)},${30 + (i % 3)}`,
      { time: 1, displacement: 2, declination: null },
    ],
    ['no names, two columns', '', (i: number) => `${i * 2.5},${swing(i)}`, { time: 0, displacement: 1 }],
    ['no names, time last', '', (i: number) => `${swing(i)},${i * 2.5}`, { time: 1, displacement: 0 }],
    [
      'Julian Dates by their size',
      'a,b\n',
      (i: number) => `${(2463000.5 + i * 3e-5).toFixed(8)},${swing(i)}`,
      { time: 0, timeUnit: 'julian-date', displacement: 1 },
    ],
    [
      'ISO stamps by their form',
      'when,offset x\n',
      (i: number) => `2031-11-14T21:03:${String(10 + i)}Z,${swing(i)}`,
      { time: 0, timeUnit: 'iso-8601', displacementUnit: 'px' },
    ],
    [
      'milliseconds by unit',
      'time [ms],ra [px]\n',
      (i: number) => `${i * 2500},${swing(i)}`,
      { timeUnit: 'milliseconds', displacementUnit: 'px' },
    ],
    ['milliseconds by cadence', 'time,ra\n', (i: number) => `${i * 2500},${swing(i)}`, { timeUnit: 'milliseconds' }],
    ['minutes by name', 'minutes,ra\n', (i: number) => `${(i * 2.5) / 60},${swing(i)}`, { timeUnit: 'minutes' }],
    [
      'seconds of right ascension',
      'time (s),RA (s)\n',
      (i: number) => `${i},${swing(i) / 15}`,
      { displacementUnit: 'ra-seconds' },
    ],
    [
      'worm angle in turns',
      'time,ra,worm\n',
      (i: number) => `${i},${swing(i)},${(i / 30).toFixed(4)}`,
      { wormAngle: 2, wormAngleUnit: 'turns' },
    ],
    [
      'date and time of day in two columns',
      'date,time,ra\n',
      (i: number) => `2031-11-14,21:03:${10 + i},${swing(i)}`,
      { time: 1, timeUnit: 'iso-8601', displacement: 2 },
    ],
    [
      'pointing in degrees is no displacement',
      'time,RA (deg),Dec (deg),offset (arcsec)\n',
      (i: number) => `${i},${83.1 + swing(i) / 3600},8.9,${swing(i)}`,
      { displacement: 3, declination: null },
    ],
    [
      'temperature is no displacement',
      'time,temperature,ra\n',
      (i: number) => `${i},${4 + swing(i) / 99},${swing(i)}`,
      { displacement: 2 },
    ],
  ])('%s', (_, head, row, expected) => {
    expect(previewOf(utf8(head + table(31, row))).suggested).toMatchObject(expected)
  })

  test('without evidence the user must choose', () => {
    const text = 'alpha,beta,gamma\n' + table(30, (i) => `${swing(i)},${swing(i + 9)},${swing(i + 4)}`)
    expect(previewOf(utf8(text)).suggested).toBeNull()
  })
})

describe('faults are told before anything is chosen', () => {
  test.each([
    ['empty', utf8('')],
    ['empty', utf8(' \r\n\n\t\n')],
    ['binary', Uint8Array.from([0x1f, 0x8b, 8, 0, 1, 2, 3])],
    ['binary', utf8('SIMPLE  =                    T')],
    ['binary', Uint8Array.from({ length: 500 }, (_, i) => i % 256)],
    ['no-columns', utf8('A letter to the club.\nThe mount runs well, thank you.\n')],
    ['no-columns', utf8(table(40, (i) => String(swing(i))))],
  ])('%s', (code, bytes) => {
    const outcome = previewTable(bytes)
    expect(outcome.ok ? null : outcome.fault.code).toBe(code)
    expect(outcome.ok ? '' : outcome.fault.message).toMatch(/\. (Choose|Save|Check) /)
  })

  test('a gzip archive is named as one', () => {
    const outcome = previewTable(Uint8Array.from([0x1f, 0x8b, 8, 0]))
    expect(outcome.ok ? '' : outcome.fault.message).toContain('gzip archive')
  })

  test('one byte over the limit is too large and says so in bytes; the limit itself is read', () => {
    const text = utf8('time,ra\n' + table(40, (i) => `${i},${swing(i)}`))
    const bytes = new Uint8Array(MAX_FILE_BYTES + 1).fill(10)
    bytes.set(text)
    const outcome = previewTable(bytes)
    expect(outcome.ok ? null : outcome.fault.code).toBe('too-large')
    expect(outcome.ok ? '' : outcome.fault.message).toContain('67\u202f108\u202f865 bytes')
    expect(previewTable(bytes.subarray(0, MAX_FILE_BYTES)).ok).toBe(true)
  })
})

test('random bytes and random table-like text never throw', () => {
  const random = seededRandom(12345)
  const alphabet = '0123456789.,;\t "\'-+eE#%/:TZ\n\r\nabcx°″=()[]'
  for (let round = 0; round < 400; round++) {
    const length = Math.floor(random() * 600)
    const bytes =
      round % 2 === 0
        ? Uint8Array.from({ length }, () => Math.floor(random() * 256))
        : utf8(Array.from({ length }, () => alphabet[Math.floor(random() * alphabet.length)]).join(''))
    const outcome = previewTable(bytes)
    expect(typeof outcome.ok).toBe('boolean')
    if (outcome.ok) expect(outcome.preview.layout.firstDataRow).toBeGreaterThan(0)
  }
})

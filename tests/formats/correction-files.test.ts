import Papa from 'papaparse'
import { describe, expect, test } from 'vitest'
import type { TableResult, TableSettings } from '@/lib/analysis/types'
import { writeCorrectionCsv } from '@/lib/formats/correction-csv'
import { writeCorrectionJson } from '@/lib/formats/correction-json'
import { TABLE_CAUTIONS, type CorrectionSource } from '@/lib/formats/correction-words'

const settings: TableSettings = {
  binCount: 48,
  quantity: 'rate',
  unit: 'arcsec-per-second',
  meaning: 'correction',
  angleDirection: 'increasing',
  origin: { kind: 'index-time', timeSeconds: 12.5 },
  offsetDegrees: 0,
  orders: 'default',
  gain: 1,
  playback: 'held-at-centre',
}

/** Rates of two sinusoids between the nodes of a turn: their sum is zero but for rounding. */
function tableOf(changes: Partial<TableSettings> = {}): TableResult {
  const all = { ...settings, ...changes }
  const n = all.binCount
  const position = (j: number) =>
    -7.35 * Math.cos((2 * Math.PI * j) / n - 0.54) - 1.75 * Math.cos((4 * Math.PI * j) / n - 1.78)
  const values = Array.from({ length: n }, (_, j) =>
    all.quantity === 'position' ? position(j) : ((position(j + 1) - position(j)) * n) / 566.869,
  )
  return {
    bins: values.map((value, index) => ({ index, angleDegrees: (360 * index) / n, value })),
    settings: all,
    orders: [1, 2],
    wormPeriodSeconds: 566.869,
    originTimeSeconds: 12.5,
    closureError: all.quantity === 'position' ? 0 : values.reduce((sum, value) => sum + value, 0),
    largestRateArcsecPerSecond: 0.09,
    rehearsal: {
      orders: [{ order: 1, beforeArcsec: 7.35, afterArcsec: 0.01, isIncluded: true }],
      peakToPeakBeforeArcsec: 16,
      peakToPeakAfterArcsec: 0.5,
      heldOutReduction: null,
      slipForTenPercentDegrees: 5.7,
      slipForNoHelpDegrees: 60,
      binningLossShare: 0.001,
    },
  }
}

const source: CorrectionSource = {
  name: 'Table 3, after the mesh',
  kind: 'stand-alone',
  senseBasis: 'proven',
  runName: '=HYPERLINK("http://invented.example","open")',
  samplesSha256: 'ab'.repeat(32),
  engineVersion: '0.1.0',
}

const parse = (csv: string) => Papa.parse<string[]>(csv, { delimiter: ',', newline: '\r\n' })

describe('CSV', () => {
  test.each([8, 48, 240, 4096])(
    '%i bins: one rectangle of five columns, CR LF after every record, values to the bit',
    (binCount) => {
      const table = tableOf({ binCount })
      const csv = writeCorrectionCsv(table, source)
      expect(csv.endsWith('\r\n')).toBe(true)
      expect(csv.replaceAll('\r\n', '')).not.toMatch(/[\r\n]/)
      const { data, errors } = parse(csv)
      expect(errors).toEqual([])
      expect(data.pop()).toEqual([''])
      expect(data).toHaveLength(binCount + 1)
      expect(new Set(data.map((record) => record.length))).toEqual(new Set([5]))
      expect(data[0]).toEqual(['bin', 'worm angle (deg)', 'value (arcsec/s)', 'about', 'meaning'])
      const rows = data.slice(1)
      expect(rows.map((row) => Number(row[0]))).toEqual(table.bins.map(({ index }) => index))
      expect(rows.map((row) => Number(row[1]))).toEqual(table.bins.map(({ angleDegrees }) => angleDegrees))
      expect(rows.map((row) => Number(row[2]))).toEqual(table.bins.map(({ value }) => value))
      // Rates of a closed curve: n roundings of numbers near 0.1 at most.
      expect(Math.abs(rows.reduce((sum, row) => sum + Number(row[2]), 0))).toBeLessThan(binCount * 0.1 * 2 ** -52)
    },
  )

  test('the meaning stands beside the numbers, all of it even with eight bins', () => {
    const { data } = parse(writeCorrectionCsv(tableOf({ binCount: 8 }), source))
    const notes = new Map(data.slice(1, 9).map((row) => [row[3], row[4]]))
    expect([...notes.keys()]).toEqual([
      'value',
      'worm angle',
      'worm period (s)',
      'bins',
      'harmonics',
      'closure',
      'source',
      'caution',
    ])
    expect(notes.get('value')).toBe(
      'Rate of the axis on top of tracking in arcsec/s: what the axis should do; positive is faster (west).',
    )
    expect(notes.get('worm angle')).toBe(
      'Angle 0 is the index mark, 12.5 s after the first row of the recording. The listed angle grows with time.',
    )
    expect(Number(notes.get('worm period (s)'))).toBe(566.869)
    expect(notes.get('harmonics')).toBe('orders 1 2')
    expect(notes.get('source')).toContain('ab'.repeat(32))
    expect(notes.get('caution')).toBe(TABLE_CAUTIONS.join(' '))
  })

  test('the error, falling angles and an addition are said so', () => {
    const table = tableOf({
      quantity: 'position',
      unit: 'arcsec',
      meaning: 'error',
      angleDirection: 'decreasing',
      offsetDegrees: -30,
    })
    const csv = writeCorrectionCsv(table, { ...source, kind: 'addition', senseBasis: 'assumed' })
    expect(csv).toContain('what the axis does wrong')
    expect(csv).toContain('play it with the opposite sign')
    expect(csv).toContain('falls with time. -30 deg are added')
    expect(csv).toContain('it is no table of its own')
    expect(csv).toContain('only assumed')
  })

  test.each(['=1+2', '+1', '-1', '@SUM(A1)', '\t=1', '\r=1', '  =1', '＝1'])(
    'text that a spreadsheet would run gets an apostrophe: %o',
    (name) => {
      const { data } = parse(writeCorrectionCsv(tableOf(), { ...source, name }))
      const cells = data.flat().filter((cell) => cell !== '' && Number.isNaN(Number(cell)))
      expect(cells.filter((cell) => /^[\s]*[=+\-@＝]/.test(cell))).toEqual([])
      expect(cells.some((cell) => cell.startsWith(`'${name}`))).toBe(true)
    },
  )

  test('quotes, commas and line ends in a name stay inside their cell', () => {
    const name = 'Mira\'s "best", on\r\ntwo lines'
    const { data } = parse(writeCorrectionCsv(tableOf(), { ...source, name }))
    expect(data[7][4].startsWith(name)).toBe(true)
  })

  test('a number that is not finite is refused, minus zero is zero', () => {
    const table = tableOf({ binCount: 8 })
    table.bins[0].value = -0
    expect(parse(writeCorrectionCsv(table, source)).data[1][2]).toBe('0')
    table.bins[0].value = NaN
    expect(() => writeCorrectionCsv(table, source)).toThrow(RangeError)
  })
})

describe('JSON', () => {
  test('values to the bit, closing, with units, words, origin, cautions and source', () => {
    const table = tableOf()
    const document = JSON.parse(writeCorrectionJson(table, source))
    expect(document.bins.map((bin: { value: number }) => bin.value)).toEqual(table.bins.map(({ value }) => value))
    expect(document.bins.map((bin: { wormAngle: number }) => bin.wormAngle)).toEqual(
      table.bins.map(({ angleDegrees }) => angleDegrees),
    )
    expect(Math.abs(document.bins.reduce((sum: number, bin: { value: number }) => sum + bin.value, 0))).toBeLessThan(
      48 * 0.1 * 2 ** -52,
    )
    expect(document).toMatchObject({
      format: 'turnwright-correction-table',
      version: 1,
      use: { kind: 'stand-alone', senseBasis: 'proven' },
      value: { quantity: 'rate', unit: 'arcsec/s', meaning: 'correction' },
      wormAngle: {
        unit: 'deg',
        direction: 'increasing',
        origin: settings.origin,
        originTime: { value: 12.5, unit: 's' },
      },
      wormPeriod: { value: 566.869, unit: 's' },
      harmonics: { orders: [1, 2], amplitudes: [{ order: 1, before: { value: 7.35, unit: 'arcsec' } }] },
      closure: { unit: 'arcsec/s' },
      cautions: [...TABLE_CAUTIONS],
      source: { samplesSha256: 'ab'.repeat(32), engineVersion: '0.1.0' },
    })
    expect(document.value.inWords).toContain('what the axis should do')
    expect(document.closure.value).toBe(table.closureError)
  })

  test('a stored table without its rehearsal is written without it', () => {
    const { bins, settings: stored, orders, wormPeriodSeconds, originTimeSeconds, closureError } = tableOf()
    const text = writeCorrectionJson(
      { bins, settings: stored, orders, wormPeriodSeconds, originTimeSeconds, closureError },
      source,
    )
    expect(JSON.parse(text)).not.toHaveProperty('rehearsal')
    expect(JSON.parse(text)).not.toHaveProperty('largestRate')
  })
})

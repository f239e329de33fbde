import type { Conversion } from '@/lib/analysis/types'
import type { SimulatedRun } from './simulate-run'

/** How a simulated run is written as text: nobody's layout but ours, in the varieties that people's files come in. */
export interface FileLayout {
  delimiter: ',' | ';' | '\t' | ' '
  decimalMark: '.' | ','
  timeUnit: 'seconds' | 'milliseconds' | 'minutes' | 'iso-8601' | 'julian-date'
  /** Instant of the start of the simulation in ms since 1970 (UTC); needed for ISO 8601 and Julian Dates. */
  startedAtMs: number | null
  /** Lines above the table, as they are. */
  preamble: string[]
  hasHeader: boolean
  hasUnits: boolean
  displacementDecimals: number
  lineEnd: '\n' | '\r\n'
}

/** The same shape as ImportSettings of lib/formats: how to read what was written. */
export interface WrittenImport {
  version: 1
  layout: {
    encoding: 'utf-8'
    delimiter: FileLayout['delimiter']
    decimalMark: FileLayout['decimalMark']
    headerRow: number | null
    unitsRow: number | null
    firstDataRow: number
  }
  columns: {
    time: number
    timeUnit: FileLayout['timeUnit']
    displacement: number
    displacementUnit: Conversion['displacementUnit']
    declination: number | null
    wormAngle: number | null
    wormAngleUnit: 'degrees'
  }
}

export interface SimulatedFile {
  text: string
  importSettings: WrittenImport
}

/** Milliseconds of Julian Date 0 before 1970: 1970 January 1.0 UTC is JD 2440587.5. */
const JULIAN_DATE_OF_1970 = 2440587.5
const MS_PER_DAY = 86_400_000

/** Comma and point, header row, seconds; changed by what is given. */
export function fileLayout(given: Partial<FileLayout> = {}): FileLayout {
  return {
    delimiter: ',',
    decimalMark: '.',
    timeUnit: 'seconds',
    startedAtMs: null,
    preamble: [],
    hasHeader: true,
    hasUnits: false,
    displacementDecimals: 3,
    lineEnd: '\n',
    ...given,
  }
}

/**
 * Writes a simulated run as delimited text: time, right ascension, then declination and worm angle where the run has
 * them. A missing displacement is an empty cell.
 *
 * @throws {RangeError} when decimal mark and delimiter are the same, or an absolute time is asked for without a start
 */
export function simulateFile(run: SimulatedRun, layout: FileLayout): SimulatedFile {
  const { delimiter, decimalMark, timeUnit, startedAtMs, preamble, displacementDecimals } = layout
  if (delimiter === decimalMark) throw new RangeError(`delimiter must differ from decimalMark: got ${delimiter} twice`)
  if (startedAtMs === null && (timeUnit === 'iso-8601' || timeUnit === 'julian-date')) {
    throw new RangeError(`startedAtMs must be given for ${timeUnit}`)
  }
  const { timeSeconds, displacement, declinationDisplacement, wormAngleDegrees } = run.columns
  const unit = run.truth.options.conversion.displacementUnit
  const unitText = { px: 'px', arcsec: 'arcsec', 'ra-seconds': 's' }[unit]
  const number = (value: number, decimals: number) => writtenNumber(value, decimals, decimalMark)
  const firstRowMs = (startedAtMs ?? 0) + run.truth.firstRowSeconds * 1000

  const table: { name: string; unit: string; cell: (row: number) => string }[] = [
    {
      name: 'Time',
      unit: { seconds: 's', milliseconds: 'ms', minutes: 'min', 'iso-8601': 'UTC', 'julian-date': 'JD' }[timeUnit],
      cell: (row) => writtenTime(timeSeconds[row], firstRowMs, layout),
    },
    { name: 'RA displacement', unit: unitText, cell: (row) => number(displacement[row], displacementDecimals) },
  ]
  if (declinationDisplacement) {
    const cell = (row: number) => number(declinationDisplacement[row], displacementDecimals)
    table.push({ name: 'Dec displacement', unit: unitText, cell })
  }
  const wormAngle = wormAngleDegrees ? table.length : null
  if (wormAngleDegrees) table.push({ name: 'Worm angle', unit: 'deg', cell: (row) => number(wormAngleDegrees[row], 2) })

  const lines = [...preamble]
  const headerRow = layout.hasHeader ? lines.push(table.map(({ name }) => name).join(delimiter)) : null
  const unitsRow = layout.hasUnits ? lines.push(table.map((column) => column.unit).join(delimiter)) : null
  const firstDataRow = lines.length + 1
  for (let row = 0; row < timeSeconds.length; row++) lines.push(table.map(({ cell }) => cell(row)).join(delimiter))
  return {
    text: lines.join(layout.lineEnd) + layout.lineEnd,
    importSettings: {
      version: 1,
      layout: { encoding: 'utf-8', delimiter, decimalMark, headerRow, unitsRow, firstDataRow },
      columns: {
        time: 0,
        timeUnit,
        displacement: 1,
        displacementUnit: unit,
        declination: declinationDisplacement ? 2 : null,
        wormAngle,
        wormAngleUnit: 'degrees',
      },
    },
  }
}

function writtenTime(seconds: number, firstRowMs: number, { timeUnit, decimalMark }: FileLayout): string {
  switch (timeUnit) {
    case 'seconds':
      return writtenNumber(seconds, 3, decimalMark)
    case 'milliseconds':
      return writtenNumber(seconds * 1000, 0, decimalMark)
    case 'minutes':
      return writtenNumber(seconds / 60, 5, decimalMark)
    case 'iso-8601':
      return new Date(Math.round(firstRowMs + seconds * 1000)).toISOString()
    case 'julian-date':
      return writtenNumber((firstRowMs + seconds * 1000) / MS_PER_DAY + JULIAN_DATE_OF_1970, 8, decimalMark)
  }
}

function writtenNumber(value: number, decimals: number, decimalMark: '.' | ','): string {
  if (!Number.isFinite(value)) return ''
  const text = value.toFixed(decimals)
  const unsigned = /^-[0.]*$/.test(text) ? text.slice(1) : text
  return decimalMark === ',' ? unsigned.replace('.', ',') : unsigned
}

import type { ImportFault } from './types'
import { MAX_BAD_ROW_SHARE, MAX_FILE_BYTES, MIN_ROW_COUNT } from './limits'
import { formatBytes, formatCount, formatPercent } from '@/lib/units'

/** A cell that could not be read, and where it stands. */
export interface BadCell {
  row: number
  column: string
  text: string
}

function fault(code: ImportFault['code'], message: string, place: { row?: number; column?: string } = {}): ImportFault {
  return { code, message, row: place.row ?? null, column: place.column ?? null }
}

export function emptyFault(): ImportFault {
  return fault('empty', 'The file is empty. Choose the file that holds the recording, or record again.')
}

export function tooLargeFault(byteLength: number): ImportFault {
  // A file one byte over the limit must not be said to have "64 MB".
  const size = byteLength < 1.02 * MAX_FILE_BYTES ? `${formatCount(byteLength)} bytes` : formatBytes(byteLength)
  return fault(
    'too-large',
    `The file has ${size}; at most ${formatBytes(MAX_FILE_BYTES)} (${formatCount(MAX_FILE_BYTES)} bytes) are read. ` +
      'Cut it into shorter runs, or leave out columns that are not needed.',
  )
}

/** @param kind what the file is, with its article ("a gzip archive"), or null when it is not recognised */
export function binaryFault(kind: string | null): ImportFault {
  const what =
    kind === null ? 'The file is not text: it holds bytes that no text has.' : `The file is ${kind}, not text.`
  return fault(
    'binary',
    `${what} Save the recording as a table of text (CSV or columns parted by blanks) and choose that file.`,
  )
}

export function noColumnsFault(): ImportFault {
  return fault(
    'no-columns',
    'No table of numbers was found: a run needs at least two columns, time and displacement, with one row per sample. ' +
      'Check that this is the right file and that its columns are parted by commas, semicolons, tabs or blanks.',
  )
}

export function columnMissingFault(column: { role: string; number: number }, columnCount: number): ImportFault {
  const found = columnCount === 1 ? 'only one column' : `only ${columnCount} columns`
  return fault(
    'column-missing',
    `Column ${column.number} was chosen for ${column.role}, but the rows have ${found}. ` +
      'Choose another column, or correct the delimiter.',
    { column: `Column ${column.number}` },
  )
}

export function notANumberFault(cell: BadCell): ImportFault {
  return fault(
    'not-a-number',
    `Row ${cell.row}, ${quote(cell.column)}: ${quote(cell.text)} is not a number, and no row of this column could be read. ` +
      'Choose another column, or correct the decimal mark, the delimiter or the first data row.',
    cell,
  )
}

export function badTimeFault(cell: BadCell, unit: string): ImportFault {
  return fault(
    'bad-time',
    `Row ${cell.row}, ${quote(cell.column)}: ${quote(cell.text)} cannot be read as time in ${unit}, and neither could any other row. ` +
      'Choose another time unit or another column for time.',
    cell,
  )
}

export function timeGoesBackFault(cell: BadCell, previousText: string): ImportFault {
  return fault(
    'time-goes-back',
    `Row ${cell.row}, ${quote(cell.column)}: time goes back from ${quote(previousText)} to ${quote(cell.text)}. ` +
      'Sort the rows by time, or, where a second recording begins there, cut the file into one file per run.',
    cell,
  )
}

export function fewRowsFault(rowCount: number): ImportFault {
  const had =
    rowCount === 0
      ? 'No row with a time and a displacement was found'
      : `Only ${rowCount} usable ${rowCount === 1 ? 'row was' : 'rows were'} found`
  return fault(
    'few-rows',
    `${had}; at least ${MIN_ROW_COUNT} are needed. Choose a longer recording, or correct the first data row.`,
  )
}

export function constantFault(column: string, value: string): ImportFault {
  return fault(
    'constant',
    `${quote(column)} holds ${quote(value)} in every row, so there is no motion to analyse. Choose another column for the displacement.`,
    { column },
  )
}

export function tooManyFaultsFault(cell: BadCell, counts: { bad: number; all: number }): ImportFault {
  return fault(
    'too-many-faults',
    `${formatCount(counts.bad)} of ${formatCount(counts.all)} rows could not be read (at most ${formatPercent(MAX_BAD_ROW_SHARE)} are passed over); ` +
      `the first is row ${cell.row}, ${quote(cell.column)}: ${quote(cell.text)}. ` +
      'Correct the delimiter, the decimal mark or the choice of columns, or mend these rows.',
    cell,
  )
}

function quote(text: string): string {
  const clean = text.replace(/[\p{Cc}\p{Cf}]/gu, '\ufffd')
  return `“${clean.length > 40 ? `${clean.slice(0, 39)}…` : clean}”`
}

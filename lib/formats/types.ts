import type { RunColumns } from '@/lib/analysis/types'

/** How the text of a file is laid out; every field can be corrected by the user. */
export interface TextLayout {
  encoding: 'utf-8' | 'utf-16le' | 'utf-16be' | 'windows-1252'
  delimiter: ',' | ';' | '\t' | ' '
  decimalMark: '.' | ','
  /** Row numbers count every line of the file from 1, as a text editor does; null where there is no such row. */
  headerRow: number | null
  unitsRow: number | null
  firstDataRow: number
}

export type TimeUnit = 'seconds' | 'milliseconds' | 'minutes' | 'iso-8601' | 'julian-date'
export type DisplacementUnit = 'px' | 'arcsec' | 'ra-seconds'
export type WormAngleUnit = 'degrees' | 'turns'

/** Which column is what; columns count from 0. */
export interface ColumnChoice {
  time: number
  timeUnit: TimeUnit
  displacement: number
  displacementUnit: DisplacementUnit
  declination: number | null
  wormAngle: number | null
  wormAngleUnit: WormAngleUnit
}

export interface ImportSettings {
  version: 1
  layout: TextLayout
  columns: ColumnChoice
}

export interface PreviewColumn {
  index: number
  /** From the header row, else "Column 3". */
  name: string
  unitText: string | null
  /** What the column may be, by its name, unit and numbers; null when it looks like nothing we read. */
  guess: 'time' | 'displacement' | 'declination' | 'worm-angle' | null
  /** Its likely unit, should it be taken for that. */
  unitIf: { time: TimeUnit; displacement: DisplacementUnit; wormAngle: WormAngleUnit }
  isNumeric: boolean
  smallest: number | null
  largest: number | null
}

/** What is shown before a file is read in full. */
export interface TablePreview {
  layout: TextLayout
  columns: PreviewColumn[]
  /** The first data rows as text (at most 12), each with the row number in the file. */
  rows: { rowNumber: number; cells: string[] }[]
  /** Lines above the data that are neither header nor units. */
  preamble: string[]
  /** `key = value` and `key: value` pairs found there. */
  metadata: Record<string, string>
  estimatedRowCount: number
  byteLength: number
  /** A complete choice when the columns could be guessed, else null: the user must choose. */
  suggested: ColumnChoice | null
}

/** One fault in a file, told so that a person can mend it. */
export interface ImportFault {
  code:
    | 'empty'
    | 'binary'
    | 'too-large'
    | 'no-columns'
    | 'column-missing'
    | 'not-a-number'
    | 'bad-time'
    | 'time-goes-back'
    | 'few-rows'
    | 'constant'
    | 'too-many-faults'
  /** What happened, where, and what to do next; complete sentences. */
  message: string
  row: number | null
  column: string | null
}

export interface ParsedRun {
  ok: true
  columns: RunColumns
  /** Absolute time of the first row in ms since 1970 (UTC); null where the file holds none. */
  startedAtMs: number | null
  rowCount: number
  /** Rows passed over, with the reason and the first few row numbers. */
  skipped: { reason: 'missing' | 'not-a-number' | 'comment' | 'repeated-time'; count: number; firstRows: number[] }[]
}

export type ImportOutcome = ParsedRun | { ok: false; fault: ImportFault }
export type PreviewOutcome = { ok: true; preview: TablePreview } | { ok: false; fault: ImportFault }

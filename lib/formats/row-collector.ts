import * as faults from './faults'
import { MAX_BAD_ROW_SHARE, MIN_ROW_COUNT } from './limits'
import { isMissingCell, scanNumber } from './number-scanner'
import { type TimeStamp, millisecondsOf, scanIsoStamp, scanJulianDate, secondsBetween } from './time-stamps'
import type { ImportFault, ImportOutcome, ImportSettings, ParsedRun } from './types'

/** The cells of one row as spans of bytes; valid until the next row is scanned. */
export interface CellSpans {
  bytes: Uint8Array
  starts: Int32Array
  ends: Int32Array
  cellCount: number
}

type SkipReason = ParsedRun['skipped'][number]['reason']

const SECONDS_PER_UNIT = { seconds: 1, milliseconds: 0.001, minutes: 60 } as const
const FIRST_ROWS_KEPT = 5
const HALF_DAY_SECONDS = 43_200
const TIME_UNIT_WORDS = {
  seconds: 'seconds',
  milliseconds: 'milliseconds',
  minutes: 'minutes',
  'iso-8601': 'ISO 8601 date and time',
  'julian-date': 'Julian Date',
} as const

/** Clock times between 1990 and 2100 in seconds are taken for seconds since 1970 (POSIX), likewise in milliseconds. */
const POSIX_RANGE_SECONDS = [631_152_000, 4_102_444_800] as const

/**
 * Turns rows of cells into the columns of a run, and keeps account of the rows that are passed over.
 *
 * A row without a time is left out; a row without a displacement stays with NaN, for the analysis to count. A row whose
 * time or displacement is no number is left out and counted. Bad rows after the last good one are notes, not faults.
 */
export class RowCollector {
  private readonly columns: ImportSettings['columns']
  private readonly decimalMark: number
  private readonly nameOfColumn: (index: number) => string
  private time: Float64Array
  private displacement: Float64Array
  private declination: Float64Array | null
  private wormAngle: Float64Array | null
  private count = 0
  private finiteCount = 0
  private isConstant = true
  private firstDisplacement = NaN
  private firstDisplacementText = ''
  private firstStamp: TimeStamp | null = null
  private firstTimeValue = 0
  private lastTimeStart = 0
  private lastTimeEnd = 0
  private midnightSeconds = 0
  private widestRow = 0
  private badCount = 0
  private firstBad: { cell: faults.BadCell; isTime: boolean } | null = null
  private trailingBad: { rows: number[]; count: number; firstBad: { cell: faults.BadCell; isTime: boolean } } | null =
    null
  private readonly skipped = new Map<SkipReason, { count: number; firstRows: number[] }>()

  constructor(
    settings: ImportSettings,
    { capacity, nameOfColumn }: { capacity: number; nameOfColumn: (index: number) => string },
  ) {
    this.columns = settings.columns
    this.decimalMark = settings.layout.decimalMark === ',' ? 44 : 46
    this.nameOfColumn = nameOfColumn
    this.time = new Float64Array(capacity)
    this.displacement = new Float64Array(capacity)
    this.declination = settings.columns.declination === null ? null : new Float64Array(capacity)
    this.wormAngle = settings.columns.wormAngle === null ? null : new Float64Array(capacity)
  }

  takeComment(rowNumber: number): void {
    this.skip('comment', rowNumber)
  }

  /** Takes one row; a fault ends the reading. */
  takeRow(cells: CellSpans, rowNumber: number): ImportFault | null {
    if (cells.cellCount > this.widestRow) this.widestRow = cells.cellCount
    const { time, displacement } = this.columns
    const seconds = this.timeOf(cells, time)
    if (Number.isNaN(seconds)) {
      if (this.isMissing(cells, time)) this.skip('missing', rowNumber)
      else this.takeBadCell(cells, { column: time, rowNumber, isTime: true })
      return null
    }
    const value = this.numberAt(cells, displacement)
    if (Number.isNaN(value) && !this.isMissing(cells, displacement)) {
      this.takeBadCell(cells, { column: displacement, rowNumber, isTime: false })
      return null
    }
    return this.append(cells, { seconds, displacement: value, rowNumber })
  }

  private append(
    cells: CellSpans,
    row: { seconds: number; displacement: number; rowNumber: number },
  ): ImportFault | null {
    const { time, declination, wormAngle, wormAngleUnit } = this.columns
    let seconds = row.seconds + this.midnightSeconds
    if (this.count > 0) {
      const last = this.time[this.count - 1]
      if (seconds < last && this.firstStamp?.hasDate === false && last - seconds > HALF_DAY_SECONDS) {
        this.midnightSeconds += 2 * HALF_DAY_SECONDS
        seconds += 2 * HALF_DAY_SECONDS
      }
      if (seconds < last) {
        const previous = textOf(cells.bytes, this.lastTimeStart, this.lastTimeEnd)
        return faults.timeGoesBackFault(this.badCell(cells, time, row.rowNumber), previous)
      }
      if (seconds === last) {
        this.skip('repeated-time', row.rowNumber)
        return null
      }
    }
    if (this.trailingBad) this.settleBadRows('not-a-number')
    if (this.count === this.time.length) this.grow()
    this.time[this.count] = seconds
    this.displacement[this.count] = row.displacement
    if (declination !== null && this.declination) this.declination[this.count] = this.numberAt(cells, declination)
    if (wormAngle !== null && this.wormAngle) {
      this.wormAngle[this.count] = this.numberAt(cells, wormAngle) * (wormAngleUnit === 'turns' ? 360 : 1)
    }
    this.count++
    this.lastTimeStart = cells.starts[time]
    this.lastTimeEnd = cells.ends[time]
    this.watchDisplacement(cells, row.displacement)
    return null
  }

  /** The run, or why there is none. */
  finish(): ImportOutcome {
    const missingColumn = this.missingColumn()
    if (missingColumn) return { ok: false, fault: faults.columnMissingFault(missingColumn, this.widestRow) }
    const notesLimit = Math.max(MIN_ROW_COUNT, MAX_BAD_ROW_SHARE * this.count)
    if (this.trailingBad) {
      this.settleBadRows(this.count > 0 && this.trailingBad.count <= notesLimit ? 'comment' : 'not-a-number')
    }
    if (this.firstBad && this.count === 0) {
      const { cell, isTime } = this.firstBad
      return { ok: false, fault: isTime ? this.badTime(cell) : faults.notANumberFault(cell) }
    }
    const all = this.count + this.badCount
    if (this.firstBad && this.badCount > MAX_BAD_ROW_SHARE * all) {
      return { ok: false, fault: faults.tooManyFaultsFault(this.firstBad.cell, { bad: this.badCount, all }) }
    }
    if (this.finiteCount < MIN_ROW_COUNT) return { ok: false, fault: faults.fewRowsFault(this.finiteCount) }
    if (this.isConstant) {
      const name = this.nameOfColumn(this.columns.displacement)
      return { ok: false, fault: faults.constantFault(name, this.firstDisplacementText) }
    }
    return {
      ok: true,
      columns: {
        timeSeconds: this.time.slice(0, this.count),
        displacement: this.displacement.slice(0, this.count),
        declinationDisplacement: this.declination?.slice(0, this.count) ?? null,
        wormAngleDegrees: this.wormAngle?.slice(0, this.count) ?? null,
      },
      startedAtMs: this.startedAtMs(),
      rowCount: this.count,
      skipped: [...this.skipped].map(([reason, { count, firstRows }]) => ({ reason, count, firstRows })),
    }
  }

  /** Seconds since the first stamp that was read, NaN where the cell holds no time. */
  private timeOf(cells: CellSpans, column: number): number {
    if (column >= cells.cellCount) return NaN
    const start = cells.starts[column]
    const end = cells.ends[column]
    const unit = this.columns.timeUnit
    if (unit === 'iso-8601' || unit === 'julian-date') {
      const stamp =
        unit === 'iso-8601'
          ? scanIsoStamp(cells.bytes, start, end)
          : scanJulianDate(cells.bytes, { start, end, decimalMark: this.decimalMark })
      if (stamp === null || (this.count > 0 && this.firstStamp?.hasDate !== stamp.hasDate)) return NaN
      if (this.count === 0) this.firstStamp = stamp
      return this.firstStamp ? secondsBetween(this.firstStamp, stamp) : NaN
    }
    const value = scanNumber(cells.bytes, start, end, this.decimalMark)
    if (Number.isNaN(value)) return NaN
    if (this.count === 0) this.firstTimeValue = value
    const difference = value - this.firstTimeValue
    return unit === 'milliseconds' ? difference / 1000 : difference * SECONDS_PER_UNIT[unit]
  }

  private numberAt({ bytes, starts, ends, cellCount }: CellSpans, column: number): number {
    return column < cellCount ? scanNumber(bytes, starts[column], ends[column], this.decimalMark) : NaN
  }

  private isMissing({ bytes, starts, ends, cellCount }: CellSpans, column: number): boolean {
    return column >= cellCount || isMissingCell(bytes, starts[column], ends[column])
  }

  private watchDisplacement(cells: CellSpans, value: number): void {
    if (Number.isNaN(value)) return
    if (this.finiteCount === 0) {
      this.firstDisplacement = value
      const column = this.columns.displacement
      this.firstDisplacementText = textOf(cells.bytes, cells.starts[column], cells.ends[column])
    } else if (value !== this.firstDisplacement) this.isConstant = false
    this.finiteCount++
  }

  private takeBadCell(cells: CellSpans, at: { column: number; rowNumber: number; isTime: boolean }): void {
    if (this.trailingBad === null) {
      const firstBad = { cell: this.badCell(cells, at.column, at.rowNumber), isTime: at.isTime }
      this.trailingBad = { rows: [], count: 0, firstBad }
    }
    this.trailingBad.count++
    if (this.trailingBad.rows.length < FIRST_ROWS_KEPT) this.trailingBad.rows.push(at.rowNumber)
  }

  private settleBadRows(reason: 'not-a-number' | 'comment'): void {
    if (this.trailingBad === null) return
    const { rows, count, firstBad } = this.trailingBad
    rows.forEach((row) => this.skip(reason, row))
    const entry = this.skipped.get(reason)
    if (entry) entry.count += count - rows.length
    if (reason === 'not-a-number') {
      this.badCount += count
      this.firstBad ??= firstBad
    }
    this.trailingBad = null
  }

  private badCell(cells: CellSpans, column: number, row: number): faults.BadCell {
    const text = textOf(cells.bytes, cells.starts[column], cells.ends[column])
    return { row, column: this.nameOfColumn(column), text }
  }

  private badTime(cell: faults.BadCell): ImportFault {
    return faults.badTimeFault(cell, TIME_UNIT_WORDS[this.columns.timeUnit])
  }

  private missingColumn(): { role: string; number: number } | null {
    if (this.widestRow === 0) return null
    const { time, displacement, declination, wormAngle } = this.columns
    const roles = { time, displacement, declination, 'the worm angle': wormAngle }
    const missing = Object.entries(roles).find(([, index]) => index !== null && index >= this.widestRow)
    return missing ? { role: missing[0], number: Number(missing[1]) + 1 } : null
  }

  private startedAtMs(): number | null {
    if (this.firstStamp) return millisecondsOf(this.firstStamp)
    const { timeUnit } = this.columns
    if (timeUnit !== 'seconds' && timeUnit !== 'milliseconds') return null
    const milliseconds = timeUnit === 'seconds' ? this.firstTimeValue * 1000 : this.firstTimeValue
    const [earliest, latest] = POSIX_RANGE_SECONDS
    return milliseconds >= earliest * 1000 && milliseconds < latest * 1000 ? Math.floor(milliseconds + 0.5) : null
  }

  private skip(reason: SkipReason, rowNumber: number): void {
    const entry = this.skipped.get(reason)
    if (entry === undefined) this.skipped.set(reason, { count: 1, firstRows: [rowNumber] })
    else {
      entry.count++
      if (entry.firstRows.length < FIRST_ROWS_KEPT) entry.firstRows.push(rowNumber)
    }
  }

  private grow(): void {
    const larger = (old: Float64Array) => {
      const next = new Float64Array(Math.max(1024, old.length * 2))
      next.set(old)
      return next
    }
    this.time = larger(this.time)
    this.displacement = larger(this.displacement)
    if (this.declination) this.declination = larger(this.declination)
    if (this.wormAngle) this.wormAngle = larger(this.wormAngle)
  }
}

function textOf(bytes: Uint8Array, start: number, end: number): string {
  return new TextDecoder().decode(bytes.subarray(start, Math.min(end, start + 200)))
}

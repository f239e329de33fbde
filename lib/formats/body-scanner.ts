import type { CellSpans } from './row-collector'
import { MAX_COLUMN_COUNT } from './limits'
import type { TextLayout } from './types'

export type LineKind = 'row' | 'comment' | 'blank' | 'end'

const [TAB, LINE_FEED, CARRIAGE_RETURN, BLANK, QUOTE] = [9, 10, 13, 32, 34]
/** A quoted cell that is still open after so many lines was never meant as one: its quote is then an ordinary sign. */
const MAX_LINES_IN_CELL = 20

/**
 * Walks the lines of a delimited text as bytes and cuts them into cells, without making strings.
 *
 * Cells may be quoted as in RFC 4180 (a delimiter or line end inside belongs to the cell); their outer quotes are left out.
 * With a blank as delimiter any run of blanks and tabs parts two cells. Lines end with LF, CR LF or CR.
 */
export class BodyScanner implements CellSpans {
  readonly bytes: Uint8Array
  readonly starts = new Int32Array(MAX_COLUMN_COUNT)
  readonly ends = new Int32Array(MAX_COLUMN_COUNT)
  cellCount = 0
  /** Place of the next line, and its number counted from 1. */
  position = 0
  nextRow = 1
  /** Number of the line that `next` has just read. */
  rowNumber = 0
  private readonly delimiter: number
  private readonly isBlankDelimited: boolean

  constructor(bytes: Uint8Array, delimiter: TextLayout['delimiter']) {
    this.bytes = bytes
    this.delimiter = delimiter.charCodeAt(0)
    this.isBlankDelimited = delimiter === ' '
  }

  /** Passes over whole lines until the next one is `row`. */
  skipTo(row: number): void {
    while (this.nextRow < row && this.position < this.bytes.length) this.endLine(this.lineEnd(this.position))
  }

  /** Reads one line; after 'row' its cells stand in starts and ends. */
  next(): LineKind {
    const { bytes } = this
    if (this.position >= bytes.length) return 'end'
    this.rowNumber = this.nextRow
    let at = this.position
    while (at < bytes.length && (bytes[at] === BLANK || (bytes[at] === TAB && this.delimiter !== TAB))) at++
    if (at >= bytes.length || bytes[at] === LINE_FEED || bytes[at] === CARRIAGE_RETURN) {
      this.endLine(at)
      return 'blank'
    }
    if (this.isCommentAt(at)) {
      this.endLine(this.lineEnd(at))
      return 'comment'
    }
    this.scanCells(at)
    return 'row'
  }

  private isCommentAt(at: number): boolean {
    const byte = this.bytes[at]
    if (byte === 35 || byte === 37 || byte === 33) return true // # % !
    if (byte === 59) return this.delimiter !== 59 // ;
    return byte === 47 && this.bytes[at + 1] === 47 // two slashes
  }

  private scanCells(lineStart: number): void {
    const { bytes, delimiter, isBlankDelimited } = this
    const length = bytes.length
    let at = lineStart
    let count = 0
    for (;;) {
      while (at < length && (bytes[at] === BLANK || (bytes[at] === TAB && delimiter !== TAB))) at++
      if (isBlankDelimited && count > 0 && (at >= length || bytes[at] === LINE_FEED || bytes[at] === CARRIAGE_RETURN))
        break
      let start = at
      let end = bytes[at] === QUOTE ? this.closingQuote(at + 1) : -1
      if (end >= 0) {
        start = at + 1
        at = end + 1
        while (at < length && (bytes[at] === BLANK || (bytes[at] === TAB && delimiter !== TAB))) at++
      } else {
        while (at < length) {
          const byte = bytes[at]
          if (
            byte === delimiter ||
            byte === LINE_FEED ||
            byte === CARRIAGE_RETURN ||
            (isBlankDelimited && byte === TAB)
          )
            break
          at++
        }
        end = at
      }
      while (end > start && (bytes[end - 1] === BLANK || bytes[end - 1] === TAB)) end--
      while (start < end && (bytes[start] === BLANK || bytes[start] === TAB)) start++
      if (count < MAX_COLUMN_COUNT) {
        this.starts[count] = start
        this.ends[count] = end
        count++
      }
      if (isBlankDelimited) {
        if (at >= length || bytes[at] === LINE_FEED || bytes[at] === CARRIAGE_RETURN) break
      } else {
        // Text between a closing quote and the delimiter belongs to no cell.
        while (at < length && bytes[at] !== delimiter && bytes[at] !== LINE_FEED && bytes[at] !== CARRIAGE_RETURN) at++
        if (at >= length || bytes[at] !== delimiter) break
        at++
      }
    }
    this.cellCount = count
    this.endLine(at)
  }

  /** Place of the quote that closes a cell, or −1; line ends inside are counted. A doubled quote stands for one. */
  private closingQuote(from: number): number {
    const { bytes } = this
    let lines = 0
    for (let at = from; at < bytes.length; at++) {
      const byte = bytes[at]
      if (byte === QUOTE) {
        if (bytes[at + 1] === QUOTE) at++
        else {
          this.nextRow += lines
          return at
        }
      } else if (byte === LINE_FEED || (byte === CARRIAGE_RETURN && bytes[at + 1] !== LINE_FEED)) {
        if (++lines > MAX_LINES_IN_CELL) return -1
      }
    }
    return -1
  }

  private lineEnd(from: number): number {
    const { bytes } = this
    let at = from
    while (at < bytes.length && bytes[at] !== LINE_FEED && bytes[at] !== CARRIAGE_RETURN) at++
    return at
  }

  /** Steps over the line end at `at`. */
  private endLine(at: number): void {
    const isPair = this.bytes[at] === CARRIAGE_RETURN && this.bytes[at + 1] === LINE_FEED
    this.position = at + (isPair ? 2 : 1)
    this.nextRow++
  }
}

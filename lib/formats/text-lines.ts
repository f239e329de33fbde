import Papa from 'papaparse'
import { MAX_COLUMN_COUNT } from './limits'
import { SAMPLE_BYTES, decodeText } from './text-encoding'
import type { TextLayout } from './types'

/** One record of the text: usually a line, several where a quoted cell holds line ends. */
export interface TextLine {
  /** Number of its first line, counted from 1. */
  rowNumber: number
  text: string
}

const MAX_LINES_IN_CELL = 20
const COMMENT_MARK = /^\s*(#+|%+|!+|;+|\/\/+)\s*/

/** Lines of the file's first part; a cut-off last line is left out. Numbers count every line, as a text editor does. */
export function sampleLines(bytes: Uint8Array, encoding: TextLayout['encoding']): TextLine[] {
  const text = decodeText(bytes.subarray(0, SAMPLE_BYTES), encoding)
  const physical = text.split(/\r\n|\n|\r/)
  if (bytes.length > SAMPLE_BYTES && physical.length > 1) physical.pop()
  const lines: TextLine[] = []
  for (let i = 0; i < physical.length;) {
    const span = linesOfRecord(physical, i)
    lines.push({ rowNumber: i + 1, text: physical.slice(i, i + span).join('\n') })
    i += span
  }
  return lines
}

/** Whether the line is a comment where data are expected; a semicolon marks one unless it parts the columns. */
export function isCommentLine(text: string, delimiter: string): boolean {
  const mark = COMMENT_MARK.exec(text)
  return mark !== null && !(mark[1].startsWith(';') && delimiter === ';')
}

export function withoutCommentMark(text: string): string {
  return text.replace(COMMENT_MARK, '')
}

/** The line's cells, without outer quotes and blanks; with a blank as delimiter, runs of blanks and tabs part them. */
export function splitLine(text: string, delimiter: TextLayout['delimiter']): string[] {
  if (delimiter === ' ')
    return (
      text
        .match(/"[^"]*"|\S+/g)
        ?.map((cell) => cell.replace(/^"(.*)"$/s, '$1').trim())
        .slice(0, MAX_COLUMN_COUNT) ?? []
    )
  const cells = text.includes('"')
    ? (Papa.parse<string[]>(tidyQuotes(text, delimiter), { delimiter }).data[0] ?? [])
    : text.split(delimiter)
  return cells.slice(0, MAX_COLUMN_COUNT).map((cell) => cell.trim())
}

/** Drops blanks between a delimiter and an opening quote: Papa Parse takes a quote only at the very start of a cell. */
function tidyQuotes(text: string, delimiter: string): string {
  const at = delimiter === '\t' ? '\\t' : delimiter
  return text.replace(new RegExp(`(^|${at})[ ]+"`, 'g'), '$1"')
}

/** How many lines the record at `start` takes: more than one only if a quoted cell opens there and closes soon after. */
function linesOfRecord(lines: string[], start: number): number {
  if (quoteCount(lines[start]) % 2 === 0 || !/(^|[,;\t])\s*"/.test(lines[start])) return 1
  for (let span = 2; span <= MAX_LINES_IN_CELL && start + span <= lines.length; span++) {
    if (quoteCount(lines[start + span - 1]) % 2 === 1) return span
  }
  return 1
}

function quoteCount(text: string): number {
  return text.split('"').length - 1
}

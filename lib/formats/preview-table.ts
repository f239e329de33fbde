import { columnHeads } from './column-names'
import { binaryFault, emptyFault, noColumnsFault } from './faults'
import { wholeFileFault } from './file-kind'
import { columnFacts, guessRoles, guessUnits, suggestChoice } from './guess-columns'
import { guessLayout } from './guess-layout'
import { readMetadata } from './preamble'
import { SAMPLE_BYTES, guessEncoding, isBinary } from './text-encoding'
import { isCommentLine, sampleLines, splitLine, type TextLine } from './text-lines'
import type { PreviewOutcome, TextLayout } from './types'

const SHOWN_ROWS = 12
const ROWS_FOR_GUESS = 400
const MAX_PREAMBLE_LINES = 200

/**
 * What a file seems to hold, from its first 256 kB.
 *
 * @param layout what the user has corrected; the rest is guessed round it
 * @returns a fault only where there is nothing to correct: an empty, too large or binary file, or no table at all
 */
export function previewTable(bytes: Uint8Array, layout: Partial<TextLayout> = {}): PreviewOutcome {
  const fault = wholeFileFault(bytes)
  if (fault) return { ok: false, fault }
  const encoding = layout.encoding ?? guessEncoding(bytes)
  if (isBinary(bytes, encoding)) return { ok: false, fault: binaryFault(null) }
  const lines = sampleLines(bytes, encoding)
  if (lines.every((line) => line.text.trim() === '')) return { ok: false, fault: emptyFault() }

  const { columnCount: guessedCount, ...marks } = guessLayout(lines, layout)
  if (guessedCount === 0 && Object.keys(layout).length === 0) return { ok: false, fault: noColumnsFault() }
  const used: TextLayout = { encoding, ...marks }
  const rows = dataRows(lines, used)
  const columnCount = Math.max(guessedCount, ...rows.slice(0, SHOWN_ROWS).map((row) => row.cells.length))
  const facts = columnHeads(lines, used, columnCount).map((head, index) =>
    columnFacts(head, {
      index,
      texts: rows.slice(0, ROWS_FOR_GUESS).map((row) => row.cells[index] ?? ''),
      decimalMark: used.decimalMark,
    }),
  )
  const roles = guessRoles(facts)
  const preamble = preambleLines(lines, used)
  return {
    ok: true,
    preview: {
      layout: used,
      columns: facts.map((column) => ({
        index: column.index,
        name: column.name,
        unitText: column.unitText,
        guess: roles.get(column.index) ?? null,
        unitIf: guessUnits(column),
        isNumeric: column.isNumeric,
        smallest: column.smallest,
        largest: column.largest,
      })),
      rows: rows.slice(0, SHOWN_ROWS),
      preamble,
      metadata: readMetadata(preamble),
      estimatedRowCount: estimateRowCount(bytes, rows),
      byteLength: bytes.length,
      suggested: suggestChoice(facts, roles),
    },
  }
}

interface DataRow {
  rowNumber: number
  cells: string[]
}

function dataRows(lines: TextLine[], layout: TextLayout): DataRow[] {
  return lines
    .filter(
      (line) =>
        line.rowNumber >= layout.firstDataRow && line.text.trim() !== '' && !isCommentLine(line.text, layout.delimiter),
    )
    .map((line) => ({ rowNumber: line.rowNumber, cells: splitLine(line.text, layout.delimiter) }))
}

function preambleLines(lines: TextLine[], { headerRow, unitsRow, firstDataRow }: TextLayout): string[] {
  return lines
    .filter(
      ({ rowNumber, text }) =>
        rowNumber < firstDataRow && rowNumber !== headerRow && rowNumber !== unitsRow && text.trim() !== '',
    )
    .slice(0, MAX_PREAMBLE_LINES)
    .map(({ text }) => text.trim().slice(0, 500))
}

/** Exact where the whole file was looked at, else by the mean length of the rows that were. */
function estimateRowCount(bytes: Uint8Array, rows: DataRow[]): number {
  if (bytes.length <= SAMPLE_BYTES || rows.length === 0) return rows.length
  return Math.round((rows.length * bytes.length) / SAMPLE_BYTES)
}

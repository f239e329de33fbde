import { sampleLines, splitLine, withoutCommentMark, type TextLine } from './text-lines'
import type { TextLayout } from './types'
import { splitNameAndUnit } from './unit-words'

export interface ColumnHead {
  name: string
  unitText: string | null
}

/** Names and units of the columns from the header and units rows; "Column 3" where there is no name. */
export function columnHeads(lines: TextLine[], layout: TextLayout, columnCount: number): ColumnHead[] {
  const names = cellsOfRow(lines, layout.headerRow, layout.delimiter)
  const units = cellsOfRow(lines, layout.unitsRow, layout.delimiter)
  return Array.from({ length: columnCount }, (_, index) => {
    const head = splitNameAndUnit((names[index] ?? '').replace(/\s+/g, ' ').slice(0, 120))
    const unitText = (units[index] ?? '').replace(/^[([{]\s*|\s*[)\]}]$/g, '') || head.unitText
    return { name: head.name || `Column ${index + 1}`, unitText: unitText || null }
  })
}

/** Names alone, for messages. */
export function readColumnNames(bytes: Uint8Array, layout: TextLayout): string[] {
  if (layout.headerRow === null) return []
  const lines = sampleLines(bytes, layout.encoding)
  return cellsOfRow(lines, layout.headerRow, layout.delimiter).map(
    (cell, index) => splitNameAndUnit(cell.replace(/\s+/g, ' ')).name || `Column ${index + 1}`,
  )
}

function cellsOfRow(lines: TextLine[], rowNumber: number | null, delimiter: TextLayout['delimiter']): string[] {
  const line = lines.find((candidate) => candidate.rowNumber === rowNumber)
  return line ? splitLine(withoutCommentMark(line.text), delimiter) : []
}

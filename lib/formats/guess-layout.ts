import { cellKind } from './cell-kinds'
import { isCommentLine, splitLine, withoutCommentMark, type TextLine } from './text-lines'
import type { TextLayout } from './types'
import { isUnitText } from './unit-words'

type Marks = Pick<TextLayout, 'delimiter' | 'decimalMark'>

interface Candidate extends Marks {
  columnCount: number
  /** Sum over the rows of that width of the share of their cells that are numbers, time stamps or missing. */
  score: number
}

/** Lines that are looked at to choose the marks; the header may be long, so more are looked at for the first data row. */
const SCORED_LINES = 400
const MARKS: Marks[] = (['\t', ';', ',', ' '] as const).flatMap((delimiter) =>
  (['.', ','] as const).filter((mark) => mark !== delimiter).map((decimalMark) => ({ delimiter, decimalMark })),
)

export interface LayoutGuess extends Omit<TextLayout, 'encoding'> {
  /** 0 where nothing that looks like a table was found. */
  columnCount: number
}

/**
 * Delimiter and decimal mark under which most lines are rows of numbers of equal width, and where those rows begin.
 *
 * The header is the line just above them that has about their width and holds words; a line of unit words beside it is the
 * units row. Both may stand behind a comment mark. What `fixed` holds is kept and the rest guessed round it.
 */
export function guessLayout(lines: TextLine[], fixed: Partial<TextLayout> = {}): LayoutGuess {
  const { delimiter, decimalMark, columnCount } = guessMarks(lines, fixed)
  const firstDataRow = fixed.firstDataRow ?? findFirstDataRow(lines, { delimiter, decimalMark, columnCount })
  const heads = findHeads(lines, { delimiter, decimalMark, columnCount, firstDataRow })
  return {
    delimiter,
    decimalMark,
    headerRow: fixed.headerRow !== undefined ? fixed.headerRow : heads.headerRow,
    unitsRow: fixed.unitsRow !== undefined ? fixed.unitsRow : heads.unitsRow,
    firstDataRow,
    columnCount,
  }
}

function guessMarks(lines: TextLine[], fixed: Partial<TextLayout>): Candidate {
  const sample = lines.filter((line) => line.text.trim() !== '' && line.rowNumber >= (fixed.firstDataRow ?? 1))
  const middle = Math.max(0, Math.floor(sample.length / 2) - SCORED_LINES / 2)
  const scored =
    sample.length <= SCORED_LINES
      ? sample
      : [...sample.slice(0, SCORED_LINES / 2), ...sample.slice(middle, middle + SCORED_LINES / 2)]
  const candidates = MARKS.filter(
    (marks) =>
      (fixed.delimiter ?? marks.delimiter) === marks.delimiter &&
      (fixed.decimalMark ?? marks.decimalMark) === marks.decimalMark,
  ).map((marks) => scoreMarks(scored, marks))
  if (candidates.length === 0) {
    // A comma for both was asked for: the delimiter wins, so that a preview can be shown at all.
    return scoreMarks(scored, { delimiter: fixed.delimiter ?? ',', decimalMark: fixed.decimalMark ?? '.' })
  }
  return candidates.reduce((best, next) =>
    next.score > best.score + 1e-9 || (next.score > best.score - 1e-9 && next.columnCount > best.columnCount)
      ? next
      : best,
  )
}

function scoreMarks(lines: TextLine[], marks: Marks): Candidate {
  const scoreOfWidth = new Map<number, number>()
  for (const line of lines) {
    if (isCommentLine(line.text, marks.delimiter)) continue
    const { width, share } = rowFacts(line.text, marks)
    if (share > 0) scoreOfWidth.set(width, (scoreOfWidth.get(width) ?? 0) + share)
  }
  let best: Candidate = { ...marks, columnCount: 0, score: 0 }
  for (const [columnCount, score] of scoreOfWidth) if (score > best.score) best = { ...marks, columnCount, score }
  return best
}

interface RowFacts {
  width: number
  /** Numbers and time stamps. */
  readable: number
  text: number
  /** Share of cells that could be data, 0 where the line is no row: fewer than two numbers or more words than data. */
  share: number
}

function rowFacts(text: string, marks: Marks): RowFacts {
  const kinds = splitLine(text, marks.delimiter).map((cell) => cellKind(cell, marks.decimalMark))
  const readable = kinds.filter((kind) => kind === 'number' || kind === 'time-stamp').length
  const words = kinds.filter((kind) => kind === 'text').length
  const share = (kinds.length - words) / kinds.length
  return { width: kinds.length, readable, text: words, share: readable >= 2 && share >= 0.4 ? share : 0 }
}

/** The first line that could be a row and is followed by others that could; a later row may lack a value or hold a word. */
function findFirstDataRow(lines: TextLine[], table: Marks & { columnCount: number }): number {
  if (table.columnCount === 0) return 1
  const facts = lines.map((line) =>
    line.text.trim() === '' || isCommentLine(line.text, table.delimiter) ? null : rowFacts(line.text, table),
  )
  const isWide = ({ width }: RowFacts) => Math.abs(width - table.columnCount) <= 1
  const canStart = (row: RowFacts) => isWide(row) && (row.share > 0 || (row.readable > 0 && row.text === 0))
  const canFollow = (row: RowFacts) => isWide(row) && row.readable > 0
  for (let i = 0; i < lines.length; i++) {
    const row = facts[i]
    if (row === null || !canStart(row)) continue
    const following = facts
      .slice(i + 1, i + 30)
      .filter((next) => next !== null)
      .slice(0, 5)
    if (following.filter(canFollow).length >= 0.6 * following.length) return lines[i].rowNumber
  }
  return 1
}

function findHeads(
  lines: TextLine[],
  table: Marks & { columnCount: number; firstDataRow: number },
): Pick<TextLayout, 'headerRow' | 'unitsRow'> {
  const above = lines.filter((line) => line.rowNumber < table.firstDataRow && line.text.trim() !== '').slice(-3)
  const heads = above.reverse().map((line) => ({ rowNumber: line.rowNumber, kind: headKind(line.text, table) }))
  if (table.columnCount === 0) return { headerRow: null, unitsRow: null }
  const [nearest, next] = heads
  if (nearest?.kind === 'units') {
    return { headerRow: next?.kind === 'names' ? next.rowNumber : null, unitsRow: nearest.rowNumber }
  }
  if (nearest?.kind === 'names') {
    return { headerRow: nearest.rowNumber, unitsRow: next?.kind === 'units' ? next.rowNumber : null }
  }
  return { headerRow: null, unitsRow: null }
}

/** Whether a line could name the columns, give their units, or neither. */
function headKind(text: string, table: Marks & { columnCount: number }): 'names' | 'units' | null {
  const cells = splitLine(withoutCommentMark(text), table.delimiter)
  const filled = cells.filter((cell) => cell !== '')
  if (filled.length === 0 || cells.length < Math.min(2, table.columnCount) || cells.length > 2 * table.columnCount)
    return null
  const kinds = filled.map((cell) => cellKind(cell, table.decimalMark))
  const isUnits = cells.length === table.columnCount && filled.every(isUnitText)
  if (isUnits) return 'units'
  const words = kinds.filter((kind) => kind === 'text').length
  const isWideEnough =
    table.delimiter === ' ' ? cells.length === table.columnCount : cells.length >= table.columnCount - 1
  const isPair = /^[^,;\t]{1,60}[=:]\s/.test(text) && cells.length < table.columnCount
  return isWideEnough && !isPair && words >= 0.6 * filled.length ? 'names' : null
}

/** The numbers of a picture, column by column; columns may differ in length. */
export interface FigureTable {
  columns: { name: string; values: ArrayLike<number | string> }[]
}

/** The table as CSV (RFC 4180): comma, CRLF, fields quoted where they must be; missing and non-finite cells are empty. */
export function figureCsv({ columns }: FigureTable): string {
  const rowCount = columns.reduce((most, { values }) => Math.max(most, values.length), 0)
  const lines = [columns.map(({ name }) => csvField(name)).join(',')]
  for (let row = 0; row < rowCount; row++) {
    lines.push(columns.map(({ values }) => csvField(row < values.length ? values[row] : '')).join(','))
  }
  return lines.map((line) => `${line}\r\n`).join('')
}

function csvField(value: number | string): string {
  if (typeof value === 'number') return Number.isFinite(value) ? String(value) : ''
  return /[",\r\n]/.test(value) ? `"${value.replace(/"/g, '""')}"` : value
}

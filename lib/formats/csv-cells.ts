/** One record of RFC 4180 with its CR LF. */
export function csvRecord(cells: (string | number | null)[]): string {
  return `${cells.map(csvCell).join(',')}\r\n`
}

/**
 * A cell as RFC 4180 wants it: quoted where it holds a comma, a quote or a line end, with quotes doubled.
 *
 * Text that a spreadsheet would take for a formula (it begins with = + - @, a tab or a line end, also in full width) gets
 * an apostrophe in front; numbers do not. A number is written with a point and as few digits as read back equal.
 *
 * @throws {RangeError} if a number is not finite
 */
function csvCell(value: string | number | null): string {
  if (value === null) return ''
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw new RangeError(`a cell's number must be finite: got ${value}`)
    return String(value === 0 ? 0 : value)
  }
  const safe = /^[\s]*[=+\-@\uff1d\uff0b\uff0d\uff20]|^[\t\r\n]/.test(value) ? `'${value}` : value
  return /[",\r\n]/.test(safe) || safe !== safe.trim() ? `"${safe.replaceAll('"', '""')}"` : safe
}

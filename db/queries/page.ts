/** Place in a list that is ordered newest first: the last row that was seen. */
export interface Place {
  at: Date
  id: string
}

export interface PageRequest {
  /** As the previous page gave it; rows after that place. */
  cursor?: string | null
  limit?: number
}

export const DEFAULT_PAGE = 50
export const LARGEST_PAGE = 200

export function encodeCursor({ at, id }: Place): string {
  return Buffer.from(`${at.toISOString()} ${id}`).toString('base64url')
}

/** The place that a cursor stands for, or null when it is none of ours. */
export function decodeCursor(cursor: string): Place | null {
  const [instant = '', id = ''] = Buffer.from(cursor, 'base64url').toString('utf8').split(' ')
  const at = new Date(instant)
  const isInstant = /^\d{4}-\d\d-\d\dT[\d:.]+Z$/.test(instant) && !Number.isNaN(at.getTime())
  const isUuid = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/.test(id)
  return isInstant && isUuid ? { at, id } : null
}

export function pageSize(limit: number | undefined): number {
  return Math.min(Math.max(Math.trunc(limit ?? DEFAULT_PAGE), 1), LARGEST_PAGE)
}

/** Cuts the one row too many that was fetched to learn whether there is a next page. */
export function toPage<T>(rows: T[], size: number, placeOf: (row: T) => Place) {
  const kept = rows.slice(0, size)
  return { rows: kept, nextCursor: rows.length > size ? encodeCursor(placeOf(kept[kept.length - 1])) : null }
}

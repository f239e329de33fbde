import { sql, type RawBuilder, type SelectQueryBuilder, type SqlBool } from 'kysely'
import { z } from 'zod'
import { Refusal } from './refusal'

/*
 * Pages by keyset: a page is what lies strictly after (or before) a row that was seen, never “rows 51 to 75”. Rows that are
 * added or deleted meanwhile neither repeat nor hide others. The order is: by value, rows without a value last in both
 * directions, ties by id.
 */

export interface SortKey {
  /** What is compared; for text already in the collation of `naturally`. */
  expression: RawBuilder<unknown>
  kind: 'text' | 'number' | 'instant'
  /** Of an expression that is never null PostgreSQL may walk along an index, in both directions. */
  isNullable?: boolean
}

export type Sorts<Name extends string> = Record<Name, SortKey>

/** Text as people order it: case does not matter, “Night 2” comes before “Night 10”. */
export function naturally(expression: RawBuilder<unknown>, { isNullable = false } = {}): SortKey {
  return { expression: sql`${expression} collate natural_order`, kind: 'text', isNullable }
}

export interface PageQuery<Sort extends string> {
  sort: Sort
  direction: 'asc' | 'desc'
  cursor?: string
  limit: number
}

interface Place {
  way: 'after' | 'before'
  /** As `exactText` writes it. */
  value: string | null
  id: string
}

const cursorSchema = z.tuple([
  z.string(),
  z.enum(['asc', 'desc']),
  z.enum(['after', 'before']),
  z.string().nullable(),
  z.uuid(),
])

/** Whether PostgreSQL could take the text for a value of the kind; a cursor may have been written by hand. */
const isValue: Record<SortKey['kind'], (text: string) => boolean> = {
  text: (text) => !/\0|\p{Surrogate}/u.test(text),
  number: isDouble,
  instant: isInstant,
}

/** PostgreSQL refuses what is too large, and also what is so small that it would become 0. */
function isDouble(text: string): boolean {
  if (!/^-?\d+(\.\d+)?(e[+-]?\d+)?$/.test(text)) return false
  const value = Number(text)
  return Number.isFinite(value) && (value !== 0 || /^[-0.]+(e|$)/.test(text))
}

/** JavaScript takes the 30th of February for a day in March, and knows a year 0; PostgreSQL refuses both. */
function isInstant(text: string): boolean {
  if (!/^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d\.\d{6}Z$/.test(text) || text.startsWith('0000')) return false
  const date = new Date(text)
  return !Number.isNaN(date.getTime()) && date.toISOString().slice(0, 19) === text.slice(0, 19)
}

/** The value as text that PostgreSQL reads again to the last digit, whatever the session’s settings. */
const exactText: Record<SortKey['kind'], (expression: RawBuilder<unknown>) => RawBuilder<string | null>> = {
  text: (expression) => sql`(${expression})::text`,
  number: (expression) => sql`(${expression})::double precision::text`,
  instant: (expression) => sql`to_char((${expression}) at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"')`,
}

const wrongPlace = (message: string) => new Refusal({ kind: 'not-valid', fields: { cursor: message } }, message)

const unknownPlace = () =>
  wrongPlace('The address leads to a place that this list does not have. Go back to its beginning.')

const foreignPlace = () =>
  wrongPlace('The address leads to a place in a list that is sorted otherwise. Go back to the beginning of this one.')

function encodeCursor(name: string, direction: 'asc' | 'desc', { way, value, id }: Place): string {
  return Buffer.from(JSON.stringify([name, direction, way, value, id])).toString('base64url')
}

function decodeCursor(cursor: string): z.output<typeof cursorSchema> {
  try {
    return cursorSchema.parse(JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8')))
  } catch {
    throw unknownPlace()
  }
}

/** @throws {Refusal} 'not-valid' where the cursor is none of ours or belongs to another sort */
function placeOf(name: string, key: SortKey, query: PageQuery<string>): Place | null {
  if (!query.cursor) return null
  const [ofName, direction, way, value, id] = decodeCursor(query.cursor)
  if (ofName !== name || direction !== query.direction) throw foreignPlace()
  if (value === null ? !key.isNullable : !isValue[key.kind](value)) throw unknownPlace()
  return { way, value, id }
}

const TYPES = { text: sql`text`, number: sql`double precision`, instant: sql`timestamptz` }

/** Whether a row lies strictly after (or before) the place in this order. */
function beyond(key: SortKey, id: RawBuilder<unknown>, direction: 'asc' | 'desc', place: Place): RawBuilder<SqlBool> {
  const { expression } = key
  const placeId = sql`${place.id}::uuid`
  const isForward = place.way === 'after'
  const rises = (direction === 'asc') === isForward
  const follows = rises ? sql`>` : sql`<`
  if (place.value === null) {
    const tied = sql<SqlBool>`(${expression} is null and ${id} ${follows} ${placeId})`
    return isForward ? tied : sql<SqlBool>`(${expression} is not null or ${tied})`
  }
  const value = sql`${place.value}::${TYPES[key.kind]}`
  const compared = sql<SqlBool>`(${expression}, ${id}) ${follows} (${value}, ${placeId})`
  return key.isNullable && isForward ? sql<SqlBool>`(${compared} or ${expression} is null)` : compared
}

export interface ListOrder<Sort extends string> {
  /** The list’s name; a cursor holds it. */
  list: string
  sorts: Sorts<Sort>
  /** The column that settles ties: sql.ref('runs.id'). */
  id: RawBuilder<string>
  query: PageQuery<Sort>
}

export interface Page<Row> {
  rows: Row[]
  nextCursor: string | null
  previousCursor: string | null
  /** True of the rows that lie before this page in the order; to be counted. */
  isBefore: RawBuilder<SqlBool>
}

type WithKey<Row> = Row & { keysetValue: string | null; keysetId: string }

/** One page of the query’s rows; the query brings its columns and conditions, no order and no limit. */
export async function fetchPage<DB, Tables extends keyof DB, Row, Sort extends string>(
  rows: SelectQueryBuilder<DB, Tables, Row>,
  { list, sorts, id, query }: ListOrder<Sort>,
): Promise<Page<Row>> {
  const key = sorts[query.sort]
  const name = `${list}.${query.sort}`
  const { direction, limit } = query

  /** In the order of the list, with one row more than the page has where there is one. */
  async function take(way: Place['way'], place: Place | null): Promise<WithKey<Row>[]> {
    const isForward = way === 'after'
    const order = (direction === 'asc') === isForward ? sql`asc` : sql`desc`
    // Without this where it is needless, or the index could not be walked backwards.
    const nulls = key.isNullable ? (isForward ? sql`nulls last` : sql`nulls first`) : sql``
    let taken = rows
      .select([exactText[key.kind](key.expression).as('keysetValue'), sql<string>`${id}`.as('keysetId')])
      .orderBy(sql`${key.expression} ${order} ${nulls}, ${id} ${order}`)
      .limit(limit + 1)
    if (place) taken = taken.where(beyond(key, id, direction, place))
    const found = await taken.$castTo<WithKey<Row>>().execute()
    return isForward ? found : found.reverse()
  }

  const place = placeOf(name, key, query)
  let found = await take(place?.way ?? 'after', place)
  let cut: 'end' | 'start' = place?.way === 'before' ? 'start' : 'end'
  let isStart = place === null
  let isEnd = false
  if (place?.way === 'after' && found.length === 0) {
    // All that came after was deleted: the last page is what is nearest.
    found = await take('before', null)
    cut = 'start'
    isEnd = true
    isStart = found.length <= limit
  } else if (place?.way === 'before' && found.length <= limit) {
    // The beginning is reached; a first page is a full one.
    found = await take('after', null)
    cut = 'end'
    isStart = true
  }
  if (cut === 'end') isEnd = found.length <= limit
  const kept = cut === 'end' ? found.slice(0, limit) : found.slice(-limit)
  const at = (way: Place['way'], row: WithKey<Row> | undefined): Place | null =>
    row ? { way, value: row.keysetValue, id: row.keysetId } : null
  const [first, last] = [at('before', kept.at(0)), at('after', kept.at(-1))]
  return {
    rows: kept.map(({ keysetValue: _value, keysetId: _id, ...row }) => row as unknown as Row),
    nextCursor: isEnd || !last ? null : encodeCursor(name, direction, last),
    previousCursor: isStart || !first ? null : encodeCursor(name, direction, first),
    isBefore: first && !isStart ? beyond(key, id, direction, first) : sql<SqlBool>`false`,
  }
}

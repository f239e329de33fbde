import { sql, type RawBuilder, type SqlBool } from 'kysely'
import { dayEnd, dayStart } from '@/lib/wall-time'

type Condition = RawBuilder<SqlBool>

/** All of them; those that were not asked for are undefined. */
export function allOf(conditions: readonly (Condition | undefined)[]): Condition {
  const asked = conditions.filter((condition) => condition !== undefined)
  return asked.length === 0 ? sql<SqlBool>`true` : sql<SqlBool>`(${sql.join(asked, sql` and `)})`
}

/** Every word of the text is found in one of the columns; case does not matter, % and _ are themselves. */
export function holdsWords(text: string, columns: readonly RawBuilder<unknown>[]): Condition | undefined {
  const words = text.split(/\s+/).filter((word) => word !== '')
  if (words.length === 0) return undefined
  const haystack = sql`concat_ws(' ', ${sql.join(columns)})`
  return allOf(words.map((word) => sql<SqlBool>`${haystack} ilike ${`%${word.replace(/[\\%_]/g, '\\$&')}%`}`))
}

export function equals(column: RawBuilder<unknown>, value: string | undefined): Condition | undefined {
  return value === undefined ? undefined : sql<SqlBool>`${column} = ${value}`
}

/** From the beginning of one day to the end of another, both in the zone. */
export function withinDays(
  column: RawBuilder<unknown>,
  { from, to, zone }: { from?: string; to?: string; zone: string },
): Condition | undefined {
  if (from === undefined && to === undefined) return undefined
  return allOf([
    from === undefined ? undefined : sql<SqlBool>`${column} >= ${dayStart(from, zone)}::timestamptz`,
    to === undefined ? undefined : sql<SqlBool>`${column} < ${dayEnd(to, zone)}::timestamptz`,
  ])
}

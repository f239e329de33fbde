import type { z } from 'zod'
import { getJson } from './fetcher'

const pageSize = 100
/** Ten thousand rows; a project that grows past this needs a list that asks the server to sort. */
const maxPages = 100

/** Follows `nextCursor` to the end, so that a list can be sorted and filtered as a whole. */
export async function getAllPages<Schema extends z.ZodType<{ nextCursor: string | null }>, Row>(
  url: string,
  schema: Schema,
  rowsOf: (page: z.output<Schema>) => Row[],
): Promise<Row[]> {
  const rows: Row[] = []
  let cursor: string | null = null
  for (let page = 0; page < maxPages; page++) {
    const query = new URLSearchParams({ limit: String(pageSize), ...(cursor ? { cursor } : {}) })
    const answer: z.output<Schema> = await getJson(`${url}?${query}`, schema)
    rows.push(...rowsOf(answer))
    cursor = answer.nextCursor
    if (cursor === null) break
  }
  return rows
}

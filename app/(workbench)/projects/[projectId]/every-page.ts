import { LARGEST_PAGE } from '@/db/queries/page'

/** A list past this many pages is left to the browser to fetch. */
const maxPages = 5

/** The rows of all pages of a list, or undefined when there are too many to read before the page is sent. */
export async function everyPage<Page extends { nextCursor: string | null }, Row>(
  load: (page: { cursor: string | null; limit: number }) => Promise<Page>,
  rowsOf: (page: Page) => Row[],
): Promise<Row[] | undefined> {
  const rows: Row[] = []
  let cursor: string | null = null
  for (let count = 0; count < maxPages; count++) {
    const page: Page = await load({ cursor, limit: LARGEST_PAGE })
    rows.push(...rowsOf(page))
    cursor = page.nextCursor
    if (cursor === null) return rows
  }
  return undefined
}

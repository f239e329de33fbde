'use client'

import { usePathname, useSearchParams } from 'next/navigation'
import { useCallback, useMemo } from 'react'
import useSWR, { useSWRConfig } from 'swr'
import type { z } from 'zod'
import { lenientQuery, listSearch, type ListSchema, type PageFacts } from '@/lib/schemas/lists'
import { getJson } from './fetcher'

export interface ListAddress<Query> {
  query: Query
  /** Goes to another view of the list, at its beginning unless a cursor is given. */
  change: (changes: Partial<Query>) => void
  /** The same for what is being typed: it leaves no step behind for the browser's Back. */
  type: (changes: Partial<Query>) => void
  /** Shows everything again; sort and page size stay. */
  showAll: () => void
}

/**
 * Sort, filters and place of a list, kept in the page's address: Back returns to the same place, and a link shows the same
 * view. The page itself is not asked for again.
 */
export function useListAddress<Schema extends ListSchema>(schema: Schema): ListAddress<z.output<Schema>> {
  type Query = z.output<Schema>
  const pathname = usePathname()
  const search = useSearchParams().toString()
  const query = useMemo(() => lenientQuery(schema, Object.fromEntries(new URLSearchParams(search))), [schema, search])

  const go = useCallback(
    (how: 'pushState' | 'replaceState', changed: (now: Query) => Partial<Query>) => {
      const now = lenientQuery(schema, Object.fromEntries(new URLSearchParams(window.location.search)))
      const address = pathname + listSearch(schema, changed(now))
      if (address !== window.location.pathname + window.location.search) window.history[how](null, '', address)
    },
    [schema, pathname],
  )
  const change = useCallback(
    (changes: Partial<Query>) => go('pushState', (now) => ({ ...now, cursor: undefined, ...changes })),
    [go],
  )
  const type = useCallback(
    (changes: Partial<Query>) => go('replaceState', (now) => ({ ...now, cursor: undefined, ...changes })),
    [go],
  )
  const showAll = useCallback(
    () => go('pushState', ({ sort, direction, limit }) => ({ sort, direction, limit }) as Partial<Query>),
    [go],
  )
  return { query, change, type, showAll }
}

export interface ListAnswer<Answer> {
  data: Answer | undefined
  error: Error | undefined
  mutate: () => Promise<unknown>
  /** Whether the data are still those of another view. */
  isBusy: boolean
}

/** One page of a list; the rows of the page before stay until the next ones are there. */
export function useList<Schema extends z.ZodType<PageFacts>>(
  address: string,
  schema: Schema,
): ListAnswer<z.output<Schema>> {
  const { fallback } = useSWRConfig()
  const answer = useSWR<z.output<Schema>, Error>(address, (url: string) => getJson(url, schema), {
    keepPreviousData: true,
  })
  // What the page was sent with is this very view, though SWR calls it loading until it has asked once itself.
  const isBusy = answer.isLoading && fallback[address] === undefined
  return { data: answer.data, error: answer.error, mutate: () => answer.mutate(), isBusy }
}

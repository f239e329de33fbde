'use client'

import type { ReactNode } from 'react'
import { Button } from '@/components/ui/button'
import { FilterRow } from '@/components/ui/filter-row'
import { Notice } from '@/components/ui/notice'
import { ProgressBar } from '@/components/ui/progress-bar'
import { ServerTable } from '@/components/ui/server-table'
import type { ListColumn } from '@/components/ui/server-table-model'
import { RequestError } from '@/lib/client/fetcher'
import type { ListAddress, ListAnswer } from '@/lib/client/use-list'
import { shownSentence, type Noun } from '@/lib/findings/shown-sentence'
import { PAGE_SIZES, type ListQuery, type PageFacts } from '@/lib/schemas/lists'

interface ListFrameProps<Answer extends PageFacts, Row extends { id: string }, Query extends ListQuery> {
  noun: Noun
  answer: ListAnswer<Answer>
  address: ListAddress<Query>
  columns: readonly ListColumn<Row>[]
  rowsOf: (answer: Answer) => readonly Row[]
  heading: (answer: Answer) => ReactNode
  /** Shown where there is nothing at all yet. */
  nothingYet: ReactNode
  /** What the text field looks through: “name, file, person”. */
  searched: string
  /** What is filtered, in words; empty: nothing is. */
  filtered: (answer: Answer) => readonly string[]
  /** The filters beside the text. */
  filters?: ReactNode
}

/** What all lists share: heading, filters, what is shown in a sentence, the table, and what to do where it is empty. */
export function ListFrame<Answer extends PageFacts, Row extends { id: string }, Query extends ListQuery>(
  props: ListFrameProps<Answer, Row, Query>,
) {
  const { noun, answer, address, columns, rowsOf, heading, nothingYet, searched, filtered, filters } = props
  const { query, change, type, showAll } = address
  const { data, error, isBusy } = answer
  const fault = error ? (
    <ListFault noun={noun} error={error} answer={answer} onStart={() => change({} as Partial<Query>)} />
  ) : null
  if (!data) return fault ?? <ProgressBar label={`Getting the ${noun.many}`} fraction={null} />
  const words = filtered(data)
  const choices = words.length - (query.q.trim() === '' ? 0 : 1)
  return (
    <>
      {heading(data)}
      {fault}
      {data.all === 0 ? (
        nothingYet
      ) : (
        <>
          <p className="sr-only" role="status">
            {isBusy ? '' : shownSentence(data, noun, words)}
          </p>
          <ServerTable
            caption={noun.many}
            columns={columns}
            rows={rowsOf(data)}
            rowId={({ id }) => id}
            sort={{ id: query.sort, desc: query.direction === 'desc' }}
            onSort={({ id, desc }) => change({ sort: id, direction: desc ? 'desc' : 'asc' } as Partial<Query>)}
            page={data}
            onCursor={(cursor) => change({ ...query, cursor })}
            pageSize={query.limit}
            pageSizes={PAGE_SIZES}
            onPageSize={(limit) => change({ limit } as Partial<Query>)}
            isBusy={isBusy}
            top={
              <>
                <FilterRow
                  label={`Filter ${noun.many}`}
                  placeholder={searched}
                  text={query.q}
                  onText={(q) => type({ q } as Partial<Query>)}
                  setCount={choices}
                >
                  {filters}
                </FilterRow>
                {words.length > 0 && data.total > 0 ? (
                  <p className="flex flex-wrap items-center gap-x-3 border-b border-rule px-5 py-2 text-sm max-sm:px-4">
                    <span>{shownSentence(data, noun, words)}</span>
                    <Button size="small" onClick={showAll}>
                      Show all
                    </Button>
                  </p>
                ) : null}
              </>
            }
            empty={
              <div className="px-5 py-8 max-sm:px-4">
                <h2 className="text-finding font-semibold">No {noun.one} matches</h2>
                <p className="mt-1 max-w-[60ch] text-soft">
                  {shownSentence(data, noun, words)}. Ask for less, or see all.
                </p>
                <Button className="mt-3" onClick={showAll}>
                  Show all
                </Button>
              </div>
            }
          />
        </>
      )}
    </>
  )
}

interface ListFaultProps {
  noun: Noun
  error: Error
  answer: { mutate: () => Promise<unknown> }
  onStart: () => void
}

function ListFault({ noun, error, answer, onStart }: ListFaultProps) {
  // A place that the list does not have will not come with a second attempt.
  const isWrongPlace = error instanceof RequestError && error.code === 'not-valid'
  return (
    <Notice
      tone="error"
      isLive
      title={`Could not get the ${noun.many}`}
      actions={
        isWrongPlace ? (
          <Button onClick={onStart}>To the beginning of the list</Button>
        ) : (
          <Button onClick={() => void answer.mutate()}>Try again</Button>
        )
      }
    >
      {error.message}
    </Notice>
  )
}

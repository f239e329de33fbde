'use client'

import { useTable, type RowData } from '@tanstack/react-table'
import { useMemo, useState, type KeyboardEvent, type ReactNode } from 'react'
import { Button } from './button'
import { Card } from './card'
import { classNames } from './class-names'
import { dataTableFeatures, rowMatches, tableColumns, type DataColumn } from './data-table-model'
import { TextInput } from './text-input'

interface DataTableProps<Row extends RowData> {
  /** What the table holds, read out and used in the count: “12 runs”. */
  caption: string
  columns: readonly DataColumn<Row>[]
  rows: readonly Row[]
  rowId: (row: Row) => string
  initialSort?: { id: string; desc: boolean }
  pageSize?: number
  /** Whether a long table offers a filter. */
  hasFilter?: boolean
  /** Shown beside the filter. */
  actions?: ReactNode
}

/** A table to sort, filter and page; arrow keys move between the rows' links. Columns should keep their identity. */
export function DataTable<Row extends RowData>(props: DataTableProps<Row>) {
  const { caption, columns, rows, rowId, initialSort, pageSize = 25, hasFilter = true, actions } = props
  const [query, setQuery] = useState('')
  const wanted = query.trim()
  const data = useMemo(
    () => (wanted === '' ? [...rows] : rows.filter((row) => rowMatches(row, columns, wanted))),
    [rows, columns, wanted],
  )
  const tableColumnDefs = useMemo(() => tableColumns(columns), [columns])
  const table = useTable({
    features: dataTableFeatures,
    columns: tableColumnDefs,
    data,
    getRowId: rowId,
    enableSortingRemoval: false,
    initialState: {
      sorting: initialSort ? [initialSort] : [],
      pagination: { pageIndex: 0, pageSize },
    },
  })
  const byId = useMemo(() => new Map(columns.map((column) => [column.id, column])), [columns])
  const isFilterShown = hasFilter && rows.length > 5
  const pageCount = table.getPageCount()
  const pageIndex = table.state.pagination.pageIndex

  return (
    <Card className="overflow-hidden">
      {isFilterShown || actions ? (
        <div className="flex flex-wrap items-center justify-between gap-3 border-b border-rule px-5 py-3 max-sm:px-4">
          {isFilterShown ? (
            <TextInput
              type="search"
              aria-label={`Filter ${caption}`}
              placeholder={`Filter ${caption}`}
              value={query}
              onChange={(event) => setQuery(event.target.value)}
              className="max-w-xs"
            />
          ) : (
            <span />
          )}
          {actions}
        </div>
      ) : null}
      <div className="overflow-x-auto" role="region" aria-label={caption} tabIndex={0}>
        <table className="w-full border-collapse text-left">
          <caption className="sr-only">{caption}</caption>
          <thead>
            {table.getHeaderGroups().map((group) => (
              <tr key={group.id} className="border-b border-rule">
                {group.headers.map((header) => {
                  const column = byId.get(header.column.id)
                  const direction = header.column.getIsSorted()
                  return (
                    <th
                      key={header.id}
                      scope="col"
                      aria-sort={direction === 'asc' ? 'ascending' : direction === 'desc' ? 'descending' : undefined}
                      className={classNames(
                        'px-5 py-1 text-sm font-medium text-soft max-sm:px-4',
                        column?.isNumeric && 'text-right',
                        column?.isSecondary && 'max-sm:hidden',
                      )}
                    >
                      {column?.hasControls ? (
                        <span className="sr-only">{column.header}</span>
                      ) : (
                        <button
                          type="button"
                          onClick={header.column.getToggleSortingHandler()}
                          className={classNames(
                            'inline-flex min-h-8 items-center gap-1 rounded-control whitespace-nowrap hover:text-ink pointer-coarse:min-h-11',
                            // The arrow's place lies outside the figures, so that the head ends where they do.
                            column?.isNumeric && 'flex-row-reverse',
                            direction && 'text-ink',
                          )}
                        >
                          {column?.header}
                          <span aria-hidden="true" className="w-3">
                            {direction === 'asc' ? '↑' : direction === 'desc' ? '↓' : ''}
                          </span>
                        </button>
                      )}
                    </th>
                  )
                })}
              </tr>
            ))}
          </thead>
          <tbody onKeyDown={moveBetweenRows}>
            {table.getRowModel().rows.map((row) => (
              <tr key={row.id} className="border-b border-rule last:border-b-0 hover:bg-faint">
                {columns.map((column, index) => {
                  const content = column.cell ? column.cell(row.original) : (column.value(row.original) ?? '–')
                  const className = classNames(
                    'px-5 py-2.5 align-baseline font-normal max-sm:px-4',
                    column.isNumeric && 'figures text-right whitespace-nowrap',
                    column.isSecondary && 'max-sm:hidden',
                  )
                  return index === 0 ? (
                    <th key={column.id} scope="row" className={className}>
                      {content}
                    </th>
                  ) : (
                    <td key={column.id} className={className}>
                      {content}
                    </td>
                  )
                })}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      {wanted !== '' && data.length === 0 ? (
        <p className="px-5 py-6 text-soft max-sm:px-4">
          Nothing here holds “{wanted}”.{' '}
          <button type="button" className="underline" onClick={() => setQuery('')}>
            Show all {rows.length}
          </button>
        </p>
      ) : null}
      {pageCount > 1 ? (
        <nav
          aria-label={`Pages of ${caption}`}
          className="no-print flex items-center justify-between gap-3 border-t border-rule px-5 py-3 max-sm:px-4"
        >
          <p className="text-sm text-soft" aria-live="polite">
            Page <span className="figures">{pageIndex + 1}</span> of <span className="figures">{pageCount}</span>,{' '}
            <span className="figures">{data.length}</span> in all
          </p>
          <div className="flex gap-2">
            <Button disabled={!table.getCanPreviousPage()} onClick={() => table.previousPage()}>
              Back
            </Button>
            <Button disabled={!table.getCanNextPage()} onClick={() => table.nextPage()}>
              Next
            </Button>
          </div>
        </nav>
      ) : null}
    </Card>
  )
}

const stepOf: Record<string, (index: number, last: number) => number> = {
  ArrowDown: (index, last) => Math.min(index + 1, last),
  ArrowUp: (index) => Math.max(index - 1, 0),
  Home: () => 0,
  End: (_, last) => last,
}

function moveBetweenRows(event: KeyboardEvent<HTMLTableSectionElement>) {
  const step = stepOf[event.key]
  if (!step || !(event.target instanceof HTMLAnchorElement)) return
  const links = [...event.currentTarget.querySelectorAll<HTMLAnchorElement>('th[scope=row] a')]
  const index = links.indexOf(event.target)
  if (index < 0) return
  event.preventDefault()
  links[step(index, links.length - 1)].focus()
}

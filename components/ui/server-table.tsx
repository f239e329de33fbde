'use client'

import { functionalUpdate, useTable, type RowData } from '@tanstack/react-table'
import { useEffect, useMemo, useRef, type KeyboardEvent, type ReactNode } from 'react'
import { Button } from './button'
import { Card } from './card'
import { moveBetweenRows, rowLinks } from './row-keys'
import { Segmented } from './segmented'
import { serverTableColumns, serverTableFeatures, type ListColumn } from './server-table-model'
import { TableGrid } from './table-grid'

export interface TablePage {
  nextCursor: string | null
  previousCursor: string | null
  total: number
  /** Rows before this page. */
  before: number
}

interface ServerTableProps<Row extends RowData> {
  /** What the table holds: “runs”. */
  caption: string
  columns: readonly ListColumn<Row>[]
  rows: readonly Row[]
  rowId: (row: Row) => string
  sort: { id: string; desc: boolean }
  onSort: (sort: { id: string; desc: boolean }) => void
  page: TablePage
  onCursor: (cursor: string) => void
  pageSize: number
  pageSizes: readonly number[]
  onPageSize: (size: number) => void
  /** Whether these rows are still those of the question before. */
  isBusy: boolean
  /** Stands between the top of the card and the head: filters. */
  top?: ReactNode
  /** Shown in place of rows. */
  empty?: ReactNode
}

/**
 * A table of which the server sorts and sends one page at a time. Arrow keys, Home and End move between the rows' links,
 * PageUp and PageDown turn the page and go on with its first row.
 */
export function ServerTable<Row extends RowData>(props: ServerTableProps<Row>) {
  const { caption, columns, rows, rowId, sort, onSort, page, onCursor, pageSize, isBusy, top, empty } = props
  const card = useRef<HTMLDivElement>(null)
  const isTurnedByKey = useRef(false)
  const columnDefs = useMemo(() => serverTableColumns(columns), [columns])
  const data = useMemo(() => [...rows], [rows])
  const sorting = [sort]
  const table = useTable({
    features: serverTableFeatures,
    columns: columnDefs,
    data,
    getRowId: rowId,
    manualSorting: true,
    manualPagination: true,
    enableSortingRemoval: false,
    rowCount: page.total,
    state: { sorting, pagination: { pageIndex: Math.floor(page.before / pageSize), pageSize } },
    onSortingChange: (updater) => {
      const next = functionalUpdate(updater, sorting).at(0)
      if (next) onSort(next)
    },
    onPaginationChange: (updater) => {
      const next = functionalUpdate(updater, { pageIndex: 0, pageSize })
      if (next.pageSize !== pageSize) props.onPageSize(next.pageSize)
    },
  })

  useEffect(() => {
    if (isBusy || !isTurnedByKey.current) return
    isTurnedByKey.current = false
    const body = card.current?.querySelector('tbody')
    if (body) rowLinks(body).at(0)?.focus()
  }, [isBusy, rows])

  /** Not while busy: the cursors are still those of the view before. */
  function turn(cursor: string | null) {
    if (cursor === null || isBusy) return false
    onCursor(cursor)
    return true
  }

  function pressed(event: KeyboardEvent<HTMLTableSectionElement>) {
    if (event.key !== 'PageDown' && event.key !== 'PageUp') return moveBetweenRows(event)
    const cursor = event.key === 'PageDown' ? page.nextCursor : page.previousCursor
    event.preventDefault()
    if (turn(cursor)) isTurnedByKey.current = true
  }

  const isPaged = page.total > Math.min(...props.pageSizes)
  return (
    <Card className="overflow-hidden">
      <div ref={card}>
        {top}
        {rows.length === 0 && empty ? (
          empty
        ) : (
          <TableGrid
            caption={caption}
            columns={columns}
            rows={table.getRowModel().rows.map((row) => row.original)}
            rowId={rowId}
            content={(row, column) => column.cell(row)}
            sort={sort}
            onSort={(id) => table.getColumn(id)?.toggleSorting()}
            isBusy={isBusy}
            onKeyDown={pressed}
          />
        )}
        {isPaged && rows.length > 0 ? (
          <nav
            aria-label={`Pages of ${caption}`}
            className="no-print flex flex-wrap items-center justify-between gap-x-6 gap-y-3 border-t border-rule px-5 py-3 max-sm:px-4"
          >
            <p className="text-sm text-soft" aria-live="polite">
              <span className="figures">
                {page.before + 1}–{page.before + rows.length}
              </span>{' '}
              of <span className="figures">{page.total}</span>
            </p>
            <div className="flex items-center gap-2">
              <span className="text-sm text-soft" aria-hidden="true">
                Rows
              </span>
              <Segmented
                label="Rows on a page"
                value={String(pageSize)}
                options={props.pageSizes.map((size) => ({ value: String(size), label: String(size) }))}
                onValue={(size) => table.setPageSize(Number(size))}
              />
            </div>
            <div className="flex gap-2">
              <Button disabled={page.previousCursor === null} onClick={() => turn(page.previousCursor)}>
                Back
              </Button>
              <Button disabled={page.nextCursor === null} onClick={() => turn(page.nextCursor)}>
                Next
              </Button>
            </div>
          </nav>
        ) : null}
      </div>
    </Card>
  )
}

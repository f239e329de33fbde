'use client'

import { useTable, type RowData } from '@tanstack/react-table'
import { useMemo, useState, type ReactNode } from 'react'
import { Button } from './button'
import { Card } from './card'
import { dataTableFeatures, rowMatches, tableColumns, type DataColumn } from './data-table-model'
import { moveBetweenRows } from './row-keys'
import { TableGrid } from './table-grid'
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
      <TableGrid
        caption={caption}
        columns={columns}
        rows={table.getRowModel().rows.map((row) => row.original)}
        rowId={rowId}
        content={(row, column) => (column.cell ? column.cell(row) : (column.value(row) ?? '–'))}
        sort={table.state.sorting.at(0) ?? null}
        onSort={(id) => table.getColumn(id)?.toggleSorting()}
        onKeyDown={moveBetweenRows}
      />
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

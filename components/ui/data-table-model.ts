import {
  createColumnHelper,
  createPaginatedRowModel,
  createSortedRowModel,
  rowPaginationFeature,
  rowSortingFeature,
  tableFeatures,
  type RowData,
} from '@tanstack/react-table'
import type { ReactNode } from 'react'

/** A column as our screens describe it; the table library stays behind DataTable. */
export interface DataColumn<Row> {
  id: string
  header: string
  /** What sorting compares and the filter searches; null sorts last. */
  value: (row: Row) => string | number | null
  /** What is shown; the value itself where this is left out. */
  cell?: (row: Row) => ReactNode
  isNumeric?: boolean
  /** Holds buttons or other controls: its head is only read out and sorts nothing. */
  hasControls?: boolean
  /** Left out on a phone. */
  isSecondary?: boolean
}

export const dataTableFeatures = tableFeatures({
  rowSortingFeature,
  rowPaginationFeature,
  sortedRowModel: createSortedRowModel(),
  paginatedRowModel: createPaginatedRowModel(),
})

const collator = new Intl.Collator('en', { numeric: true, sensitivity: 'base' })

/** Numbers by size, text as people order it. */
export function compareValues(a: string | number, b: string | number): number {
  if (typeof a === 'number' && typeof b === 'number') return a - b
  return collator.compare(String(a), String(b))
}

/** Whether any shown text of the row holds every word of the query. */
export function rowMatches<Row>(row: Row, columns: readonly DataColumn<Row>[], query: string): boolean {
  const text = columns
    .map((column) => String(column.value(row) ?? ''))
    .join(' ')
    .toLowerCase()
  return query
    .toLowerCase()
    .split(/\s+/)
    .every((word) => text.includes(word))
}

export function tableColumns<Row extends RowData>(columns: readonly DataColumn<Row>[]) {
  const helper = createColumnHelper<typeof dataTableFeatures, Row>()
  return helper.columns(
    columns.map((column) =>
      helper.accessor((row) => column.value(row) ?? undefined, {
        id: column.id,
        header: column.header,
        sortUndefined: 'last',
        sortFn: (a, b, id) => compareValues(a.getValue<string | number>(id), b.getValue<string | number>(id)),
      }),
    ),
  )
}

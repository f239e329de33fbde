import {
  createColumnHelper,
  rowPaginationFeature,
  rowSortingFeature,
  tableFeatures,
  type RowData,
} from '@tanstack/react-table'
import type { ReactNode } from 'react'
import type { GridColumn } from './table-grid'

/** A column whose id is the name of a sort that the server knows, unless `isSortable` is false. */
export interface ListColumn<Row> extends GridColumn {
  cell: (row: Row) => ReactNode
  /** The first press on its head puts the largest or latest first. */
  startsDescending?: boolean
}

/** Without row models: rows come sorted and cut into pages by the server. */
export const serverTableFeatures = tableFeatures({ rowSortingFeature, rowPaginationFeature })

export function serverTableColumns<Row extends RowData>(columns: readonly ListColumn<Row>[]) {
  const helper = createColumnHelper<typeof serverTableFeatures, Row>()
  return helper.columns(
    columns.map(({ id, header, isSortable, startsDescending }) =>
      helper.display({ id, header, enableSorting: isSortable !== false, sortDescFirst: startsDescending ?? false }),
    ),
  )
}

import type { KeyboardEvent, ReactNode } from 'react'
import { classNames } from './class-names'

export interface GridColumn {
  id: string
  header: string
  isNumeric?: boolean
  /** Left out on a phone. */
  isSecondary?: boolean
  /** False: the head is no button. */
  isSortable?: boolean
  /** A name that people gave: may be long and without a space. */
  isName?: boolean
  /** Holds buttons or other controls: its head is only read out and sorts nothing. */
  hasControls?: boolean
}

interface TableGridProps<Row, Column extends GridColumn> {
  caption: string
  columns: readonly Column[]
  rows: readonly Row[]
  rowId: (row: Row) => string
  content: (row: Row, column: Column) => ReactNode
  sort: { id: string; desc: boolean } | null
  onSort: (id: string) => void
  /** Other rows are on their way. */
  isBusy?: boolean
  onKeyDown?: (event: KeyboardEvent<HTMLTableSectionElement>) => void
}

/** How every table of ours looks: heads that sort, the first cell of a row as its head. Knows nothing of where rows come from. */
export function TableGrid<Row, Column extends GridColumn>(props: TableGridProps<Row, Column>) {
  const { caption, columns, rows, rowId, content, sort, onSort, isBusy = false, onKeyDown } = props
  return (
    <div className="overflow-x-auto" role="region" aria-label={caption} tabIndex={0}>
      <table className="w-full border-collapse text-left" aria-busy={isBusy}>
        <caption className="sr-only">{caption}</caption>
        <thead>
          <tr className="border-b border-rule">
            {columns.map((column) => (
              <HeadCell key={column.id} column={column} sort={sort} onSort={onSort} />
            ))}
          </tr>
        </thead>
        <tbody onKeyDown={onKeyDown} className={classNames(isBusy && 'opacity-60')}>
          {rows.map((row) => (
            <tr key={rowId(row)} className="border-b border-rule last:border-b-0 hover:bg-faint">
              {columns.map((column, index) => {
                const className = classNames(
                  'px-5 py-2.5 align-baseline font-normal max-sm:px-4',
                  column.isNumeric && 'figures text-right whitespace-nowrap',
                  // The least width keeps a column that may break anywhere from becoming one of letters.
                  index === 0 && 'min-w-28 wrap-anywhere sm:min-w-56',
                  index > 0 && column.isName && 'min-w-24 wrap-anywhere sm:min-w-44',
                  column.isSecondary && 'max-sm:hidden',
                )
                return index === 0 ? (
                  <th key={column.id} scope="row" className={className}>
                    {content(row, column)}
                  </th>
                ) : (
                  <td key={column.id} className={className}>
                    {content(row, column)}
                  </td>
                )
              })}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  )
}

interface HeadCellProps {
  column: GridColumn
  sort: { id: string; desc: boolean } | null
  onSort: (id: string) => void
}

function HeadCell({ column, sort, onSort }: HeadCellProps) {
  const direction = sort?.id === column.id ? (sort.desc ? 'descending' : 'ascending') : undefined
  return (
    <th
      scope="col"
      aria-sort={direction}
      className={classNames(
        'px-5 py-1 text-sm font-medium text-soft max-sm:px-4',
        column.isNumeric && 'text-right',
        column.isSecondary && 'max-sm:hidden',
      )}
    >
      {column.hasControls ? (
        <span className="sr-only">{column.header}</span>
      ) : column.isSortable === false ? (
        <span className="whitespace-nowrap">{column.header}</span>
      ) : (
        <button
          type="button"
          onClick={() => onSort(column.id)}
          className={classNames(
            'inline-flex min-h-8 items-center gap-1 rounded-control whitespace-nowrap hover:text-ink pointer-coarse:min-h-11',
            // The arrow's place lies outside the figures, so that the head ends where they do.
            column.isNumeric && 'flex-row-reverse',
            direction && 'text-ink',
          )}
        >
          {column.header}
          <span aria-hidden="true" className="w-3">
            {direction === 'ascending' ? '↑' : direction === 'descending' ? '↓' : ''}
          </span>
        </button>
      )}
    </th>
  )
}

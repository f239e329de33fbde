import { Select } from '@/components/ui/select'
import { classNames } from '@/components/ui/class-names'
import type { ColumnChoice, ImportFault, PreviewColumn, TablePreview } from '@/lib/formats/types'
import { assignRole, roleOf, type ColumnDraft, type ColumnRole } from './import-draft'

interface PreviewGridProps {
  preview: TablePreview
  columns: ColumnDraft
  onColumns: (columns: ColumnDraft) => void
  /** Marks the row and column it names. */
  fault: ImportFault | null
}

const roles = [
  { value: 'none', label: 'not used' },
  { value: 'time', label: 'time' },
  { value: 'displacement', label: 'RA displacement' },
  { value: 'declination', label: 'Dec displacement' },
  { value: 'wormAngle', label: 'worm angle' },
] as const

const timeUnits: { value: ColumnChoice['timeUnit']; label: string }[] = [
  { value: 'seconds', label: 'seconds' },
  { value: 'milliseconds', label: 'milliseconds' },
  { value: 'minutes', label: 'minutes' },
  { value: 'iso-8601', label: 'date and time (ISO 8601)' },
  { value: 'julian-date', label: 'Julian Date' },
]
const displacementUnits: { value: ColumnChoice['displacementUnit']; label: string }[] = [
  { value: 'px', label: 'pixels' },
  { value: 'arcsec', label: 'arc seconds' },
  { value: 'ra-seconds', label: 'seconds of RA' },
]
const wormAngleUnits: { value: ColumnChoice['wormAngleUnit']; label: string }[] = [
  { value: 'degrees', label: 'degrees' },
  { value: 'turns', label: 'turns' },
]

/** The first rows of the file; each column's head says what it is and in which unit. */
export function PreviewGrid({ preview, columns, onColumns, fault }: PreviewGridProps) {
  return (
    <div
      className="overflow-x-auto rounded-control border border-rule"
      role="region"
      aria-label="First rows of the file"
      tabIndex={0}
    >
      <table className="w-full border-collapse text-left text-sm">
        <caption className="sr-only">First rows of the file, with the meaning of each column</caption>
        <thead>
          <tr className="border-b border-rule align-top">
            <th scope="col" className="px-3 py-2 font-medium text-soft">
              row
            </th>
            {preview.columns.map((column) => (
              <th key={column.index} scope="col" className="min-w-52 px-3 py-2 font-normal max-sm:min-w-32 max-sm:px-2">
                <ColumnHead
                  column={column}
                  columns={columns}
                  onColumns={onColumns}
                  isFaulty={fault?.column === column.name}
                />
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {preview.rows.map((row) => (
            <tr
              key={row.rowNumber}
              className={classNames('border-b border-rule last:border-b-0', fault?.row === row.rowNumber && 'bg-faint')}
            >
              <th scope="row" className="figures px-3 py-1 font-normal text-soft">
                {row.rowNumber}
              </th>
              {preview.columns.map((column) => (
                <td
                  key={column.index}
                  className={classNames(
                    'figures max-w-56 truncate px-3 py-1 whitespace-pre max-sm:px-2',
                    roleOf(columns, column.index) === null && 'text-soft',
                  )}
                >
                  {row.cells[column.index] ?? ''}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
      {preview.rows.length === 0 ? <p className="px-3 py-4">No row of data lies below the first data row.</p> : null}
    </div>
  )
}

interface ColumnHeadProps {
  column: PreviewColumn
  columns: ColumnDraft
  onColumns: (columns: ColumnDraft) => void
  isFaulty: boolean
}

function ColumnHead({ column, columns, onColumns, isFaulty }: ColumnHeadProps) {
  const role = roleOf(columns, column.index)
  return (
    <div className="flex flex-col gap-1.5">
      <span className={classNames('font-medium', isFaulty && 'text-oxide underline')}>
        {column.name}
        {column.unitText ? <span className="font-normal text-soft"> ({column.unitText})</span> : null}
      </span>
      <Select
        aria-label={`Meaning of ${column.name}`}
        options={roles}
        value={role ?? 'none'}
        onChange={(event) => onColumns(assignRole(columns, column.index, asRole(event.target.value)))}
      />
      {role === 'time' ? (
        <Select
          aria-label={`Unit of ${column.name}`}
          options={timeUnits}
          value={columns.timeUnit}
          onChange={(event) =>
            onColumns({ ...columns, timeUnit: pick(timeUnits, event.target.value) ?? columns.timeUnit })
          }
        />
      ) : null}
      {role === 'displacement' ? (
        <Select
          aria-label={`Unit of ${column.name}`}
          options={displacementUnits}
          value={columns.displacementUnit}
          onChange={(event) =>
            onColumns({
              ...columns,
              displacementUnit: pick(displacementUnits, event.target.value) ?? columns.displacementUnit,
            })
          }
        />
      ) : null}
      {role === 'wormAngle' ? (
        <Select
          aria-label={`Unit of ${column.name}`}
          options={wormAngleUnits}
          value={columns.wormAngleUnit}
          onChange={(event) =>
            onColumns({ ...columns, wormAngleUnit: pick(wormAngleUnits, event.target.value) ?? columns.wormAngleUnit })
          }
        />
      ) : null}
      {role === 'declination' ? <span className="text-soft">in the same unit as RA</span> : null}
      {role === 'displacement' && column.unitText === null ? (
        <span className="text-soft">The file names no unit: check it</span>
      ) : null}
    </div>
  )
}

function asRole(value: string): ColumnRole | null {
  const role = roles.find((option) => option.value === value)?.value
  return role === undefined || role === 'none' ? null : role
}

function pick<Value extends string>(options: readonly { value: Value }[], value: string): Value | undefined {
  return options.find((option) => option.value === value)?.value
}

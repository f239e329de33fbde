import { Field } from '@/components/ui/field'
import { NumberField } from '@/components/ui/number-input'
import { Select } from '@/components/ui/select'
import type { TextLayout } from '@/lib/formats/types'

interface LayoutFieldsProps {
  layout: TextLayout
  /** What was corrected; the preview is made anew with it. */
  onLayout: (changes: Partial<TextLayout>) => void
  isOpen: boolean
}

const delimiters: { value: string; label: string; delimiter: TextLayout['delimiter'] }[] = [
  { value: 'comma', label: 'commas', delimiter: ',' },
  { value: 'semicolon', label: 'semicolons', delimiter: ';' },
  { value: 'tab', label: 'tabs', delimiter: '\t' },
  { value: 'blank', label: 'blanks', delimiter: ' ' },
]
const decimalMarks: { value: string; label: string; mark: TextLayout['decimalMark'] }[] = [
  { value: 'point', label: 'point (1.5)', mark: '.' },
  { value: 'comma', label: 'comma (1,5)', mark: ',' },
]
const encodings: { value: TextLayout['encoding']; label: string }[] = [
  { value: 'utf-8', label: 'UTF-8' },
  { value: 'utf-16le', label: 'UTF-16, little-endian' },
  { value: 'utf-16be', label: 'UTF-16, big-endian' },
  { value: 'windows-1252', label: 'Windows-1252 (Western European)' },
]

/** Corrections of what was guessed about the file's text. */
export function LayoutFields({ layout, onLayout, isOpen }: LayoutFieldsProps) {
  return (
    <details open={isOpen} className="rounded-control border border-rule px-4 py-2.5">
      <summary className="font-medium">Columns cut in the wrong places? Correct the layout</summary>
      <div className="mt-3 mb-1 grid grid-cols-3 gap-3 max-md:grid-cols-2 max-sm:grid-cols-1">
        <Field label="Columns are parted by">
          {(control) => (
            <Select
              {...control}
              options={delimiters}
              value={delimiters.find(({ delimiter }) => delimiter === layout.delimiter)?.value}
              onChange={(event) => {
                const chosen = delimiters.find(({ value }) => value === event.target.value)
                if (chosen) onLayout({ delimiter: chosen.delimiter })
              }}
            />
          )}
        </Field>
        <Field label="Decimal mark">
          {(control) => (
            <Select
              {...control}
              options={decimalMarks}
              value={decimalMarks.find(({ mark }) => mark === layout.decimalMark)?.value}
              onChange={(event) => {
                const chosen = decimalMarks.find(({ value }) => value === event.target.value)
                if (chosen) onLayout({ decimalMark: chosen.mark })
              }}
            />
          )}
        </Field>
        <Field label="Letters are coded in">
          {(control) => (
            <Select
              {...control}
              options={encodings}
              value={layout.encoding}
              onChange={(event) => {
                const chosen = encodings.find(({ value }) => value === event.target.value)
                if (chosen) onLayout({ encoding: chosen.value })
              }}
            />
          )}
        </Field>
        <NumberField
          label="Row of the column names"
          hint="Empty where there is none."
          value={layout.headerRow}
          onValue={(headerRow) => onLayout({ headerRow })}
          isInteger
          min={1}
        />
        <NumberField
          label="Row of the units"
          hint="Empty where there is none."
          value={layout.unitsRow}
          onValue={(unitsRow) => onLayout({ unitsRow })}
          isInteger
          min={1}
        />
        <NumberField
          label="First data row"
          value={layout.firstDataRow}
          onValue={(firstDataRow) => firstDataRow !== null && onLayout({ firstDataRow })}
          isInteger
          isRequired
          min={1}
        />
      </div>
    </details>
  )
}

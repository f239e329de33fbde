import { cleanup, fireEvent, render, screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { useState } from 'react'
import { afterEach, describe, expect, test, vi } from 'vitest'
import { ColumnMapper } from '@/components/import/column-mapper'
import { startDraft, withPreview, type ImportChoices, type ImportDraft } from '@/components/import/import-draft'
import { previewTable } from '@/lib/formats/preview-table'
import type { ImportFault, TablePreview, TextLayout } from '@/lib/formats/types'
import { importSettingsSchema } from '@/lib/schemas/import'
import { conversionSchema } from '@/lib/schemas/recipe'
import { runFactsSchema } from '@/lib/schemas/run-facts'
import { swing, table, utf8 } from '../formats/make-file'

// Rendering the whole form many times takes long where other work shares the processor.
vi.setConfig({ testTimeout: 30_000 })
afterEach(cleanup)

function previewOf(bytes: Uint8Array, layout: Partial<TextLayout> = {}): TablePreview {
  const outcome = previewTable(bytes, layout)
  if (!outcome.ok) throw new Error(outcome.fault.message)
  return outcome.preview
}

interface HostProps {
  bytes: Uint8Array
  onSubmit: (choices: ImportChoices) => void
  fault?: ImportFault | null
}

/** Holds the form's state as a page does. */
function Host({ bytes, onSubmit, fault = null }: HostProps) {
  const [layout, setLayout] = useState<Partial<TextLayout>>({})
  const [preview, setPreview] = useState(() => previewOf(bytes))
  const [draft, setDraft] = useState<ImportDraft>(() => startDraft(preview))
  return (
    <ColumnMapper
      fileName="hillside.csv"
      preview={preview}
      draft={draft}
      onDraft={setDraft}
      onLayout={(changes) => {
        const next = { ...layout, ...changes }
        const after = previewOf(bytes, next)
        setLayout(next)
        setPreview(after)
        setDraft(withPreview(draft, preview, after))
      }}
      onSubmit={onSubmit}
      fault={fault}
    />
  )
}

const guided = utf8('time (s),RA (px),Dec (px),note\n' + table(40, (i) => `${i * 2.5},${swing(i)},0.1,ok`))
/** Typing in one go: letter by letter takes seconds on a busy machine. */
const type = (field: HTMLElement, value: string) => fireEvent.change(field, { target: { value } })
const submit = () => screen.getByRole('button', { name: 'Read the file' })
const control = (name: string | RegExp) => screen.getByLabelText<HTMLInputElement & HTMLSelectElement>(name)

describe('ColumnMapper', () => {
  test('shows the first rows with their row numbers and the guessed meaning of each column', () => {
    render(<Host bytes={guided} onSubmit={() => {}} />)
    expect(control('Meaning of time').value).toBe('time')
    expect(control('Meaning of RA').value).toBe('displacement')
    expect(control('Unit of RA').value).toBe('px')
    expect(control('Meaning of Dec').value).toBe('declination')
    expect(control('Meaning of note').value).toBe('none')
    const region = screen.getByRole('region', { name: 'First rows of the file' })
    expect(within(region).getByRole('rowheader', { name: '13' })).toBeDefined()
    expect(region.tabIndex).toBe(0)
  })

  test('every field has a name', () => {
    const { container } = render(<Host bytes={guided} onSubmit={() => {}} />)
    const fields = [...container.querySelectorAll<HTMLInputElement>('input, select, textarea')]
    expect(fields.length).toBeGreaterThan(10)
    expect(fields.filter((field) => !field.getAttribute('aria-label') && !field.labels?.length)).toEqual([])
  })

  test('says beside the fields what is missing, keeps what was typed, then hands over complete choices', async () => {
    const user = userEvent.setup({ delay: null })
    const onSubmit = vi.fn<(choices: ImportChoices) => void>()
    render(<Host bytes={guided} onSubmit={onSubmit} />)
    type(control('Exposure'), '2.5')
    await user.click(submit())
    expect(onSubmit).not.toHaveBeenCalled()
    expect(screen.getByText(/Pixels need an image scale/)).toBeDefined()
    expect(screen.getByText(/needs the declination of the field/)).toBeDefined()
    await waitFor(() => expect(document.activeElement).toBe(control('Image scale')), { timeout: 5000 })
    expect(control('Exposure').value).toBe('2.5')

    type(control('Image scale'), '1.55')
    type(control('Declination of the field'), '-8.9')
    type(control('Teeth of the worm wheel'), '152')
    expect(screen.getByText(/One turn of the worm takes 566\.87/)).toBeDefined()
    await user.selectOptions(control('This is'), 'proven')
    await user.click(submit())
    expect(onSubmit).not.toHaveBeenCalled()
    type(control('How it was proven'), 'one pulse west')
    await user.selectOptions(control('Correction in the mount'), 'off')
    await user.selectOptions(control('Guiding'), 'off')
    type(control('Temperature'), '−4')
    await user.click(submit())

    const choices = onSubmit.mock.calls[0][0]
    expect(importSettingsSchema.parse(choices.settings)).toEqual(choices.settings)
    expect(conversionSchema.parse(choices.conversion)).toEqual(choices.conversion)
    expect(runFactsSchema.parse(choices.facts)).toEqual(choices.facts)
    expect(choices.settings.columns).toMatchObject({ time: 0, displacement: 1, displacementUnit: 'px', declination: 2 })
    expect(choices.conversion).toMatchObject({
      displacementUnit: 'px',
      imageScaleArcsecPerPx: 1.55,
      imageScaleUncertaintyPercent: 1,
      declinationDegrees: -8.9,
      exposureSeconds: 2.5,
      senseBasis: 'proven',
    })
    expect(choices.facts).toMatchObject({
      mountCorrection: 'off',
      senseProof: 'one pulse west',
      guiding: 'off',
      temperatureCelsius: -4,
    })
    expect(choices.wheelTeeth).toBe(152)
  })

  test('an image scale from focal length and pixel size; the typed scale is kept for going back', async () => {
    const user = userEvent.setup({ delay: null })
    const onSubmit = vi.fn<(choices: ImportChoices) => void>()
    render(<Host bytes={guided} onSubmit={onSubmit} />)
    type(control('Image scale'), '7')
    await user.click(screen.getByRole('radio', { name: 'From focal length' }))
    type(control('Focal length'), '240')
    type(control('Pixel size'), '3.75')
    // 206.264806 · 3.75 / 240 = 3.2228876 ″/px, from 648000/π arc seconds in a radian.
    expect(screen.getByText(/^3\.2229/)).toBeDefined()
    await user.click(screen.getByRole('radio', { name: 'Known or measured' }))
    expect(control('Image scale').value).toBe('7')
    await user.click(screen.getByRole('radio', { name: 'From focal length' }))
    type(control('Declination of the field'), '0')
    await user.click(submit())
    expect(onSubmit.mock.calls[0][0].conversion.imageScaleArcsecPerPx).toBeCloseTo(3.22288759, 6)
  })

  test('a role moves from one column to another; seconds of RA need no scale and no declination', async () => {
    const user = userEvent.setup({ delay: null })
    const onSubmit = vi.fn<(choices: ImportChoices) => void>()
    render(<Host bytes={guided} onSubmit={onSubmit} />)
    await user.selectOptions(control('Meaning of Dec'), 'displacement')
    expect(control('Meaning of RA').value).toBe('none')
    await user.selectOptions(control('Unit of Dec'), 'ra-seconds')
    expect(screen.queryByLabelText('Image scale')).toBeNull()
    await user.click(submit())
    const choices = onSubmit.mock.calls[0][0]
    expect(choices.settings.columns).toMatchObject({
      displacement: 2,
      displacementUnit: 'ra-seconds',
      declination: null,
    })
    expect(choices.conversion.displacementUnit).toBe('ra-seconds')
  })

  test('without a guess it asks, and a missing column is said in words', async () => {
    const user = userEvent.setup({ delay: null })
    const onSubmit = vi.fn()
    const bytes = utf8('alpha;beta\n' + table(40, (i) => `${swing(i * 40)};${swing(i * 55)}`).replaceAll('.', ','))
    render(<Host bytes={bytes} onSubmit={onSubmit} />)
    expect(screen.getByText(/could not be guessed/)).toBeDefined()
    await user.click(submit())
    expect(screen.getByText(/Choose the column that holds the time/)).toBeDefined()
    expect(screen.getByText(/Choose the column that holds the displacement/)).toBeDefined()
    expect(onSubmit).not.toHaveBeenCalled()
  })

  test('a corrected layout gives a new preview; the rest of the form stays', async () => {
    const user = userEvent.setup({ delay: null })
    render(<Host bytes={guided} onSubmit={() => {}} />)
    type(control('Exposure'), '3')
    type(control('First data row'), '11')
    const region = screen.getByRole('region', { name: 'First rows of the file' })
    expect(within(region).queryByRole('rowheader', { name: '2' })).toBeNull()
    expect(within(region).getByRole('rowheader', { name: '11' })).toBeDefined()
    await user.selectOptions(control('Columns are parted by'), 'semicolon')
    expect(control('Exposure').value).toBe('3')
  })

  test('a number that cannot be read stops the form and stays in its field', async () => {
    const user = userEvent.setup({ delay: null })
    const onSubmit = vi.fn()
    const bytes = utf8('time (s),RA (s)\n' + table(40, (i) => `${i},${swing(i)}`))
    render(<Host bytes={bytes} onSubmit={onSubmit} />)
    type(control('Exposure'), 'two')
    await user.click(submit())
    expect(onSubmit).not.toHaveBeenCalled()
    expect(control('Exposure').value).toBe('two')
    expect(document.activeElement).toBe(control('Exposure'))
  })

  test('a fault of the reading is announced with its message', () => {
    const fault: ImportFault = { code: 'constant', message: '“RA” holds “4.5” in every row.', row: null, column: 'RA' }
    render(<Host bytes={guided} onSubmit={() => {}} fault={fault} />)
    expect(screen.getByRole('alert').textContent).toContain('holds “4.5” in every row')
  })
})

describe('the form as it opens', () => {
  test('takes what the preamble says', () => {
    const text =
      '# focal length = 1200 mm, pixel size = 3.75 um, binning = 2\n# exposure: 2 s\n# declination: +8.9\ntime,ra px\n'
    const draft = startDraft(previewOf(utf8(text + table(40, (i) => `${i},${swing(i)}`))))
    expect(draft.scaleFrom).toBe('optics')
    expect(draft.conversion.imageScaleArcsecPerPx).toBeCloseTo(1.28915504, 6)
    expect(draft.conversion).toMatchObject({ exposureSeconds: 2, declinationDegrees: 8.9, displacementUnit: 'px' })
  })

  test('takes the choices of the last import where the file looks the same, its own guess where it does not', () => {
    const preview = previewOf(guided)
    const first = startDraft(preview)
    const columns = { ...preview.suggested!, declination: null }
    const sense = { positiveMeans: 'behind', senseBasis: 'proven' } as const
    const conversion = { ...first.conversion, imageScaleArcsecPerPx: 1.55, ...sense }
    const lastImport = { settings: { version: 1 as const, layout: preview.layout, columns }, conversion }
    const again = startDraft(preview, { lastImport, wheelTeeth: 152 })
    expect(again.columns.declination).toBeNull()
    expect(again.conversion).toMatchObject({
      imageScaleArcsecPerPx: 1.55,
      positiveMeans: 'behind',
      senseBasis: 'assumed',
    })
    expect(again.wheelTeeth).toBe(152)

    const other = previewOf(utf8('clock;ra (arcsec)\n' + table(40, (i) => `2031-11-14T21:03:${10 + i};${swing(i)}`)))
    expect(startDraft(other, { lastImport }).columns).toEqual(other.suggested)
    expect(startDraft(other, { lastImport }).conversion.displacementUnit).toBe('arcsec')
  })
})

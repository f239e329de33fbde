import type { Conversion } from '@/lib/analysis/types'
import { hintsFromMetadata } from '@/lib/formats/metadata-hints'
import type { ColumnChoice, ImportSettings, TablePreview } from '@/lib/formats/types'
import { defaultRecipe } from '@/lib/schemas/recipe'
import { unknownRunFacts, type RunFacts } from '@/lib/schemas/run-facts'
import { imageScaleArcsecPerPx } from '@/lib/units'

/** A choice of columns that need not be complete yet. */
export type ColumnDraft = Omit<ColumnChoice, 'time' | 'displacement'> & {
  time: number | null
  displacement: number | null
}

export interface OpticsDraft {
  focalLengthMillimetres: number | null
  pixelSizeMicrometres: number | null
  binning: number | null
}

/** All that the import form holds; kept by whoever shows the form, so that nothing typed is lost. */
export interface ImportDraft {
  columns: ColumnDraft
  conversion: Conversion
  facts: RunFacts
  wheelTeeth: number | null
  /** Which of the two decides conversion.imageScaleArcsecPerPx; the other keeps what was typed. */
  scaleFrom: 'direct' | 'optics'
  directScaleArcsecPerPx: number | null
  optics: OpticsDraft
}

/** What a complete form gives. */
export interface ImportChoices {
  settings: ImportSettings
  conversion: Conversion
  facts: RunFacts
  wheelTeeth: number | null
}

export type ColumnRole = 'time' | 'displacement' | 'declination' | 'wormAngle'

interface EarlierChoices {
  lastImport?: { settings: ImportSettings; conversion: Conversion } | null
  wheelTeeth?: number | null
}

/** The form as it opens: the guesses of the preview, the optics and sense of the last import, what the preamble says. */
export function startDraft(
  preview: TablePreview,
  { lastImport = null, wheelTeeth = null }: EarlierChoices = {},
): ImportDraft {
  const hints = hintsFromMetadata(preview.metadata)
  const columns = columnsFor(preview, lastImport?.settings ?? null)
  const { focalLengthMillimetres, pixelSizeMicrometres, binning } = hints
  const optics = { focalLengthMillimetres, pixelSizeMicrometres, binning: binning ?? 1 }
  const isFromOptics = hints.imageScaleArcsecPerPx === null && imageScaleArcsecPerPx(optics) !== null
  const conversion = lastImport?.conversion ?? { ...defaultRecipe().conversion, imageScaleUncertaintyPercent: 1 }
  return setScale({
    columns,
    conversion: {
      ...conversion,
      displacementUnit: columns.displacementUnit,
      // Last time's proof says nothing of tonight: the camera may have been turned since.
      senseBasis: 'assumed',
      declinationDegrees: hints.declinationDegrees ?? conversion.declinationDegrees,
      exposureSeconds: hints.exposureSeconds ?? conversion.exposureSeconds,
    },
    facts: unknownRunFacts(),
    wheelTeeth,
    scaleFrom: isFromOptics ? 'optics' : 'direct',
    directScaleArcsecPerPx: hints.imageScaleArcsecPerPx ?? conversion.imageScaleArcsecPerPx,
    optics,
  })
}

/** The same form over a corrected layout: the columns are guessed again where the table's shape has changed. */
export function withPreview(draft: ImportDraft, before: TablePreview, after: TablePreview): ImportDraft {
  const isSameShape = before.columns.length === after.columns.length
  if (isSameShape && isComplete(draft.columns)) return draft
  return setColumns(draft, columnsFor(after, null))
}

/** Gives a column a role, or none; a role is held by one column, and a column holds one role. */
export function assignRole(columns: ColumnDraft, index: number, role: ColumnRole | null): ColumnDraft {
  const next = { ...columns }
  for (const held of ['time', 'displacement', 'declination', 'wormAngle'] as const)
    if (next[held] === index) next[held] = null
  if (role !== null) next[role] = index
  return next
}

export function roleOf(columns: ColumnDraft, index: number): ColumnRole | null {
  const roles = ['time', 'displacement', 'declination', 'wormAngle'] as const
  return roles.find((role) => columns[role] === index) ?? null
}

/** Changes the columns; the conversion's unit follows the displacement's. */
export function setColumns(draft: ImportDraft, columns: ColumnDraft): ImportDraft {
  return { ...draft, columns, conversion: { ...draft.conversion, displacementUnit: columns.displacementUnit } }
}

/** Changes what the image scale comes from; the scale of the conversion follows. */
export function setScale(
  draft: ImportDraft,
  changes: Partial<Pick<ImportDraft, 'scaleFrom' | 'directScaleArcsecPerPx' | 'optics'>> = {},
): ImportDraft {
  const next = { ...draft, ...changes }
  const scale = next.scaleFrom === 'direct' ? next.directScaleArcsecPerPx : imageScaleArcsecPerPx(next.optics)
  return { ...next, conversion: { ...next.conversion, imageScaleArcsecPerPx: scale } }
}

/** The choices of a complete form, null while time or displacement is open. */
export function choicesOf(draft: ImportDraft, preview: TablePreview): ImportChoices | null {
  const { columns, conversion, facts, wheelTeeth } = draft
  if (!isComplete(columns)) return null
  const senseProof = conversion.senseBasis === 'proven' ? facts.senseProof : null
  const mountCorrectionTable = facts.mountCorrection === 'on' ? facts.mountCorrectionTable : null
  return {
    settings: { version: 1, layout: preview.layout, columns },
    conversion,
    facts: { ...facts, senseProof, mountCorrectionTable },
    wheelTeeth,
  }
}

function isComplete(columns: ColumnDraft): columns is ColumnChoice {
  return columns.time !== null && columns.displacement !== null
}

/** Last time's columns where the file looks the same to them, else the guess. */
function columnsFor(preview: TablePreview, last: ImportSettings | null): ColumnDraft {
  if (last && looksAlike(preview, last)) return last.columns
  return (
    preview.suggested ?? {
      time: preview.columns.find((column) => column.guess === 'time')?.index ?? null,
      timeUnit: 'seconds',
      displacement: null,
      displacementUnit: 'arcsec',
      declination: null,
      wormAngle: null,
      wormAngleUnit: 'degrees',
    }
  )
}

/** Same delimiter, numbers where they were, and no word in the file against the units of last time. */
function looksAlike({ layout, columns, suggested }: TablePreview, last: ImportSettings): boolean {
  const { time, timeUnit, displacement, displacementUnit, declination, wormAngle } = last.columns
  const isThere = [time, displacement, declination, wormAngle].every(
    (index) => index === null || index < columns.length,
  )
  if (layout.delimiter !== last.layout.delimiter || !isThere || !columns[displacement].isNumeric) return false
  if (suggested === null) return true
  const isUnitSame = columns[displacement].unitText === null || suggested.displacementUnit === displacementUnit
  return suggested.time === time && suggested.timeUnit === timeUnit && isUnitSame
}

import type { ImportDraft } from './import-draft'

export type ImportField = 'time' | 'displacement' | 'imageScale' | 'declination' | 'senseProof'
export type ImportFieldFaults = Partial<Record<ImportField, string>>

/** What the form still lacks, in words, by field; empty when the file can be read with it. */
export function importFieldFaults({ columns, conversion, facts }: ImportDraft): ImportFieldFaults {
  const faults: ImportFieldFaults = {}
  if (columns.time === null) faults.time = 'Choose the column that holds the time'
  if (columns.displacement === null)
    faults.displacement = 'Choose the column that holds the displacement in right ascension'
  const { displacementUnit, imageScaleArcsecPerPx, declinationDegrees, frame, senseBasis } = conversion
  if (displacementUnit === 'px' && imageScaleArcsecPerPx === null) {
    faults.imageScale = 'Pixels need an image scale: type it, or give focal length and pixel size'
  }
  if (displacementUnit !== 'ra-seconds' && frame === 'sky' && declinationDegrees === null) {
    faults.declination = 'A displacement on the sky needs the declination of the field'
  }
  if (senseBasis === 'proven' && !facts.senseProof?.trim())
    faults.senseProof = 'Say in a few words how the sense was proven'
  return faults
}

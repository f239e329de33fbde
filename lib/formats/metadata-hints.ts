/** What a file's preamble says of the recording, as far as its words are plain; null where it says nothing. */
export interface MetadataHints {
  exposureSeconds: number | null
  declinationDegrees: number | null
  imageScaleArcsecPerPx: number | null
  focalLengthMillimetres: number | null
  pixelSizeMicrometres: number | null
  binning: number | null
}

interface Reading {
  /** Words of the key in ordinary language, blanks and marks left out. */
  keys: string[]
  /** Factor of each unit that may follow the number; '' where none is written. */
  units: Record<string, number>
  isAllowed: (value: number) => boolean
}

const isPositive = (value: number) => value > 0

const READINGS: Record<keyof MetadataHints, Reading> = {
  exposureSeconds: {
    keys: ['exposure', 'exposuretime'],
    units: { '': 1, s: 1, sec: 1, seconds: 1, ms: 0.001 },
    isAllowed: (value) => value >= 0 && value <= 3600,
  },
  declinationDegrees: {
    keys: ['declination', 'dec'],
    units: { '': 1, deg: 1, degrees: 1, '°': 1 },
    isAllowed: (value) => Math.abs(value) < 89,
  },
  imageScaleArcsecPerPx: {
    keys: ['imagescale', 'pixelscale', 'scale'],
    units: { '': 1, 'arcsec/px': 1, 'arcsec/pixel': 1, '"/px': 1, '″/px': 1 },
    isAllowed: isPositive,
  },
  focalLengthMillimetres: { keys: ['focallength'], units: { '': 1, mm: 1, cm: 10, m: 1000 }, isAllowed: isPositive },
  pixelSizeMicrometres: { keys: ['pixelsize'], units: { '': 1, um: 1, µm: 1, μm: 1 }, isAllowed: isPositive },
  binning: {
    keys: ['binning'],
    units: { '': 1, x: 1 },
    isAllowed: (value) => Number.isInteger(value) && value >= 1 && value <= 16,
  },
}

/** Reads the pairs of TablePreview.metadata; a unit that is not known, or a value out of range, gives nothing. */
export function hintsFromMetadata(metadata: Record<string, string>): MetadataHints {
  const words = new Map(
    Object.entries(metadata).map(([key, value]) => [key.toLowerCase().replace(/[^\p{L}]+/gu, ''), value]),
  )
  const hint = ({ keys, units, isAllowed }: Reading): number | null => {
    const text = keys.map((key) => words.get(key)).find((value) => value !== undefined)
    const match = /^([-+\u2212]?\d+(?:[.,]\d+)?)\s*(\S*)$/.exec(text?.trim() ?? '')
    if (!match) return null
    const factor = units[match[2].toLowerCase()]
    if (factor === undefined) return null
    const value = Number(match[1].replace('\u2212', '-').replace(',', '.')) * factor
    return isAllowed(value) ? value : null
  }
  return {
    exposureSeconds: hint(READINGS.exposureSeconds),
    declinationDegrees: hint(READINGS.declinationDegrees),
    imageScaleArcsecPerPx: hint(READINGS.imageScaleArcsecPerPx),
    focalLengthMillimetres: hint(READINGS.focalLengthMillimetres),
    pixelSizeMicrometres: hint(READINGS.pixelSizeMicrometres),
    binning: hint(READINGS.binning),
  }
}

import { parseTable } from '@/lib/formats/parse-table'
import { previewTable } from '@/lib/formats/preview-table'
import type { ImportOutcome, ImportSettings, ParsedRun, TablePreview, TextLayout } from '@/lib/formats/types'

/** A small seeded generator (splitmix32) for test data. */
export function seededRandom(seed: number): () => number {
  let state = seed >>> 0
  return () => {
    state = (state + 0x9e3779b9) >>> 0
    let x = state
    x = Math.imul(x ^ (x >>> 16), 0x85ebca6b)
    x = Math.imul(x ^ (x >>> 13), 0xc2b2ae35)
    return ((x ^ (x >>> 16)) >>> 0) / 2 ** 32
  }
}

export const utf8 = (text: string): Uint8Array => new TextEncoder().encode(text)

export function utf16(text: string, { isBigEndian = false, hasMark = true } = {}): Uint8Array {
  const units = hasMark ? `\ufeff${text}` : text
  const bytes = new Uint8Array(units.length * 2)
  const view = new DataView(bytes.buffer)
  for (let i = 0; i < units.length; i++) view.setUint16(2 * i, units.charCodeAt(i), !isBigEndian)
  return bytes
}

/** Only for letters whose Windows-1252 code is their Unicode code point. */
export const latin1 = (text: string): Uint8Array => Uint8Array.from(text, (letter) => letter.charCodeAt(0))

/** A worm's swing with a drift: finite, never constant, two decimals and more. */
export function swing(index: number): number {
  return Number((7.35 * Math.sin((2 * Math.PI * index * 2.5) / 566.87) + 0.006 * index).toFixed(4))
}

/** Rows made by a function of the row's index, joined with line ends. */
export function table(rowCount: number, row: (index: number) => string, lineEnd = '\n'): string {
  return Array.from({ length: rowCount }, (_, index) => row(index)).join(lineEnd) + lineEnd
}

export function previewOf(bytes: Uint8Array, layout?: Partial<TextLayout>): TablePreview {
  const outcome = previewTable(bytes, layout)
  if (!outcome.ok) throw new Error(outcome.fault.message)
  return outcome.preview
}

export function settingsOf(
  bytes: Uint8Array,
  changes: Partial<ImportSettings['columns']> = {},
  layout?: Partial<TextLayout>,
): ImportSettings {
  const preview = previewOf(bytes, layout)
  const columns = preview.suggested ?? {
    time: 0,
    timeUnit: 'seconds' as const,
    displacement: 1,
    displacementUnit: 'arcsec' as const,
    declination: null,
    wormAngle: null,
    wormAngleUnit: 'degrees' as const,
  }
  return { version: 1, layout: preview.layout, columns: { ...columns, ...changes } }
}

/** Runs the reading to its end; progress must stay within 0 … 1 and never fall. */
export function readAll(bytes: Uint8Array, settings: ImportSettings): { outcome: ImportOutcome; progress: number[] } {
  const reading = parseTable(bytes, settings)
  const progress: number[] = []
  for (;;) {
    const step = reading.next()
    if (step.done) return { outcome: step.value, progress }
    progress.push(step.value)
  }
}

export function read(
  bytes: Uint8Array,
  changes: Partial<ImportSettings['columns']> = {},
  layout?: Partial<TextLayout>,
): ImportOutcome {
  return readAll(bytes, settingsOf(bytes, changes, layout)).outcome
}

export function readOk(
  bytes: Uint8Array,
  changes: Partial<ImportSettings['columns']> = {},
  layout?: Partial<TextLayout>,
): ParsedRun {
  const outcome = read(bytes, changes, layout)
  if (!outcome.ok) throw new Error(outcome.fault.message)
  return outcome
}

import { createHash } from 'node:crypto'
import { setImmediate } from 'node:timers/promises'
import { promisify } from 'node:util'
import { gzip } from 'node:zlib'
import { packColumns } from '@/lib/formats/packed-columns'
import { parseTable } from '@/lib/formats/parse-table'
import type { ImportFault, ImportSettings } from '@/lib/formats/types'

const compress = promisify(gzip)

export interface ReadColumns {
  ok: true
  rowCount: number
  /** Absolute time of the first row in ms since 1970; null where the file holds none. */
  startedAtMs: number | null
  /** SHA-256 of the packed columns before they were compressed. */
  samplesSha256: string
  compressed: Buffer
}

/** Reads a file's chosen columns in the form in which they are stored; other work goes on in between. */
export async function readColumns(
  bytes: Uint8Array,
  settings: ImportSettings,
): Promise<ReadColumns | { ok: false; fault: ImportFault }> {
  const steps = parseTable(bytes, settings)
  let step = steps.next()
  while (!step.done) {
    await setImmediate()
    step = steps.next()
  }
  const parsed = step.value
  if (!parsed.ok) return parsed
  const packed = packColumns(parsed.columns, parsed.startedAtMs)
  return {
    ok: true,
    rowCount: parsed.rowCount,
    startedAtMs: parsed.startedAtMs,
    samplesSha256: createHash('sha256').update(packed).digest('hex'),
    compressed: await compress(packed),
  }
}

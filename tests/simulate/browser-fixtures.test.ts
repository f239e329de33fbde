import { mkdtemp, rm, stat } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { describe, expect, test } from 'vitest'
import { drain } from '@/lib/analysis/drain'
import { parseTable } from '@/lib/formats/parse-table'
import { previewTable } from '@/lib/formats/preview-table'
import type { ColumnChoice } from '@/lib/formats/types'
import { badFiles, writeOneByteTooLarge } from '../e2e/fixtures/bad-files'
import { pixelRecording, semicolonRecording, visitorRecording } from '../e2e/fixtures/recordings'

/** Where a column is not guessed (one that never moves is not), the visitor takes the second for the displacement. */
const BY_HAND: ColumnChoice = {
  time: 0,
  timeUnit: 'seconds',
  displacement: 1,
  displacementUnit: 'arcsec',
  declination: null,
  wormAngle: null,
  wormAngleUnit: 'degrees',
}

/** What the bench says of a file: code of the fault, or null. */
function faultOf(bytes: Uint8Array): string | null {
  const preview = previewTable(bytes)
  if (!preview.ok) return preview.fault.code
  const { layout, suggested } = preview.preview
  const outcome = drain(parseTable(bytes, { version: 1, layout, columns: suggested ?? BY_HAND }))
  return outcome.ok ? null : outcome.fault.code
}

describe('the files of the browser tests are what they are called', () => {
  test.each([
    ['visitor', visitorRecording()],
    ['semicolon', semicolonRecording()],
    ['pixel', pixelRecording()],
  ])('%s recording is read without help', (_, { file }) => {
    expect(faultOf(file.buffer)).toBeNull()
  })

  test.each([
    ['empty', 'empty'],
    ['binary', 'binary'],
    ['wrongColumns', 'no-columns'],
    ['fiveRows', 'few-rows'],
    ['constantSignal', 'constant'],
  ] as const)('%s is refused as %s', (name, code) => {
    expect(faultOf(badFiles[name]().buffer)).toBe(code)
  })

  test('the large one has 64 MB and one byte', async () => {
    const folder = await mkdtemp(join(tmpdir(), 'turnwright-'))
    try {
      const { size } = await stat(await writeOneByteTooLarge(folder))
      expect(size).toBe(67_108_865)
    } finally {
      await rm(folder, { recursive: true })
    }
  })
})

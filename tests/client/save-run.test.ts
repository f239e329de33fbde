import { afterEach, expect, test, vi } from 'vitest'
import { importRun } from '@/lib/client/save-run'
import { createWorkSaver } from '@/lib/client/save-work'
import type { AnalysisResult } from '@/lib/analysis/types'
import type { Run } from '@/lib/schemas/api'
import { defaultRecipe } from '@/lib/schemas/recipe'
import { unknownRunFacts } from '@/lib/schemas/run-facts'
import { SAMPLE_CONVERSION, SAMPLE_DRIVE_TRAIN, SAMPLE_IMPORT } from '@/lib/simulate/sample'

afterEach(() => vi.unstubAllGlobals())

const id = '7d2f4a52-6f0e-4f6c-9d40-0c1f5a3c9b11'
const moment = '2026-11-01T20:00:00.000Z'

const uploaded: Run = {
  id,
  version: 1,
  projectId: id,
  name: 'First night',
  fileName: 'night.csv',
  byteLength: 3,
  fileSha256: 'a'.repeat(64),
  status: 'uploaded',
  importSettings: null,
  conversion: null,
  facts: unknownRunFacts(),
  rowCount: null,
  samplesSha256: null,
  analysisCount: 0,
  createdAt: moment,
  createdBy: 'Mira',
  updatedAt: moment,
}
const choices = { settings: SAMPLE_IMPORT, conversion: SAMPLE_CONVERSION, facts: unknownRunFacts() }

/** As the server's database gives it back: with the keys of its JSON in another order. */
function ready(given: Partial<Run> = {}): Run {
  const reversed = <T extends object>(value: T) => Object.fromEntries(Object.entries(value).reverse()) as T
  return {
    ...uploaded,
    version: 2,
    status: 'ready',
    importSettings: reversed(SAMPLE_IMPORT),
    conversion: reversed(SAMPLE_CONVERSION),
    rowCount: 20,
    samplesSha256: 'b'.repeat(64),
    ...given,
  }
}

function conflict(current: Run): Response {
  const error = { code: 'changed-meanwhile', message: 'Changed by Mira meanwhile', changedBy: 'Mira', current }
  return Response.json({ error }, { status: 409 })
}

test('a reading whose answer was lost counts as done when it is asked for again', async () => {
  vi.stubGlobal('fetch', async () => conflict(ready()))
  expect(await importRun(uploaded, choices)).toMatchObject({ version: 2, status: 'ready' })
})

test.each([
  ['with other columns', ready({ conversion: { ...SAMPLE_CONVERSION, declinationDegrees: 12 } })],
  ['only renamed', { ...uploaded, version: 2, name: 'Renamed' }],
])('a run that somebody else has changed meanwhile, %s, is a conflict', async (_, current) => {
  vi.stubGlobal('fetch', async () => conflict(current))
  await expect(importRun(uploaded, choices)).rejects.toThrow('Changed by Mira')
})

test('saving goes on where it broke off and stores the file once', async () => {
  const asked: string[] = []
  let isDown = true
  vi.stubGlobal('fetch', async (url: string, { method }: RequestInit) => {
    const path = url.replace(/\?.*/, '').replaceAll(id, '…')
    asked.push(`${method} ${path}`)
    if (path.endsWith('/runs')) return Response.json(uploaded, { status: 201 })
    if (path.endsWith('/import') && isDown) throw new TypeError('Failed to fetch')
    if (path.endsWith('/import')) return Response.json(ready())
    return Response.json({ error: { code: 'unknown', message: 'The end of what is told here' } }, { status: 500 })
  })
  const save = createWorkSaver()
  const bytes = new TextEncoder().encode('0,1')
  const work = { version: 1 as const, fileName: 'night.csv', bytes, driveTrain: SAMPLE_DRIVE_TRAIN, ...choices }
  const names = { projectName: '', runName: 'First night', analysisName: 'First look' }
  const result = { engineVersion: '0', rows: 3, used: 3 } as AnalysisResult
  const recipe = { ...defaultRecipe(), conversion: SAMPLE_CONVERSION }
  const attempt = () => save({ work, recipe, result, projectId: id, ...names }, () => {})
  await expect(attempt()).rejects.toThrow('can’t be reached')
  isDown = false
  await expect(attempt()).rejects.toThrow('The end of what is told here')
  const runs = '/api/projects/…/runs'
  expect(asked).toEqual([
    `POST ${runs}`,
    `PUT ${runs}/…/import`,
    `PUT ${runs}/…/import`,
    'POST /api/projects/…/analyses',
  ])
})

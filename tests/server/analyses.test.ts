import { beforeAll, describe, expect, test, vi } from 'vitest'
import * as auditEvents from '@/app/api/projects/[projectId]/audit-events/route'
import * as analyses from '@/app/api/projects/[projectId]/analyses/route'
import * as analysis from '@/app/api/projects/[projectId]/analyses/[analysisId]/route'
import * as notes from '@/app/api/projects/[projectId]/analyses/[analysisId]/notes/route'
import * as note from '@/app/api/projects/[projectId]/notes/[noteId]/route'
import * as corrections from '@/app/api/projects/[projectId]/corrections/route'
import * as correction from '@/app/api/projects/[projectId]/corrections/[correctionId]/route'
import * as download from '@/app/api/projects/[projectId]/corrections/[correctionId]/download/route'
import * as history from '@/app/api/projects/[projectId]/history/route'
import { accessProject } from '@/db/queries/access'
import { defaultRecipe } from '@/lib/schemas/recipe'
import { loadAnalysis } from '@/lib/server/load-analyses'
import { unlessUnreadable } from '@/lib/server/plain'
import { openTestDatabase } from '../support/test-database'
import {
  makeAnalysis,
  makeNote,
  makeProject,
  makeRun,
  makeTable,
  someResult,
  upload,
  type TestProject,
} from '../support/test-project'
import { call } from '../support/test-server'

const database = openTestDatabase()

let project: TestProject
let projectId: string
let owner: { projectId: string; cookie: string }
let editor: { projectId: string; cookie: string }

beforeAll(async () => {
  project = await makeProject(database.db)
  projectId = project.id
  owner = { projectId, cookie: project.people.owner.cookie }
  editor = { projectId, cookie: project.people.editor.cookie }
})

const post = (handler: unknown, body: unknown, more: Record<string, string> = {}) =>
  call(handler, '/', { projectId, ...more }, { method: 'POST', body, cookie: owner.cookie })

async function get(handler: unknown, params: Record<string, string>, query = '') {
  return (await call(handler, `/${query}`, { projectId, ...params }, { cookie: owner.cookie })).json()
}

describe('a saved analysis', () => {
  test('is read again to the last digit, with the hash of the run’s samples', async () => {
    const run = await makeRun(owner)
    const result = someResult({ engineVersion: '0.1.0' })
    // Doubles that a decimal detour would change.
    result.drift.rateArcsecPerSecond = { value: 0.1 + 0.2, stderr: 5e-324 }
    result.spans.rawArcsec = 1.7976931348623157e308
    result.worm!.harmonics[0].cosArcsec = -2.2250738585072014e-308
    const made = await makeAnalysis(owner, run.id, result)
    expect(made).toMatchObject({
      samplesSha256: run.samplesSha256,
      engineVersion: '0.1.0',
      runName: run.name,
      createdBy: 'Olga Owner',
      wormPeriodSeconds: 566.8690164473684,
      wormAmplitudeArcsec: 4.000000000000001,
      peakToPeakArcsec: 8,
    })
    const again = await get(analysis.GET, { analysisId: made.id })
    expect(again).toEqual(made)
    expect(again.result).toEqual(result)
    expect(again.recipe).toEqual(defaultRecipe())
  })

  test('that can’t be read any more is a fault of the server, and takes no list and no overview with it', async () => {
    const fresh = await makeProject(database.db)
    const where = { projectId: fresh.id, cookie: fresh.people.owner.cookie }
    const made = await makeAnalysis(where, (await makeRun(where)).id)
    const table = await makeTable(where, made.id)
    await database.db.updateTable('analyses').set({ recipe: '{}' }).where('id', '=', made.id).execute()
    await database.db
      .updateTable('corrections')
      .set({ tableResult: '{}', settings: JSON.stringify({ binCount: 8, meaning: 'error', unit: 'arcsec' }) })
      .where('id', '=', table.id)
      .execute()
    const log = vi.spyOn(console, 'error').mockImplementation(() => undefined)
    const ask = (handler: unknown, more = {}) => call(handler, '/', { projectId: fresh.id, ...more }, where)
    const answers = await Promise.all([
      ask(analysis.GET, { analysisId: made.id }),
      ask(analyses.GET),
      ask(corrections.GET),
      ask(history.GET),
    ])
    expect(answers.map(({ status }) => status)).toEqual([500, 200, 200, 200])
    expect(log).toHaveBeenCalledTimes(1)
    const access = await accessProject(database.db, {
      userId: fresh.people.owner.id,
      projectId: fresh.id,
      right: 'read',
    })
    expect(await unlessUnreadable(loadAnalysis(access, made.id))).toBeUndefined()
    expect(log).toHaveBeenCalledTimes(2)
    log.mockRestore()
  })

  test('keeps figures that a newer engine adds', async () => {
    const result = { ...someResult(), addedLater: { value: 1 } }
    const made = await makeAnalysis(owner, (await makeRun(owner)).id, result)
    expect((await get(analysis.GET, { analysisId: made.id })).result).toEqual(result)
  })

  test('saved again after a lost answer is kept once; with another name, another is kept', async () => {
    const run = await makeRun(owner)
    const first = await makeAnalysis(owner, run.id)
    expect(await makeAnalysis(owner, run.id)).toEqual(first)
    expect((await makeAnalysis(editor, run.id)).id).not.toBe(first.id)
    const changed = someResult({ used: 58 })
    expect((await makeAnalysis(owner, run.id, changed)).id).not.toBe(first.id)
  })

  test('without a worm shows none in the list', async () => {
    const run = await makeRun(owner)
    await makeAnalysis(owner, run.id, someResult({ worm: null, wormReason: 'short-run', table: null }))
    const { analyses: listed } = await get(analyses.GET, {}, `?runId=${run.id}`)
    expect(listed).toHaveLength(1)
    expect(listed[0]).toMatchObject({ wormPeriodSeconds: null, wormAmplitudeArcsec: null, peakToPeakArcsec: null })
    expect(listed[0].result).toBeUndefined()
  })

  test('is refused while its run has not been read', async () => {
    const { id: runId } = await upload(owner)
    const response = await post(analyses.POST, { runId, name: 'x', recipe: defaultRecipe(), result: someResult() })
    expect(response.status).toBe(409)
    expect((await response.json()).error.code).toBe('run-not-ready')
  })

  test('is refused when a figure is not finite, with the place of that figure', async () => {
    const { id: runId } = await makeRun(owner)
    const result = someResult()
    result.residual.rmsArcsec = NaN
    const response = await post(analyses.POST, { runId, name: 'x', recipe: defaultRecipe(), result })
    expect(response.status).toBe(422)
    expect(Object.keys((await response.json()).error.fields)).toEqual(['result.residual.rmsArcsec'])
  })

  test('changes its name only, and not from an older version', async () => {
    const made = await makeAnalysis(owner, (await makeRun(owner)).id)
    const patch = (body: unknown, who = owner) =>
      call(analysis.PATCH, '/', { projectId, analysisId: made.id }, { method: 'PATCH', body, cookie: who.cookie })
    const renamed = await patch({ version: 1, name: 'Better name', result: {} })
    const expected = { ...made, name: 'Better name', version: 2, updatedAt: expect.any(String) }
    expect(await renamed.json()).toEqual(expected)
    const late = await patch({ version: 1, name: 'Late name' }, editor)
    expect(late.status).toBe(409)
    expect((await late.json()).error).toMatchObject({ changedBy: 'Olga Owner', current: expected })
  })

  test('with correction tables is not deleted; without, its notes go with it', async () => {
    const made = await makeAnalysis(owner, (await makeRun(owner)).id)
    const written = await makeNote(owner, made.id)
    const table = await makeTable(owner, made.id)
    const remove = (handler: unknown, params: Record<string, string>) =>
      call(handler, '/', { projectId, ...params }, { method: 'DELETE', cookie: owner.cookie })
    const refused = await remove(analysis.DELETE, { analysisId: made.id })
    expect(refused.status).toBe(409)
    expect((await refused.json()).error.message).toContain('Table for the club')
    expect((await remove(correction.DELETE, { correctionId: table.id })).status).toBe(204)
    expect((await remove(analysis.DELETE, { analysisId: made.id })).status).toBe(204)
    const gone = await database.db.selectFrom('notes').select('id').where('id', '=', written.id).execute()
    expect(gone).toEqual([])
  })
})

describe('notes', () => {
  test.each(['a\u0000b', 'a\ud800b'])('text that no database can hold is refused: %j', async (text) => {
    const { id: analysisId } = await makeAnalysis(owner, (await makeRun(owner)).id)
    const response = await post(notes.POST, { anchor: { kind: 'whole' }, text }, { analysisId })
    expect(response.status).toBe(400)
    expect((await response.json()).error.code).toBe('bad-request')
  })

  test.each([
    { kind: 'whole' },
    { kind: 'time', timeSeconds: -12.25 },
    { kind: 'period', periodSeconds: 566.87 },
    { kind: 'worm-angle', angleDegrees: 359.9 },
  ])('are pinned and found again: %o', async (anchor) => {
    const { id: analysisId } = await makeAnalysis(owner, (await makeRun(owner)).id)
    const written = await (await post(notes.POST, { anchor, text: ' Wind ' }, { analysisId })).json()
    expect(written).toMatchObject({ anchor, text: 'Wind', authorName: 'Olga Owner', version: 1 })
    expect((await get(notes.GET, { analysisId })).notes).toEqual([written])
  })

  test.each([
    { kind: 'worm-angle', angleDegrees: 360 },
    { kind: 'period', periodSeconds: 0 },
    { kind: 'time' },
    { kind: 'somewhere' },
  ])('are not pinned to %o', async (anchor) => {
    const { id: analysisId } = await makeAnalysis(owner, (await makeRun(owner)).id)
    expect((await post(notes.POST, { anchor, text: 'x' }, { analysisId })).status).toBe(422)
  })

  test('are changed by their author or an owner, not by another editor', async () => {
    const { id: analysisId } = await makeAnalysis(owner, (await makeRun(owner)).id)
    const byEditor = await makeNote(editor, analysisId)
    const byOwner = await makeNote(owner, analysisId)
    const change = async (noteId: string, cookie: string, version = 1) => {
      const body = { version, anchor: { kind: 'whole' }, text: 'Changed' }
      return (await call(note.PATCH, '/', { projectId, noteId }, { method: 'PATCH', body, cookie })).status
    }
    expect(await change(byOwner.id, editor.cookie)).toBe(403)
    expect(await change(byEditor.id, editor.cookie)).toBe(200)
    expect(await change(byEditor.id, owner.cookie)).toBe(409)
    expect(await change(byEditor.id, owner.cookie, 2)).toBe(200)
  })
})

describe('a correction table', () => {
  const wanted = { name: 'T', kind: 'stand-alone', isAssumedSenseConfirmed: true }

  async function make(state: 'off' | 'on' | 'unknown', given: Record<string, unknown> = {}, result = someResult()) {
    const { id: analysisId } = await makeAnalysis(owner, (await makeRun(owner, state)).id, result)
    return post(corrections.POST, { ...wanted, analysisId, ...given })
  }

  test.each([
    ['off', 'stand-alone', 201],
    ['off', 'addition', 422],
    ['on', 'stand-alone', 409],
    ['on', 'addition', 201],
    ['unknown', 'stand-alone', 409],
    ['unknown', 'addition', 201],
  ] as const)('of a run recorded with the correction %s, as %s: %i', async (state, kind, status) => {
    const response = await make(state, { kind })
    expect(response.status).toBe(status)
    if (status === 409) expect((await response.json()).error.code).toBe('correction-was-on')
  })

  test('of an assumed sense wants that confirmed', async () => {
    const response = await make('off', { isAssumedSenseConfirmed: false })
    expect(response.status).toBe(422)
    expect((await response.json()).error.code).toBe('sense-not-confirmed')
  })

  test('is not made of an analysis without one', async () => {
    const response = await make('off', {}, someResult({ worm: null, wormReason: 'no-period', table: null }))
    expect(response.status).toBe(422)
    expect((await response.json()).error.code).toBe('no-table')
  })

  test('is the saved analysis’s own, whatever the request says', async () => {
    const forged = { ...someResult().table!, bins: [{ index: 0, angleDegrees: 0, value: 99 }] }
    const made = await (await make('off', { table: forged, settings: { binCount: 9 } })).json()
    const { table } = someResult()
    expect(made).toMatchObject({ table, settings: table!.settings, senseBasis: 'assumed', version: 1 })
    expect(await get(correction.GET, { correctionId: made.id })).toEqual(made)
    const { corrections: listed } = await get(corrections.GET, {})
    expect(listed[0]).toMatchObject({ id: made.id, analysisName: 'First look' })
    expect(listed[0].table).toBeUndefined()
  })

  test('is downloaded as CSV and as JSON, under its name', async () => {
    const made = await (await make('off', { name: 'Über 1/2' })).json()
    const load = (query: string) =>
      call(download.GET, `/${query}`, { projectId, correctionId: made.id }, { cookie: owner.cookie })
    const csv = await load('?format=csv')
    expect(csv.headers.get('content-type')).toBe('text/csv; charset=utf-8; header=present')
    expect(csv.headers.get('content-disposition')).toBe(
      `attachment; filename="_ber 1_2.csv"; filename*=UTF-8''%C3%9Cber%201%2F2.csv`,
    )
    const records = (await csv.text()).trimEnd().split('\r\n').slice(1)
    const written = records.map((record) => record.split(',').slice(0, 3).map(Number))
    expect(written).toEqual(
      someResult().table!.bins.map(({ index, angleDegrees, value }) => [index, angleDegrees, value]),
    )
    const json = await (await load('?format=json')).json()
    expect(json).toMatchObject({ name: 'Über 1/2', wormPeriod: { value: 566.8690164473684, unit: 's' } })
    expect(json.bins.map((bin: { value: number }) => bin.value)).toEqual(
      someResult().table!.bins.map(({ value }) => value),
    )
    expect((await load('?format=pdf')).status).toBe(422)
  })
})

test('the log tells who did what, newest first, in pages', async () => {
  const first = await get(auditEvents.GET, {}, '?limit=3')
  expect(first.events).toHaveLength(3)
  const second = await get(auditEvents.GET, {}, `?limit=200&cursor=${first.nextCursor}`)
  const all = [...first.events, ...second.events]
  expect(all.at(-1)).toMatchObject({ action: 'project.create', actorName: 'Olga Owner', subject: 'Test mount' })
  const times = all.map(({ at }) => at)
  expect(times).toEqual([...times].sort().reverse())
  expect(new Set(all.map(({ id }) => id)).size).toBe(all.length)
  expect(all.map(({ action }) => action)).toEqual(expect.arrayContaining(['run.upload', 'run.import', 'analysis.save']))
})

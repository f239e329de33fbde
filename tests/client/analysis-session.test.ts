import { describe, expect, expectTypeOf, test } from 'vitest'
import { analyseAtOnce } from '@/lib/analysis/analyse'
import type { Progress, Recipe, RunColumns } from '@/lib/analysis/types'
import type { AnalysisWorkerApi } from '@/lib/client/analysis-worker-api'
import { packColumns } from '@/lib/formats/packed-columns'
import { defaultRecipe } from '@/lib/schemas/recipe'
import reference from '@/tests/reference/jointfit.json'
import type { AnalysisWorkerExports } from '@/workers/analysis.worker'
import { createAnalysisSession } from '@/workers/analysis-session'

const columns: RunColumns = {
  timeSeconds: Float64Array.from(reference.t),
  displacement: Float64Array.from(reference.y),
  declinationDisplacement: null,
  wormAngleDegrees: null,
}

function recipe(change: Partial<Recipe> = {}): Recipe {
  const base = defaultRecipe()
  return { ...base, conversion: { ...base.conversion, frame: 'axis' }, ...change }
}

/** A clock that says after every step that the slice is over, and real macrotasks as pauses. */
function steppedSession() {
  let time = 0
  return createAnalysisSession({
    now: () => (time += 50),
    pause: () => new Promise((resolve) => setImmediate(resolve)),
  })
}

test('the worker offers what the page expects of it', () => {
  expectTypeOf<AnalysisWorkerExports>().toExtend<AnalysisWorkerApi>()
})

// Generous limits: a whole analysis takes a quarter of a second alone, but machines may be busy.
describe('the analysis session', { timeout: 60_000 }, () => {
  test('answers with what the analysis gives in one go, and tells its progress', async () => {
    const session = steppedSession()
    const loaded = await session.loadPacked(packColumns(columns, null))
    expect(loaded).toEqual({
      ok: true,
      startedAtMs: null,
      rowCount: 783,
      skipped: [],
      hasDeclination: false,
      hasWormAngle: false,
    })
    const heard: Progress[] = []
    const outcome = await session.analyse(recipe(), (progress) => heard.push(progress))
    expect(outcome).toEqual(analyseAtOnce(columns, recipe()))
    expect(heard.length).toBeGreaterThan(5)
    heard.forEach(({ fraction }, i) => {
      expect(fraction).toBeLessThanOrEqual(1)
      expect(fraction).toBeGreaterThanOrEqual(i === 0 ? 0 : heard[i - 1].fraction)
    })
  })

  test('an overtaken analysis answers null, the newest its outcome', async () => {
    const session = steppedSession()
    await session.loadPacked(packColumns(columns, null))
    let newest: ReturnType<typeof session.analyse> | null = null
    const older = session.analyse(recipe(), () => {
      newest ??= session.analyse(recipe({ harmonicCount: 2 }))
    })
    expect(await older).toBeNull()
    const outcome = await newest
    expect(outcome).toEqual(analyseAtOnce(columns, recipe({ harmonicCount: 2 })))
  })

  test('a cancelled analysis answers null and the next one starts afresh', async () => {
    const session = steppedSession()
    await session.loadPacked(packColumns(columns, null))
    let steps = 0
    const cancelled = await session.analyse(recipe(), () => {
      steps += 1
      if (steps === 3) void session.cancel()
    })
    expect(cancelled).toBeNull()
    expect(steps).toBe(3)
    const outcome = await session.analyse(recipe())
    expect(outcome?.ok).toBe(true)
  })

  test('a new run ends the analysis of the old one', async () => {
    const session = steppedSession()
    await session.loadPacked(packColumns(columns, null))
    let isReplaced = false
    const old = session.analyse(recipe(), () => {
      if (isReplaced) return
      isReplaced = true
      void session.loadPacked(packColumns(columns, 1000))
    })
    expect(await old).toBeNull()
  })

  test('reads a file of text and says what was in it', async () => {
    const session = steppedSession()
    const text = ['time,ra,dec', ...reference.t.map((t, i) => `${t},${reference.y[i]},0.${i % 7}`)].join('\n')
    const bytes = new TextEncoder().encode(text)
    const seen = await session.preview(bytes)
    if (!seen.ok) throw new Error(seen.fault.message)
    const loaded = await session.loadFile(bytes, {
      version: 1,
      layout: seen.preview.layout,
      columns: {
        time: 0,
        timeUnit: 'seconds',
        displacement: 1,
        displacementUnit: 'arcsec',
        declination: 2,
        wormAngle: null,
        wormAngleUnit: 'degrees',
      },
    })
    expect(loaded).toMatchObject({ ok: true, rowCount: 783, hasDeclination: true, hasWormAngle: false })
    const outcome = await session.analyse(recipe())
    if (!outcome?.ok) throw new Error('no result')
    expect(outcome.result.declination).not.toBeNull()
  })

  test('without a run there is nothing to analyse', async () => {
    await expect(steppedSession().analyse(recipe())).rejects.toThrow('load one first')
  })
})

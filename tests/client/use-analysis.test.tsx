import { act, cleanup, renderHook, waitFor } from '@testing-library/react'
import { afterEach, describe, expect, test } from 'vitest'
import { assertCurrent } from '@/components/workspace/assert-current'
import type { AnalysisOutcome, Progress, Recipe } from '@/lib/analysis/types'
import type { AnalysisClient } from '@/lib/client/analysis-client'
import { useBenchAnalysis } from '@/lib/client/use-analysis'
import { defaultRecipe } from '@/lib/schemas/recipe'

afterEach(cleanup)

/** A worker whose answers the test gives by hand. */
function puppet() {
  const calls: {
    recipe: Recipe
    answer: (outcome: AnalysisOutcome | null) => void
    fail: (error: Error) => void
    tell: (p: Progress) => void
  }[] = []
  let isDisposed = false
  let fault: (message: string) => void = () => {}
  const client: AnalysisClient = {
    preview: () => Promise.reject(new Error('not asked for')),
    loadFile: () => Promise.reject(new Error('not asked for')),
    loadPacked: () =>
      Promise.resolve({
        ok: true,
        startedAtMs: null,
        rowCount: 3,
        skipped: [],
        hasDeclination: false,
        hasWormAngle: false,
      }),
    analyse: (recipe, onProgress) =>
      new Promise((resolve, reject) =>
        calls.push({ recipe, answer: resolve, fail: reject, tell: (progress) => onProgress?.(progress) }),
      ),
    cancel: async () => calls.at(-1)?.answer(null),
    dispose: () => {
      isDisposed = true
    },
  }
  const create = (onFault: (message: string) => void) => {
    fault = onFault
    return client
  }
  return { calls, create, breakDown: (message: string) => fault(message), isDisposed: () => isDisposed }
}

const singular: AnalysisOutcome = { ok: false, reason: 'singular' }
const shortRun: AnalysisOutcome = { ok: false, reason: 'short-run' }
const packed = new Uint8Array(1)

async function loadedHook(recipe = defaultRecipe()) {
  const worker = puppet()
  const view = renderHook(({ recipe }) => useBenchAnalysis(recipe, worker.create), { initialProps: { recipe } })
  await act(() => view.result.current.loadPacked(packed))
  await waitFor(() => expect(worker.calls).toHaveLength(1))
  return { worker, ...view }
}

describe('useBenchAnalysis', () => {
  test('analyses once a run is there, and tells progress', async () => {
    const { worker, result } = await loadedHook()
    expect(result.current.isComputing).toBe(true)
    act(() => worker.calls[0].tell({ stage: 'lines', fraction: 0.5 }))
    expect(result.current.progress).toEqual({ stage: 'lines', fraction: 0.5 })
    await act(async () => worker.calls[0].answer(singular))
    expect(result.current).toMatchObject({ outcome: singular, isComputing: false, progress: null })
    expect(result.current.outcomeRecipe).toEqual(defaultRecipe())
  })

  test('keeps the last outcome while a newer one is computed; an equal recipe computes nothing', async () => {
    const { worker, result, rerender } = await loadedHook()
    await act(async () => worker.calls[0].answer(singular))
    rerender({ recipe: structuredClone(defaultRecipe()) })
    expect(worker.calls).toHaveLength(1)
    rerender({ recipe: { ...defaultRecipe(), chanceLevel: 0.01 } })
    await waitFor(() => expect(worker.calls).toHaveLength(2))
    expect(result.current).toMatchObject({ outcome: singular, isComputing: true, isCurrent: false })
    await act(async () => worker.calls[1].answer(shortRun))
    expect(result.current).toMatchObject({ outcome: shortRun, isCurrent: true })
  })

  test('drops what an overtaken analysis answers late', async () => {
    const { worker, result, rerender } = await loadedHook()
    rerender({ recipe: { ...defaultRecipe(), chanceLevel: 0.01 } })
    await waitFor(() => expect(worker.calls).toHaveLength(2))
    await act(async () => worker.calls[1].answer(shortRun))
    await act(async () => worker.calls[0].answer(singular))
    expect(result.current.outcome).toEqual(shortRun)
  })

  test('a cancel leaves the last outcome and ends the waiting', async () => {
    const { worker, result, rerender } = await loadedHook()
    await act(async () => worker.calls[0].answer(singular))
    rerender({ recipe: { ...defaultRecipe(), chanceLevel: 0.01 } })
    await waitFor(() => expect(worker.calls).toHaveLength(2))
    await act(async () => result.current.cancel())
    expect(result.current).toMatchObject({ outcome: singular, isComputing: false, isCurrent: false })
    expect(() => assertCurrent(result.current)).toThrow('stopped')
    rerender({ recipe: defaultRecipe() })
    await act(async () => worker.calls[2].answer(singular))
    expect(() => assertCurrent(result.current)).not.toThrow()
  })

  test('a worker that breaks down is told', async () => {
    const { worker, result } = await loadedHook()
    await act(async () => worker.calls[0].fail(new Error('out of memory')))
    expect(result.current).toMatchObject({ fault: 'out of memory', isComputing: false })
    act(() => worker.breakDown('gone'))
    expect(result.current.fault).toBe('gone')
  })

  test('the worker ends with the page', async () => {
    const { worker, unmount } = await loadedHook()
    unmount()
    expect(worker.isDisposed()).toBe(true)
  })
})

import { act, cleanup, renderHook } from '@testing-library/react'
import { afterEach, expect, test } from 'vitest'
import { useFileReading } from '@/components/workspace/use-file-reading'
import { emptyFault } from '@/lib/formats/faults'
import { previewTable } from '@/lib/formats/preview-table'
import type { PreviewOutcome, TextLayout } from '@/lib/formats/types'

afterEach(cleanup)

const text = ['t;x', ...Array.from({ length: 20 }, (_, i) => `${i};${(i % 5) / 10}`), ''].join('\n')
const fileOf = (fileName: string) => ({ fileName, bytes: new TextEncoder().encode(text) })

/** A worker whose previews arrive when the test says so. */
async function reading() {
  const asked: { layout: Partial<TextLayout>; answer: (outcome?: PreviewOutcome) => Promise<void> }[] = []
  const preview = (bytes: Uint8Array, layout: Partial<TextLayout> = {}) =>
    new Promise<PreviewOutcome>((resolve) => {
      const answer = (outcome = previewTable(bytes, layout)) => act(async () => resolve(outcome))
      asked.push({ layout, answer })
    })
  const analysis = { preview, loadFile: () => Promise.reject(new Error('not asked for')) }
  const { result } = renderHook(() => useFileReading({ analysis, onRead: () => {} }))
  act(() => void result.current.take(fileOf('first.csv')))
  await asked[0].answer()
  const layout = () => (result.current.reading.kind === 'mapping' ? result.current.reading.preview.layout : null)
  return { asked, result, layout }
}

test('two corrections made quickly add up, and the later preview is the one that is shown', async () => {
  const { asked, result, layout } = await reading()
  act(() => {
    void result.current.correctLayout({ headerRow: null })
    void result.current.correctLayout({ firstDataRow: 3 })
  })
  expect(asked[2].layout).toEqual({ headerRow: null, firstDataRow: 3 })
  await asked[2].answer()
  await asked[1].answer()
  expect(layout()).toMatchObject({ headerRow: null, firstDataRow: 3 })
})

test('a correction that leads nowhere is told and does not weigh on the next', async () => {
  const { asked, result, layout } = await reading()
  const before = layout()
  act(() => void result.current.correctLayout({ delimiter: ' ' }))
  await asked[1].answer({ ok: false, fault: emptyFault() })
  expect(result.current.reading.fault).toEqual(emptyFault())
  expect(layout()).toEqual(before)
  act(() => void result.current.correctLayout({ firstDataRow: 4 }))
  expect(asked[2].layout).toEqual({ firstDataRow: 4 })
})

test('a preview of the file before is not shown for the next one', async () => {
  const { asked, result } = await reading()
  act(() => void result.current.correctLayout({ firstDataRow: 5 }))
  act(() => result.current.startOver())
  act(() => void result.current.take(fileOf('second.csv')))
  await asked[2].answer()
  await asked[1].answer()
  expect(result.current.reading).toMatchObject({ kind: 'mapping', file: { fileName: 'second.csv' } })
  expect(result.current.reading.kind === 'mapping' && result.current.reading.preview.layout.firstDataRow).toBe(2)
})

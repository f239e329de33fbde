// @vitest-environment happy-dom
import { beforeEach, expect, test, vi } from 'vitest'
import { dropKeptWork, findKeptWork, isOfAnotherTab, keepWork, newWorkId, tieTabTo } from '@/lib/client/kept-work'
import { unknownRunFacts } from '@/lib/schemas/run-facts'
import { SAMPLE_CONVERSION, SAMPLE_DRIVE_TRAIN, SAMPLE_IMPORT } from '@/lib/simulate/sample'

const store = vi.hoisted(() => new Map<string, unknown>())

vi.mock('idb-keyval', () => ({
  get: async (key: string) => store.get(key),
  set: async (key: string, value: unknown) => void store.set(key, structuredClone(value)),
  del: async (key: string) => void store.delete(key),
}))

beforeEach(() => {
  store.clear()
  window.sessionStorage.clear()
})

const workOf = (text: string, id = newWorkId()) => ({
  version: 1 as const,
  id,
  fileName: 'night.csv',
  bytes: new TextEncoder().encode(text),
  settings: SAMPLE_IMPORT,
  conversion: SAMPLE_CONVERSION,
  facts: unknownRunFacts(),
  driveTrain: SAMPLE_DRIVE_TRAIN,
})

test('kept work comes back and is forgotten once it is saved', async () => {
  const work = workOf('0,1')
  expect(await keepWork(work)).toBe(true)
  expect(await findKeptWork()).toEqual(work)
  await dropKeptWork(work)
  expect(await findKeptWork()).toBeUndefined()
})

test('what another tab has kept meanwhile stays', async () => {
  const mine = workOf('0,1')
  await keepWork(mine)
  const other = workOf('0,1')
  await keepWork(other)
  await dropKeptWork(mine)
  expect(await findKeptWork()).toEqual(other)
})

test('work of another form counts as none', async () => {
  store.set('turnwright-open-bench', { ...workOf('0,1'), version: 2 })
  expect(await findKeptWork()).toBeUndefined()
})

test('work is known as another tab’s when this one showed something else', () => {
  const mine = workOf('0,1')
  const other = workOf('0,1')
  expect(isOfAnotherTab(other)).toBe(false)
  tieTabTo(mine.id)
  expect(isOfAnotherTab(mine)).toBe(false)
  expect(isOfAnotherTab(other)).toBe(true)
  tieTabTo(null)
  expect(isOfAnotherTab(other)).toBe(false)
})

test('ids of two works differ', () => {
  expect(newWorkId()).toMatch(/^[0-9a-f]{24}$/)
  expect(newWorkId()).not.toBe(newWorkId())
})

import { afterEach, beforeEach, expect, vi } from 'vitest'

/** A warning or an error on the console fails the test that caused it; a test that expects one spies on the console itself. */
beforeEach(() => {
  vi.spyOn(console, 'warn')
  vi.spyOn(console, 'error')
})

afterEach(() => {
  const calls = [console.warn, console.error].flatMap((method) => (vi.isMockFunction(method) ? method.mock.calls : []))
  vi.restoreAllMocks()
  expect(calls).toEqual([])
})

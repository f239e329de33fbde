import { describe, expect, test } from 'vitest'
import { decimate } from '@/lib/analysis/decimate'
import { createRandom } from '@/lib/analysis/random'

const series = (count: number) => {
  const { normal } = createRandom(8)
  const timeSeconds = Float64Array.from({ length: count }, (_, i) => i)
  return { timeSeconds, values: timeSeconds.map(() => normal()) }
}

test('few samples stay as they are', () => {
  const { timeSeconds, values } = series(500)
  expect(decimate({ timeSeconds, values, segmentStarts: [0] })).toEqual({ timeSeconds, values })
})

describe.each([3001, 100_000])('%i samples', (count) => {
  const { timeSeconds, values } = series(count)
  values[1234] = 50
  values[2345] = -60
  const thinned = decimate({ timeSeconds, values, segmentStarts: [0] })

  test('at most 3000 points, times rising, peaks kept, every point a sample', () => {
    expect(thinned.timeSeconds.length).toBeLessThanOrEqual(3000)
    expect(thinned.timeSeconds.length).toBeGreaterThan(2000)
    expect(thinned.values).toContain(50)
    expect(thinned.values).toContain(-60)
    thinned.timeSeconds.forEach((time, i) => {
      expect(i === 0 || time > thinned.timeSeconds[i - 1]).toBe(true)
      expect(thinned.values[i]).toBe(values[time])
    })
  })
})

test('NaN breaks the line inside every gap', () => {
  const { timeSeconds, values } = series(10_000)
  for (let i = 4000; i < 10_000; i++) timeSeconds[i] += 500
  const thinned = decimate({ timeSeconds, values, segmentStarts: [0, 4000] })
  const breaks = Array.from(thinned.values.keys()).filter((i) => Number.isNaN(thinned.values[i]))
  expect(breaks).toHaveLength(1)
  expect(thinned.timeSeconds[breaks[0]]).toBe(4249.5)
  expect(thinned.timeSeconds.length).toBeLessThanOrEqual(3000)
})

test('with a gap after every other sample the points still fit, the longest gaps break the line', () => {
  const { timeSeconds, values } = series(20_000)
  for (let i = 0; i < 20_000; i++) timeSeconds[i] += 10 * Math.floor(i / 2) + (i >= 9000 ? 1000 : 0)
  const segmentStarts = Array.from({ length: 10_000 }, (_, i) => 2 * i)
  const thinned = decimate({ timeSeconds, values, segmentStarts })
  expect(thinned.timeSeconds.length).toBeLessThanOrEqual(3000)
  const broken = thinned.timeSeconds.filter((_, i) => Number.isNaN(thinned.values[i]))
  expect(broken).toContain((timeSeconds[8999] + timeSeconds[9000]) / 2)
})

test('nothing stays nothing', () => {
  const empty = new Float64Array(0)
  expect(decimate({ timeSeconds: empty, values: empty, segmentStarts: [] }).values.length).toBe(0)
})

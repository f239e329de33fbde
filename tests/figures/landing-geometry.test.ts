import { describe, expect, test } from 'vitest'
import { placeStemLabels } from '@/lib/figures/landing-labels'
import { bands, evenTicks, linearScale, logScale, pathOf, short } from '@/lib/figures/svg-geometry'

const same = (value: number) => value

test('linearScale maps the ends onto the ends, and an empty interval onto its start', () => {
  const scale = linearScale([10, 20], [100, 0])
  expect([scale(10), scale(15), scale(20)]).toEqual([100, 50, 0])
  expect(linearScale([3, 3], [5, 9])(3)).toBe(5)
})

test('logScale gives every decade the same room', () => {
  const scale = logScale([0.01, 10], [300, 0])
  expect([0.01, 0.1, 1, 10].map(scale).map(Math.round)).toEqual([300, 200, 100, 0])
})

describe('evenTicks', () => {
  test.each([
    [0, 57, 6, [0, 10, 20, 30, 40, 50]],
    [-8.3, 31.2, 5, [0, 10, 20, 30]],
    [-0.004, 0.011, 4, [0, 0.005, 0.01]],
    [-35, 35, 4, [-20, 0, 20]],
  ])('%d … %d, about %i', (lowest, highest, wanted, expected) => {
    const ticks = evenTicks(lowest, highest, wanted)
    expect(ticks).toHaveLength(expected.length)
    ticks.forEach((tick, i) => expect(tick).toBeCloseTo(expected[i], 12))
    for (const tick of ticks) expect(Object.is(tick, -0)).toBe(false)
  })

  test('an empty or endless interval has none', () => {
    expect(evenTicks(2, 2, 5)).toEqual([])
    expect(evenTicks(0, Infinity, 5)).toEqual([])
    expect(evenTicks(5, 1, 5)).toEqual([])
  })
})

test('pathOf breaks the line where a value is missing', () => {
  expect(pathOf([0, 1, 2, 3, 4], [5, 6.25, NaN, 7, 8], same, same)).toBe('M0 5L1 6.3M3 7L4 8')
  expect(pathOf([], [], same, same)).toBe('')
})

test('short writes at most one decimal and no negative zero', () => {
  expect([12, 12.04, 12.35, -0.04, -3.21].map(short)).toEqual(['12', '12', '12.3', '0', '-3.2'])
})

test('bands are as wide as their span', () => {
  expect(bands([{ startSeconds: 2, endSeconds: 5 }], (t) => 10 * t)).toEqual([{ x: 20, width: 30 }])
})

describe('placeStemLabels', () => {
  const plot = { left: 0, right: 600, top: 0, bottom: 200 }

  test('puts a lone label above its dot', () => {
    expect(placeStemLabels([{ x: 300, y: 100, label: 'worm' }], plot)).toEqual([
      { labelX: 300, labelY: 90, anchor: 'middle' },
    ])
  })

  test('keeps a label off the taller stem beside it', () => {
    const stems = [
      { x: 300, y: 50, label: 'worm' },
      { x: 312, y: 120, label: 'pulley' },
    ]
    expect(placeStemLabels(stems, plot)[1]).toEqual({ labelX: 321, labelY: 124, anchor: 'start' })
    const mirrored = [stems[0], { ...stems[1], x: 288 }]
    expect(placeStemLabels(mirrored, plot)[1]).toEqual({ labelX: 279, labelY: 124, anchor: 'end' })
  })

  test('keeps labels inside the drawing', () => {
    expect(placeStemLabels([{ x: 595, y: 100, label: 'a long label' }], plot)[0].anchor).toBe('end')
    expect(placeStemLabels([{ x: 4, y: 100, label: 'a long label' }], plot)[0].anchor).toBe('start')
  })
})

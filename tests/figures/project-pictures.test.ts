import { expect, test } from 'vitest'
import { binBars } from '@/lib/figures/bin-bars'
import { historyMarks } from '@/lib/figures/history-marks'

test('binBars: every bar stands on zero and ends at its value', () => {
  const { bars, zeroTop, ticks } = binBars([4, -2, 0, 1])
  const unit = (bars[0].height + bars[1].height) / 6 // 4 up and 2 down are six units of the scale
  expect(bars[0].height).toBeCloseTo(4 * unit, 12)
  expect(bars[0].top + bars[0].height).toBeCloseTo(zeroTop, 12)
  expect(bars[1].top).toBeCloseTo(zeroTop, 12)
  expect(bars.map(({ left }) => left)).toEqual([0, 0.25, 0.5, 0.75])
  for (const tick of ticks) expect(tick.top).toBeCloseTo(zeroTop - tick.value * unit, 12)
})

test('binBars of a table of zeros has no height and stays finite', () => {
  const { bars, zeroTop } = binBars([0, 0])
  expect(bars.every(({ height }) => height === 0)).toBe(true)
  expect(zeroTop).toBeGreaterThan(0)
  expect(zeroTop).toBeLessThan(1)
})

test('historyMarks: time from left to right, the scale from zero', () => {
  const at = (day: string, peakToPeakArcsec: number) => ({
    at: `2026-11-${day}T00:00:00Z`,
    wormAmplitudeArcsec: peakToPeakArcsec / 2,
    wormAmplitudeStderrArcsec: null,
    peakToPeakArcsec,
    peakToPeakStderrArcsec: null,
  })
  const { points, ticks } = historyMarks([at('01', 10), at('11', 20), at('21', 5)])
  expect(points[1].left - points[0].left).toBeCloseTo(points[2].left - points[1].left, 12)
  expect(1 - points[0].swing.top).toBeCloseTo((1 - points[0].peakToPeak.top) / 2, 12)
  expect(ticks[0]).toEqual({ top: 1, value: 0 })
  expect(historyMarks([at('01', 10)]).points[0].left).toBe(0.5)
})

test('historyMarks: a bar of one standard error to either side, inside the picture and not below zero', () => {
  const entry = {
    at: '2026-11-01T00:00:00Z',
    wormAmplitudeArcsec: 1,
    wormAmplitudeStderrArcsec: 3,
    peakToPeakArcsec: 16,
    peakToPeakStderrArcsec: 4,
  }
  const { swing, peakToPeak } = historyMarks([entry]).points[0]
  expect(peakToPeak.span!.top).toBeGreaterThan(0)
  expect(peakToPeak.top - peakToPeak.span!.top).toBeCloseTo(peakToPeak.span!.bottom - peakToPeak.top, 12)
  expect((peakToPeak.top - peakToPeak.span!.top) / (1 - peakToPeak.top)).toBeCloseTo(4 / 16, 12)
  expect(swing.span!.bottom).toBe(1)
  expect(historyMarks([{ ...entry, wormAmplitudeStderrArcsec: null }]).points[0].swing.span).toBeNull()
})

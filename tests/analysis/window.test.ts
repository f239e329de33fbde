import { describe, expect, test } from 'vitest'
import {
  cosineWindow,
  kaiserHalfMainLobeBins,
  kaiserWindow,
  turnsNeededByWindow,
  windowFigures,
  windowWeights,
  type CosineWindowName,
} from '@/lib/analysis/window'
import reference from '../reference/windows.json'

const { windows } = reference

const cosine: [CosineWindowName, (typeof windows)['hann']][] = [
  ['rectangular', windows.rectangular as never],
  ['hann', windows.hann],
  ['hamming', windows.hamming as never],
  ['blackman', windows.blackman as never],
  ['blackman-harris', windows.blackman_harris_4 as never],
  ['hft70', windows.HFT70 as never],
  ['hft95', windows.HFT95 as never],
  ['hft116d', windows.HFT116D as never],
]

// Harris (1978) and Heinzel, Rüdiger & Schilling (2002), recomputed from the definitions (windows.json).
describe.each(cosine)('%s', (name, expected) => {
  test('eight samples equal the reference', () => {
    cosineWindow(name, 8).forEach((w, n) => expect(w).toBeCloseTo(expected.n8[n], 13))
  })

  test('gain, noise bandwidth and scalloping loss at N = 1024', () => {
    const figures = windowFigures(cosineWindow(name, 1024))
    expect(figures.coherentGain).toBeCloseTo(expected.N1024.coherent_gain, 12)
    expect(figures.noiseBandwidthBins).toBeCloseTo(expected.N1024.enbw_bins, 10)
    expect(figures.scallopingLossDb).toBeCloseTo(expected.N1024.scalloping_loss_db, 10)
  })
})

describe.each([
  [2, windows['kaiser_alpha_2.0']],
  [2.5, windows['kaiser_alpha_2.5']],
  [3, windows['kaiser_alpha_3.0']],
  [3.5, windows['kaiser_alpha_3.5']],
])('Kaiser, α = %f', (alpha, expected) => {
  test('eight samples and figures at N = 1024 equal the reference', () => {
    kaiserWindow(alpha, 8).forEach((w, n) => expect(w).toBeCloseTo(expected.n8[n], 13))
    const figures = windowFigures(kaiserWindow(alpha, 1024))
    expect(figures.coherentGain).toBeCloseTo(expected.N1024.coherent_gain, 12)
    expect(figures.noiseBandwidthBins).toBeCloseTo(expected.N1024.enbw_bins, 10)
    expect(figures.scallopingLossDb).toBeCloseTo(expected.N1024.scalloping_loss_db, 10)
  })

  test('first null at √(1 + α²) bins', () => {
    expect(kaiserHalfMainLobeBins(alpha)).toBeCloseTo(expected.first_null_bins, 12)
  })
})

// As printed by Harris (1978), table 1, and Heinzel et al. (2002), appendix D, to the printed digits.
test.each([
  ['hann', 1.5, 1.42],
  ['blackman-harris', 2.0, 0.83],
  ['hft70', 3.4129, 0.0065],
  ['hft116d', 4.2186, 0.0028],
] as const)('%s as printed: noise bandwidth %f bins, loss %f dB', (name, bandwidth, loss) => {
  const figures = windowFigures(cosineWindow(name, 4096))
  const digits = (x: number) => (String(x).split('.')[1] ?? '').length
  expect(Math.abs(figures.noiseBandwidthBins - bandwidth)).toBeLessThan(Math.max(0.005, 0.5 * 10 ** -digits(bandwidth)))
  expect(Math.abs(figures.scallopingLossDb - loss)).toBeLessThan(0.5001 * 10 ** -digits(loss))
})

test("'flat-top' is HFT95; each window states the turns it needs", () => {
  expect(windowWeights('flat-top', 64)).toEqual(cosineWindow('hft95', 64))
  const names = ['rectangular', 'hann', 'hamming', 'blackman', 'blackman-harris', 'flat-top'] as const
  expect(names.map(turnsNeededByWindow)).toEqual([1, 2, 2, 3, 4, 5])
})

test('a length below 2 or a fraction is refused', () => {
  expect(() => cosineWindow('hann', 1)).toThrow(RangeError)
  expect(() => kaiserWindow(2, 2.5)).toThrow(RangeError)
  expect(() => kaiserWindow(-1, 8)).toThrow(RangeError)
})

import { describe, expect, test } from 'vitest'
import {
  cosineWindow,
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
    kaiserWindow(alpha * Math.PI, 8).forEach((w, n) => expect(w).toBeCloseTo(expected.n8[n], 13))
    const figures = windowFigures(kaiserWindow(alpha * Math.PI, 1024))
    expect(figures.coherentGain).toBeCloseTo(expected.N1024.coherent_gain, 12)
    expect(figures.noiseBandwidthBins).toBeCloseTo(expected.N1024.enbw_bins, 10)
    expect(figures.scallopingLossDb).toBeCloseTo(expected.N1024.scalloping_loss_db, 10)
  })

  test('needs as many turns as its first null has bins, √(1 + α²)', () => {
    const needed = turnsNeededByWindow({ kind: 'kaiser', beta: alpha * Math.PI })
    expect(needed).toBeCloseTo(expected.first_null_bins, 12)
  })

  // The defining sum at the bin itself: by then nothing of the main lobe is left.
  test('and there its transform is next to nothing', () => {
    const weights = windowWeights({ kind: 'kaiser', beta: alpha * Math.PI }, 4096)
    const transform = (bins: number) => {
      let [re, im] = [0, 0]
      weights.forEach((w, n) => {
        re += w * Math.cos((2 * Math.PI * bins * n) / 4096)
        im += w * Math.sin((2 * Math.PI * bins * n) / 4096)
      })
      return Math.hypot(re, im)
    }
    // The closed form is that of the continuous window; the periodic form has one of its two ends, half an end too much.
    expect(transform(expected.first_null_bins)).toBeLessThan(weights[0])
    expect(transform(expected.first_null_bins - 0.2) / transform(0)).toBeGreaterThan(1e-4)
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

test('a Kaiser window of β = 0 is no window', () => {
  expect(kaiserWindow(0, 16)).toEqual(cosineWindow('rectangular', 16))
})

test('a length below 2 or a fraction is refused', () => {
  expect(() => cosineWindow('hann', 1)).toThrow(RangeError)
  expect(() => kaiserWindow(2, 2.5)).toThrow(RangeError)
  expect(() => kaiserWindow(-1, 8)).toThrow(RangeError)
  expect(() => kaiserWindow(Infinity, 8)).toThrow(RangeError)
})

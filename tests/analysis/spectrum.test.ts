import { describe, expect, test } from 'vitest'
import { amplitudeSpectraUpTo, amplitudeSpectrum, spectrumColumns } from '@/lib/analysis/amplitude-spectrum'
import { toEvenGrid, type EvenGrid } from '@/lib/analysis/even-grid'
import { complexFft, nextPowerOfTwo, realFft } from '@/lib/analysis/fft'
import { createRandom } from '@/lib/analysis/random'
import {
  hannAmplitudeFactor,
  hannPeakOffset,
  parabolaHeight,
  parabolaOffset,
  rectangularPeakOffset,
  type PeakBins,
} from '@/lib/analysis/spectral-peak'
import type { SpectrumWindow, WindowName } from '@/lib/analysis/types'
import { windowWeights } from '@/lib/analysis/window'
import checks from '../reference/checks.json'

/** The defining sum Σ x_n e^{−2πijn/N}. */
function slowDft(values: ArrayLike<number>, bin: number): [number, number] {
  let [re, im] = [0, 0]
  for (let n = 0; n < values.length; n++) {
    const angle = (-2 * Math.PI * bin * n) / values.length
    re += values[n] * Math.cos(angle)
    im += values[n] * Math.sin(angle)
  }
  return [re, im]
}

function gridOf(values: Float64Array, cadenceSeconds: number): EvenGrid {
  const isPresent = new Uint8Array(values.length).fill(1)
  return { startSeconds: 0, cadenceSeconds, values, isPresent, method: 'as-recorded' }
}

const highestBin = (amplitude: Float64Array) => amplitude.reduce((best, a, j) => (a > amplitude[best] ? j : best), 1)

describe('fft', () => {
  test.each([2, 4, 8, 64, 512])('realFft equals the defining sum (N = %i)', (size) => {
    const { normal } = createRandom(size)
    const values = Float64Array.from({ length: size }, normal)
    const bins = realFft(values)
    expect(bins.length).toBe(size + 2)
    for (let j = 0; j <= size / 2; j++) {
      const [re, im] = slowDft(values, j)
      expect(bins[2 * j]).toBeCloseTo(re, 10)
      expect(bins[2 * j + 1]).toBeCloseTo(im, 10)
    }
  })

  test.each([2, 8, 32, 256])('complexFft equals the defining sum (N = %i)', (size) => {
    const { normal } = createRandom(size + 1)
    const re = Float64Array.from({ length: size }, normal)
    const im = Float64Array.from({ length: size }, normal)
    const bins = complexFft(Float64Array.from({ length: 2 * size }, (_, i) => (i % 2 === 0 ? re[i >> 1] : im[i >> 1])))
    for (let j = 0; j < size; j++) {
      const [a, b] = slowDft(re, j)
      const [c, d] = slowDft(im, j)
      expect(bins[2 * j]).toBeCloseTo(a - d, 10)
      expect(bins[2 * j + 1]).toBeCloseTo(b + c, 10)
    }
  })

  test('lengths: the next power of two; others are refused', () => {
    expect([1, 2, 3, 1000, 1024].map(nextPowerOfTwo)).toEqual([2, 2, 4, 1024, 1024])
    expect(() => realFft(new Float64Array(6))).toThrow(RangeError)
    expect(() => realFft(new Float64Array(0))).toThrow(RangeError)
  })
})

describe('amplitudeSpectrum', () => {
  const names: WindowName[] = ['rectangular', 'hann', 'hamming', 'blackman', 'blackman-harris', 'flat-top']

  test.each(names)('a sine of 1″ on a bin reads 1″ (%s)', (window) => {
    const values = Float64Array.from({ length: 1024 }, (_, n) => Math.cos((2 * Math.PI * 40 * n) / 1024 + 0.7))
    const { stepHz, amplitude } = amplitudeSpectrum(gridOf(values, 2), { window, paddingFactor: 1 })
    expect(stepHz).toBe(1 / 2048)
    // leakage of the negative frequency is below −58 dB for every window at bin 80, and exactly 0 on a bin
    expect(amplitude[40]).toBeCloseTo(1, 10)
  })

  const windows: SpectrumWindow[] = [...names, { kind: 'kaiser', beta: 8 }]

  test.each(windows)('equals 2|Σwx e^(−2πift)|/Σw with padding and gaps (%s)', (window) => {
    const { normal } = createRandom(4)
    const grid = gridOf(Float64Array.from({ length: 100 }, normal), 2.5)
    for (let n = 30; n < 36; n++) [grid.isPresent[n], grid.values[n]] = [0, 0]
    const { stepHz, amplitude } = amplitudeSpectrum(grid, { window, paddingFactor: 4 })
    const weights = windowWeights(window, 100).map((w, n) => w * grid.isPresent[n])
    const total = weights.reduce((a, b) => a + b)
    for (const j of [0, 1, 7, 100, 200, 256]) {
      let [re, im] = [0, 0]
      weights.forEach((w, n) => {
        re += w * grid.values[n] * Math.cos(2 * Math.PI * j * stepHz * n * 2.5)
        im += w * grid.values[n] * Math.sin(2 * Math.PI * j * stepHz * n * 2.5)
      })
      const factor = j === 0 || j === 256 ? 1 : 2
      expect(amplitude[j]).toBeCloseTo((factor * Math.hypot(re, im)) / total, 11)
    }
  })

  test('a long line keeps its amplitude across a gap of a tenth of the run', () => {
    const timeSeconds = Float64Array.from({ length: 2000 }, (_, i) => 2 * i).filter((t) => t < 1000 || t >= 1400)
    const grid = toEvenGrid(
      timeSeconds,
      timeSeconds.map((t) => 3 * Math.sin((2 * Math.PI * t) / 50)),
    )
    const { stepHz, amplitude } = amplitudeSpectrum(grid, { window: 'hann' })
    const peak = highestBin(amplitude)
    expect(peak * stepHz).toBeCloseTo(1 / 50, 4)
    expect(amplitude[peak]).toBeCloseTo(3, 2)
  })

  test.each([0.1, 0.5, 0.9])('uneven times: a line at %f of the Nyquist frequency reads 1″ within 1 %%', (share) => {
    const { uniform } = createRandom(21)
    const timeSeconds = Float64Array.from({ length: 3000 }, (_, i) => 2.5 * (i + 0.4 * (uniform() - 0.5)))
    const frequencyHz = share * 0.2
    const grid = toEvenGrid(
      timeSeconds,
      timeSeconds.map((t) => Math.sin(2 * Math.PI * frequencyHz * t)),
    )
    const { stepHz, amplitude } = amplitudeSpectrum(grid, { window: 'hann' })
    const peak = highestBin(amplitude.subarray(0, Math.floor(0.2 / stepHz)))
    expect(Math.abs(peak * stepHz - frequencyHz)).toBeLessThan(stepHz)
    expect(Math.abs(amplitude[peak] - 1)).toBeLessThan(0.01)
  })

  test('white noise keeps its mean amplitude σ√(π·ENBW/N) however uneven the times', () => {
    const { normal, uniform } = createRandom(22)
    const timeSeconds = Float64Array.from({ length: 4000 }, (_, i) => i + 0.5 * (uniform() - 0.5))
    const grid = toEvenGrid(
      timeSeconds,
      timeSeconds.map(() => normal()),
    )
    const { stepHz, amplitude } = amplitudeSpectrum(grid, { window: 'hann', paddingFactor: 1 })
    const band = amplitude.subarray(Math.ceil(0.3 / stepHz), Math.floor(0.5 / stepHz))
    const meanAmplitude = band.reduce((a, b) => a + b) / band.length
    // Rayleigh scatter 0.52 of the mean over some 500 independent bins: five standard errors are 12 %
    expect(Math.abs(meanAmplitude / Math.sqrt((1.5 * Math.PI) / 4000) - 1)).toBeLessThan(0.12)
  })

  // Harris (1978) for the window; A = 9, P = 478.69 s, T = 2000 s, Δ = 2 s, φ = 0.6 rad, padded 64 times.
  test('Hann, padded 64 times: 478.741464 s, 8.9955348″', () => {
    const values = Float64Array.from({ length: 1000 }, (_, n) => 9 * Math.cos((2 * Math.PI * 2 * n) / 478.69 - 0.6))
    const { stepHz, amplitude } = amplitudeSpectrum(gridOf(values, 2), { window: 'hann', paddingFactor: 64 })
    const peak = highestBin(amplitude)
    const logs = [-1, 0, 1].map((step) => Math.log(amplitude[peak + step])) as [number, number, number]
    const periodSeconds = 1 / ((peak + parabolaOffset(...logs)) * stepHz)
    // The reference padded to 64·N, we to the next power of two: the parabola then differs in the sixth digit.
    expect(periodSeconds).toBeCloseTo(checks.values['5.padded_hann_period'], 3)
    expect(Math.exp(parabolaHeight(...logs))).toBeCloseTo(checks.values['5.padded_hann_amplitude'], 5)
  })
})

test.each(['hann', 'flat-top'] as const)('%s: two spectra up to a limit are the whole ones', (window) => {
  const random = createRandom(4)
  const time = Float64Array.from({ length: 700 }, (_, i) => 2.5 * i + (i === 0 ? 0 : 0.3 * random.uniform()))
  const before = toEvenGrid(
    time,
    time.map((t) => 7 * Math.cos((2 * Math.PI * t) / 480) + random.normal()),
  )
  const after = toEvenGrid(
    time,
    time.map(() => random.normal()),
  )
  expect(before.method).toBe('fine')
  const pair = amplitudeSpectraUpTo(before, after, { window, highestHz: 0.2 })
  for (const [k, grid] of [before, after].entries()) {
    const whole = amplitudeSpectrum(grid, { window })
    expect(pair[k].stepHz).toBe(whole.stepHz)
    const last = pair[k].amplitude.length - 1
    expect(last * whole.stepHz).toBeGreaterThan(0.2 * 0.997)
    expect(last * whole.stepHz).toBeLessThanOrEqual(0.2)
    // The transform promises 1e-8 of Σ|w x|, of which 7″ is the largest amplitude.
    pair[k].amplitude.forEach((value, j) => expect(Math.abs(value - whole.amplitude[j])).toBeLessThan(2e-7))
  }
})

describe('peak between bins: a line at 20.3 bins, N = 256, phase 0.4', () => {
  const bins = (window: WindowName): { peak: PeakBins; sizes: [number, number, number]; gain: number } => {
    const weights = windowWeights(window, 256)
    const values = weights.map((w, n) => w * Math.cos((2 * Math.PI * 20.3 * n) / 256 + 0.4))
    const [left, centre, right] = [19, 20, 21].map((bin) => slowDft(values, bin))
    const sizes = [left, centre, right].map(([re, im]) => Math.hypot(re, im)) as [number, number, number]
    return { peak: { left, centre, right }, sizes, gain: 2 / weights.reduce((a, b) => a + b) }
  }
  const expected = checks.values['5.peak_interpolation_error_bins']['20.3']

  test('parabola on rectangular magnitudes and on the logarithm of Hann magnitudes', () => {
    expect(parabolaOffset(...bins('rectangular').sizes) - 0.3).toBeCloseTo(expected.parabola_magnitude_rect, 10)
    const logs = bins('hann').sizes.map(Math.log) as [number, number, number]
    expect(parabolaOffset(...logs) - 0.3).toBeCloseTo(expected.parabola_log_hann, 10)
  })

  // Jacobsen & Kootsookos (2007), IEEE Signal Process. Mag. 24(3), 123.
  test('rectangularPeakOffset and hannPeakOffset', () => {
    expect(rectangularPeakOffset(bins('rectangular').peak) - 0.3).toBeCloseTo(expected.jacobsen_rect, 12)
    expect(hannPeakOffset(bins('hann').peak) - 0.3).toBeCloseTo(expected.hann_complex_exact, 12)
  })

  test('hannAmplitudeFactor gives the amplitude back', () => {
    const { peak, sizes, gain } = bins('hann')
    // The reference takes the true offset; the found one is off by 4e-7 bins.
    expect(gain * sizes[1] * hannAmplitudeFactor(0.3) - 1).toBeCloseTo(expected.hann_amplitude_corrected, 12)
    expect(gain * sizes[1] * hannAmplitudeFactor(hannPeakOffset(peak))).toBeCloseTo(1, 5)
    expect(1 / hannAmplitudeFactor(0.5)).toBeCloseTo(checks.values['5.hann_amplitude_factor_at_half_bin'], 13)
    expect(hannAmplitudeFactor(0)).toBe(1)
  })
})

describe('toEvenGrid', () => {
  test('even times stay as recorded, a gap stays empty', () => {
    const grid = toEvenGrid(Float64Array.of(0, 2, 4, 10, 12), Float64Array.of(1, 2, 3, 4, 5))
    expect(grid.method).toBe('as-recorded')
    expect(Array.from(grid.values)).toEqual([1, 2, 3, 0, 0, 4, 5])
    expect(Array.from(grid.isPresent)).toEqual([1, 1, 1, 0, 0, 1, 1])
  })

  test('uneven times go into cells an eighth of the cadence wide, each sample as it is', () => {
    const timeSeconds = Float64Array.of(0, 1.1, 2, 2.9, 4, 5, 10, 11, 12.1, 13)
    const grid = toEvenGrid(
      timeSeconds,
      timeSeconds.map((t) => 3 * t - 1),
    )
    expect(grid.method).toBe('fine')
    expect(grid.cadenceSeconds).toBe(1 / 8)
    expect(grid.isPresent.reduce((a, b) => a + b)).toBe(10)
    timeSeconds.forEach((t) => expect(grid.values[Math.round(8 * t)]).toBe(3 * t - 1))
  })

  test('too many samples are averaged', () => {
    const timeSeconds = Float64Array.from({ length: 1000 }, (_, i) => i)
    const grid = toEvenGrid(
      timeSeconds,
      timeSeconds.map((t) => Math.cos((2 * Math.PI * t) / 300)),
      100,
    )
    expect(grid.method).toBe('averaged')
    expect(grid.values.length).toBe(100)
    grid.values.forEach((value, n) =>
      expect(value).toBeCloseTo(Math.cos((2 * Math.PI * n * grid.cadenceSeconds) / 300), 1),
    )
  })
})

test('spectrumColumns shows the maximum of every column, lines never fall between pixels', () => {
  const amplitude = new Float64Array(20_001).fill(0.1)
  amplitude[12_345] = 5
  const after = amplitude.slice()
  after[12_345] = 0.2
  const columns = spectrumColumns(
    { stepHz: 1e-5, amplitude },
    { stepHz: 1e-5, amplitude: after },
    { lowestHz: 5e-4, highestHz: 0.2, columnCount: 700 },
  )
  expect(columns.frequencyHz.length).toBeLessThanOrEqual(700)
  const peak = highestBin(columns.beforeArcsec)
  expect(columns.beforeArcsec[peak]).toBe(5)
  expect(columns.afterArcsec[peak]).toBe(0.2)
  expect(columns.frequencyHz[peak]).toBeCloseTo(0.12345, 12)
  columns.frequencyHz.forEach((f, i) => expect(i === 0 || f > columns.frequencyHz[i - 1]).toBe(true))
})

import type { EvenGrid } from './even-grid'
import { nextPowerOfTwo, realFft } from './fft'
import { nonuniformFft } from './nonuniform-fft'
import type { SpectrumWindow } from './types'
import { windowWeights } from './window'

/** One-sided amplitude spectrum on j·stepHz, j = 0 … amplitude.length − 1. */
export interface AmplitudeSpectrum {
  stepHz: number
  /** In the unit of the values; a sine of amplitude 1 on a bin reads 1. */
  amplitude: Float64Array
}

export interface SpectrumOptions {
  window: SpectrumWindow
  /** Zero padding interpolates the display; it adds no resolution. */
  paddingFactor?: number
  /** The padded length is kept below this where that still holds all samples. */
  largestLength?: number
}

const PADDING_FACTOR = 8
const LARGEST_LENGTH = 2 ** 20

/**
 * A(f) = 2|Σ w x e^{−2πift}|/Σw over the cells that hold a sample (factor 1 at 0 and at the Nyquist frequency), so
 * that amplitudes stay calibrated across gaps. Take the fitted drift off first; the mean alone is not enough.
 *
 * @see Harris (1978), Proc. IEEE 66, 51; Heinzel, Rüdiger & Schilling (2002), sections 8 and 9
 */
export function amplitudeSpectrum(grid: EvenGrid, options: SpectrumOptions): AmplitudeSpectrum {
  const { window, paddingFactor = PADDING_FACTOR, largestLength = LARGEST_LENGTH } = options
  const count = grid.values.length
  const length = Math.max(nextPowerOfTwo(count), Math.min(nextPowerOfTwo(paddingFactor * count), largestLength))
  const weights = windowWeights(window, count)
  const padded = new Float64Array(length)
  let weightSum = 0
  for (let n = 0; n < count; n++) {
    if (grid.isPresent[n] === 0) continue
    padded[n] = weights[n] * grid.values[n]
    weightSum += weights[n]
  }
  const bins = realFft(padded)
  const half = length / 2
  const amplitude = new Float64Array(half + 1)
  // Gaps can leave a flat-top with a weight sum next to zero or below: then nothing can be calibrated and 0 is shown.
  const scale = weightSum > 1e-9 * count ? 1 / weightSum : 0
  for (let j = 0; j <= half; j++) {
    const factor = j === 0 || j === half ? scale : 2 * scale
    // Not hypot, which is several times slower: arc seconds come nowhere near overflow.
    amplitude[j] = factor * Math.sqrt(bins[2 * j] ** 2 + bins[2 * j + 1] ** 2)
  }
  return { stepHz: 1 / (length * grid.cadenceSeconds), amplitude }
}

/**
 * Two amplitude spectra of one grid up to a limit, in one transform: for uneven times the cells are so fine that most of a
 * whole transform would lie beyond the limit. Equal to amplitudeSpectrum to 1e-9 of the largest amplitude.
 */
export function amplitudeSpectraUpTo(
  before: EvenGrid,
  after: EvenGrid,
  options: { window: SpectrumWindow; highestHz: number },
): [AmplitudeSpectrum, AmplitudeSpectrum] {
  const { window, highestHz } = options
  const count = before.values.length
  const length = Math.max(nextPowerOfTwo(count), Math.min(nextPowerOfTwo(PADDING_FACTOR * count), LARGEST_LENGTH))
  const stepHz = 1 / (length * before.cadenceSeconds)
  const wanted = Math.floor(highestHz / stepHz + 1e-9)
  // The transform's own length is the next power of two; a bin or two at the limit are not worth twice the work.
  const roomy = 2 ** Math.floor(Math.log2(wanted + 1)) - 1
  const largestIndex = wanted - roomy <= 0.002 * wanted ? roomy : wanted
  if (8 * largestIndex >= length) return [amplitudeSpectrum(before, { window }), amplitudeSpectrum(after, { window })]
  const weights = windowWeights(window, count)
  const present = before.isPresent.reduce((sum, flag) => sum + flag, 0)
  const [time, whole, left] = [new Float64Array(present), new Float64Array(present), new Float64Array(present)]
  let weightSum = 0
  let at = 0
  for (let n = 0; n < count; n++) {
    if (before.isPresent[n] === 0) continue
    time[at] = n * before.cadenceSeconds
    whole[at] = weights[n] * before.values[n]
    left[at] = weights[n] * after.values[n]
    weightSum += weights[n]
    at++
  }
  const { first, second } = nonuniformFft({
    time,
    first: whole,
    second: left,
    stepHz,
    firstIndex: 0,
    count: largestIndex + 1,
  })
  const scale = weightSum > 1e-9 * count ? 1 / weightSum : 0
  const sizes = (bins: Float64Array): AmplitudeSpectrum => {
    const amplitude = new Float64Array(largestIndex + 1)
    for (let j = 0; j <= largestIndex; j++) {
      amplitude[j] = (j === 0 ? scale : 2 * scale) * Math.sqrt(bins[2 * j] ** 2 + bins[2 * j + 1] ** 2)
    }
    return { stepHz, amplitude }
  }
  return [sizes(first), sizes(second)]
}

export interface SpectrumColumns {
  /** Rising; where the first spectrum is highest within each column. */
  frequencyHz: Float64Array
  beforeArcsec: Float64Array
  afterArcsec: Float64Array
}

/**
 * Two spectra on one grid thinned for a logarithmic axis: each pixel column shows its maximum, so that no line is lost
 * between pixels. Columns that no bin falls into are left out.
 */
export function spectrumColumns(
  before: AmplitudeSpectrum,
  after: AmplitudeSpectrum,
  range: { lowestHz: number; highestHz: number; columnCount: number },
): SpectrumColumns {
  if (before.stepHz !== after.stepHz || before.amplitude.length !== after.amplitude.length) {
    throw new RangeError(`spectra must share one grid: got steps of ${before.stepHz} and ${after.stepHz} Hz`)
  }
  const { lowestHz, highestHz, columnCount } = range
  const logLowest = Math.log(lowestHz)
  const perLog = columnCount / (Math.log(highestHz) - logLowest)
  const frequencyHz: number[] = []
  const beforeArcsec: number[] = []
  const afterArcsec: number[] = []
  let current = -1
  let highest = 0
  const first = Math.max(1, Math.ceil(lowestHz / before.stepHz - 1e-9))
  const last = Math.min(before.amplitude.length - 1, Math.floor(highestHz / before.stepHz + 1e-9))
  for (let j = first; j <= last; j++) {
    const column = Math.min(
      columnCount - 1,
      Math.max(0, Math.floor((Math.log(j * before.stepHz) - logLowest) * perLog)),
    )
    const [b, a] = [before.amplitude[j], after.amplitude[j]]
    if (column !== current) {
      current = column
      highest = b
      frequencyHz.push(j * before.stepHz)
      beforeArcsec.push(b)
      afterArcsec.push(a)
      continue
    }
    const end = frequencyHz.length - 1
    if (b > highest) {
      highest = b
      beforeArcsec[end] = b
      frequencyHz[end] = j * before.stepHz
    }
    if (a > afterArcsec[end]) afterArcsec[end] = a
  }
  return {
    frequencyHz: Float64Array.from(frequencyHz),
    beforeArcsec: Float64Array.from(beforeArcsec),
    afterArcsec: Float64Array.from(afterArcsec),
  }
}

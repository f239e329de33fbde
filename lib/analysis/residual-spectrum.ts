import { searchGrid } from './lomb-scargle'
import { nonuniformFft } from './nonuniform-fft'
import { parabolaOffset } from './spectral-peak'

/** |Σ r_i e^{−2πif t_i}|² of a residual at f = (firstIndex + j)·step, step 1/(10T), from 1/T on. */
export interface ResidualSpectrum {
  stepHz: number
  firstIndex: number
  power: Float64Array
  sampleCount: number
  spanSeconds: number
}

/** Every tenth point of the grid is a multiple of 1/T. */
export const STEPS_PER_RESOLUTION = 10

/**
 * The spectrum that errors, line search and signal-to-noise ratios are taken from: computed once per fit. Nothing is
 * tapered and nothing subtracted; the residual of a joint fit holds neither drift nor fitted lines.
 */
export function residualSpectrum(
  timeSeconds: Float64Array,
  residual: Float64Array,
  highestHz: number,
): ResidualSpectrum {
  const sampleCount = residual.length
  const middle = (timeSeconds[0] + timeSeconds[sampleCount - 1]) / 2
  const spanSeconds = timeSeconds[sampleCount - 1] - timeSeconds[0]
  const grid = searchGrid(spanSeconds, highestHz)
  const power = new Float64Array(grid.count)
  if (grid.count > 0) {
    const time = timeSeconds.map((t) => t - middle)
    const { first } = nonuniformFft({ time, first: residual, second: null, ...grid })
    for (let j = 0; j < grid.count; j++) power[j] = first[2 * j] ** 2 + first[2 * j + 1] ** 2
  }
  return { stepHz: grid.stepHz, firstIndex: grid.firstIndex, power, sampleCount, spanSeconds }
}

/** Mean amplitude 2|Σ r e^{−2πift}|/N over lowest ≤ f ≤ highest, leaving out what lies within a margin of given lines. */
export function meanAmplitude(
  spectrum: ResidualSpectrum,
  range: { lowestHz: number; highestHz: number; linesHz?: readonly number[]; marginHz?: number },
): number | null {
  const { stepHz, firstIndex, power, sampleCount } = spectrum
  const { lowestHz, highestHz, linesHz = [], marginHz = 0 } = range
  const from = Math.max(0, Math.ceil(lowestHz / stepHz - 1e-9) - firstIndex)
  const to = Math.min(power.length - 1, Math.floor(highestHz / stepHz + 1e-9) - firstIndex)
  let sum = 0
  let used = 0
  for (let j = from; j <= to; j++) {
    const f = (firstIndex + j) * stepHz
    if (linesHz.some((line) => Math.abs(f - line) < marginHz)) continue
    sum += (2 * Math.sqrt(power[j])) / sampleCount
    used += 1
  }
  return used === 0 ? null : sum / used
}

/** Frequency and amplitude of the highest peak up to a limit, refined by a parabola; null where all is flat. */
export function highestPeak(
  spectrum: ResidualSpectrum,
  limitHz: number,
): { frequencyHz: number; amplitude: number } | null {
  const { stepHz, firstIndex, power, sampleCount } = spectrum
  const last = Math.min(power.length - 1, Math.floor(limitHz / stepHz + 1e-9) - firstIndex)
  if (last < 2) return null
  let best = 0
  for (let j = 1; j <= last; j++) if (power[j] > power[best]) best = j
  if (!(power[best] > 0)) return null
  const inside = best > 0 && best < power.length - 1
  const shift = inside
    ? parabolaOffset(Math.sqrt(power[best - 1]), Math.sqrt(power[best]), Math.sqrt(power[best + 1]))
    : 0
  return {
    frequencyHz: (firstIndex + best + Math.max(-0.5, Math.min(0.5, shift))) * stepHz,
    amplitude: (2 * Math.sqrt(power[best])) / sampleCount,
  }
}

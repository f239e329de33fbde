export interface FourierSumsOptions {
  timeSeconds: Float64Array
  values: Float64Array
  firstHz: number
  stepHz: number
  count: number
}

/** How often the rotating phases are computed afresh, so that rounding does not pile up. */
const RESEED_STEPS = 64

/**
 * Σ_i x_i e^{−2πi f_j t_i} at f_j = first + j·step, j = 0 … count−1, for any times, by rotation of each sample's phase.
 * The cost is N · count complex products.
 *
 * @returns real and imaginary parts, in the unit of the values
 */
export function fourierSums({ timeSeconds, values, firstHz, stepHz, count }: FourierSumsOptions): {
  re: Float64Array
  im: Float64Array
} {
  const re = new Float64Array(count)
  const im = new Float64Array(count)
  // Times from the middle keep the phases small; the sums are turned back at the end.
  const middle = (timeSeconds[0] + timeSeconds[timeSeconds.length - 1]) / 2
  for (let i = 0; i < values.length; i++) {
    const t = timeSeconds[i] - middle
    const x = values[i]
    const stepC = Math.cos(2 * Math.PI * stepHz * t)
    const stepS = -Math.sin(2 * Math.PI * stepHz * t)
    for (let from = 0; from < count; from += RESEED_STEPS) {
      const angle = -2 * Math.PI * (firstHz + from * stepHz) * t
      let c = x * Math.cos(angle)
      let s = x * Math.sin(angle)
      const to = Math.min(from + RESEED_STEPS, count)
      for (let j = from; j < to; j++) {
        re[j] += c
        im[j] += s
        const next = c * stepC - s * stepS
        s = c * stepS + s * stepC
        c = next
      }
    }
  }
  for (let j = 0; j < count; j++) {
    const angle = -2 * Math.PI * (firstHz + j * stepHz) * middle
    const [c, s] = [Math.cos(angle), Math.sin(angle)]
    ;[re[j], im[j]] = [re[j] * c - im[j] * s, re[j] * s + im[j] * c]
  }
  return { re, im }
}

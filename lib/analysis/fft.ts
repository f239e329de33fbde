import FFT from 'fft.js'

/** The part of fft.js that we use; its own types are `any` throughout. Complex arrays are interleaved re, im. */
interface Plan {
  transform(out: Float64Array, data: Float64Array): void
  realTransform(out: Float64Array, data: Float64Array): void
}

const createPlan = (size: number): Plan => new (FFT as unknown as new (size: number) => Plan)(size)

/** Plans cost as much as a transform; those of the last few sizes are kept. */
const plans = new Map<number, Plan>()
const KEPT_PLANS = 4

function planFor(size: number): Plan {
  if (!Number.isInteger(size) || size < 2 || 2 ** Math.round(Math.log2(size)) !== size) {
    throw new RangeError(`length must be a power of two of at least 2: got ${size}`)
  }
  const plan = plans.get(size) ?? createPlan(size)
  plans.delete(size)
  plans.set(size, plan)
  if (plans.size > KEPT_PLANS) plans.delete(plans.keys().next().value as number)
  return plan
}

/** Smallest power of two that is at least `count` (and at least 2). */
export function nextPowerOfTwo(count: number): number {
  let size = 2
  while (size < count) size *= 2
  return size
}

/**
 * X_j = Σ x_n e^{−2πijn/N}, j = 0 … N/2, not scaled.
 *
 * @param values N real samples, N a power of two of at least 2
 * @returns N/2 + 1 bins, interleaved re, im
 * @throws {RangeError} for another length
 */
export function realFft(values: Float64Array): Float64Array {
  const size = values.length
  const out = new Float64Array(2 * size)
  planFor(size).realTransform(out, values)
  return out.subarray(0, size + 2)
}

/**
 * X_j = Σ z_n e^{−2πijn/N}, j = 0 … N−1, not scaled.
 *
 * @param interleaved N complex samples as re, im, re, im …
 */
export function complexFft(interleaved: Float64Array): Float64Array {
  const out = new Float64Array(interleaved.length)
  planFor(interleaved.length / 2).transform(out, interleaved)
  return out
}

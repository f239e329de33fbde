import { createRandom } from '@/lib/analysis/random'

/** Noise whose variance is 1 in all. */
export type CoverageNoise =
  | { kind: 'ar1'; lagOne: number }
  /** White and AR(1) noise, the white with this share of the variance. */
  | { kind: 'mixture'; whiteShare: number; lagOne: number }
  /** Power ∝ (2 sin πfΔ)^(−α), which is f^(−α) but next to the Nyquist frequency. */
  | { kind: 'power-law'; exponent: number }

/** Samples before the first one that is kept, for noise that remembers. */
const WARM_UP = 4096

export function coverageNoise(noise: CoverageNoise, sampleCount: number, seed: number): Float64Array {
  const { normal } = createRandom(seed)
  switch (noise.kind) {
    case 'ar1':
      return autoregression(noise.lagOne, sampleCount, normal)
    case 'mixture': {
      const slow = autoregression(noise.lagOne, sampleCount, normal)
      return slow.map((value) => Math.sqrt(1 - noise.whiteShare) * value + Math.sqrt(noise.whiteShare) * normal())
    }
    case 'power-law':
      return powerLawNoise(noise.exponent, sampleCount, normal)
  }
}

/** x_i = r x_{i−1} + √(1 − r²) ε_i, from its own distribution on. */
function autoregression(lagOne: number, sampleCount: number, normal: () => number): Float64Array {
  const values = new Float64Array(sampleCount)
  let last = normal()
  for (let i = 0; i < sampleCount; i++) values[i] = last = lagOne * last + Math.sqrt(1 - lagOne * lagOne) * normal()
  return values
}

/**
 * White noise through the filter h_0 = 1, h_k = h_{k−1}(k − 1 + α/2)/k, whose power is (2 sin πfΔ)^(−α).
 *
 * @see Kasdin (1995), Proc. IEEE 83, 802, section III
 */
function powerLawNoise(exponent: number, sampleCount: number, normal: () => number): Float64Array {
  const filter = new Float64Array(WARM_UP)
  filter[0] = 1
  let squares = 1
  for (let k = 1; k < WARM_UP; k++) {
    filter[k] = (filter[k - 1] * (k - 1 + exponent / 2)) / k
    squares += filter[k] ** 2
  }
  const white = Float64Array.from({ length: WARM_UP + sampleCount }, normal)
  return Float64Array.from({ length: sampleCount }, (_, i) => {
    let sum = 0
    for (let k = 0; k < WARM_UP; k++) sum += filter[k] * white[WARM_UP + i - k]
    return sum / Math.sqrt(squares)
  })
}

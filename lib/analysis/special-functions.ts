const LANCZOS = [
  0.99999999999980993, 676.5203681218851, -1259.1392167224028, 771.32342877765313, -176.61502916214059,
  12.507343278686905, -0.13857109526572012, 9.9843695780195716e-6, 1.5056327351493116e-7,
]

/**
 * ln Γ(x) for x > 0: Lanczos's series (g = 7, nine terms) below 50, Stirling's series above.
 *
 * @see Lanczos (1964), SIAM J. Numer. Anal. 1, 86; Abramowitz & Stegun 6.1.41
 */
export function logGamma(x: number): number {
  if (!(x > 0)) throw new RangeError(`x must be positive: got ${x}`)
  if (x >= 50) {
    const inverse = 1 / x
    const square = inverse * inverse
    const series = inverse * (1 / 12 - square * (1 / 360 - square * (1 / 1260 - square / 1680)))
    return (x - 0.5) * Math.log(x) - x + 0.5 * Math.log(2 * Math.PI) + series
  }
  const z = x - 1
  const t = z + 7.5
  const series = LANCZOS.slice(1).reduce((total, c, i) => total + c / (z + i + 1), LANCZOS[0])
  return 0.5 * Math.log(2 * Math.PI) + (z + 0.5) * Math.log(t) - t + Math.log(series)
}

/**
 * Γ(n/2)/Γ((n − 1)/2) · √(2/n), which tends to 1. From 100 on by its own series, since the difference of two large
 * logarithms loses digits.
 */
export function gammaRatio(n: number): number {
  if (n < 100) return Math.sqrt(2 / n) * Math.exp(logGamma(n / 2) - logGamma((n - 1) / 2))
  // ln Γ(z + ½) − ln Γ(z) = ½ ln z − 1/(8z) + 1/(192z³) − 1/(640z⁵) + …, z = (n − 1)/2
  const z = (n - 1) / 2
  const logRatio = 0.5 * Math.log(z) - 1 / (8 * z) + 1 / (192 * z ** 3) - 1 / (640 * z ** 5)
  return Math.exp(logRatio + 0.5 * Math.log(2 / n))
}

/**
 * Complementary error function to about 1e-15 relative: the series of erf (Abramowitz & Stegun 7.1.6) below 2.5, the
 * continued fraction 7.1.14, evaluated from the far end, above.
 */
export function erfc(x: number): number {
  if (x < 0) return 2 - erfc(-x)
  if (x < 2.5) {
    let term = x
    let total = x
    for (let n = 1; term > total * 1e-18 && n < 200; n++) {
      term *= (2 * x * x) / (2 * n + 1)
      total += term
    }
    return 1 - (2 / Math.sqrt(Math.PI)) * Math.exp(-x * x) * total
  }
  let tail = 0
  for (let k = 80; k >= 1; k--) tail = k / 2 / (x + tail)
  return Math.exp(-x * x) / (Math.sqrt(Math.PI) * (x + tail))
}

/** Nodes and weights of Gauss–Legendre quadrature on [−1, 1], by Newton steps on P_n (Abramowitz & Stegun 25.4.29). */
export function gaussLegendre(count: number): { nodes: Float64Array; weights: Float64Array } {
  const nodes = new Float64Array(count)
  const weights = new Float64Array(count)
  for (let i = 0; i < count; i++) {
    let x = Math.cos((Math.PI * (i + 0.75)) / (count + 0.5))
    let slope = 1
    for (let iteration = 0; iteration < 50; iteration++) {
      let previous = 1
      let value = x
      for (let k = 2; k <= count; k++) [previous, value] = [value, ((2 * k - 1) * x * value - (k - 1) * previous) / k]
      slope = (count * (x * value - previous)) / (x * x - 1)
      const step = value / slope
      x -= step
      if (Math.abs(step) < 1e-15) break
    }
    nodes[i] = x
    weights[i] = 2 / ((1 - x * x) * slope * slope)
  }
  return { nodes, weights }
}

import { expect, test } from 'vitest'
import { erfc, gammaRatio, gaussLegendre, logGamma } from '@/lib/analysis/special-functions'
import checks from '../reference/checks.json'

// Γ(n) = (n − 1)!, Γ(½) = √π, Γ(n + ½) by recurrence (Abramowitz & Stegun 6.1.5, 6.1.8, 6.1.12).
test('logGamma at integers and halves, on both sides of the change of series', () => {
  let logFactorial = 0
  let logHalf = 0.5 * Math.log(Math.PI)
  for (let n = 1; n < 120; n++) {
    expect(Math.abs(logGamma(n) - logFactorial)).toBeLessThan(3e-14 * Math.max(1, logFactorial))
    expect(Math.abs(logGamma(n - 0.5) - logHalf)).toBeLessThan(3e-14 * Math.max(1, Math.abs(logHalf)))
    logFactorial += Math.log(n)
    logHalf += Math.log(n - 0.5)
  }
  expect(() => logGamma(0)).toThrow(RangeError)
})

test('gammaRatio(299) and its continuity at 100', () => {
  expect(gammaRatio(299)).toBeCloseTo(checks.values['6.gamma_299'], 13)
  const direct = (n: number) => Math.sqrt(2 / n) * Math.exp(logGamma(n / 2) - logGamma((n - 1) / 2))
  for (const n of [100, 150, 300]) expect(gammaRatio(n)).toBeCloseTo(direct(n), 12)
})

// Abramowitz & Stegun table 7.1 (erf) and table 7.3 (x e^{x²} erfc x), and mpmath values to 15 digits.
test.each([
  [0, 1],
  [0.5, 0.4795001221869535],
  [1, 0.15729920705028513],
  [2, 0.004677734981047266],
  [3, 2.209049699858544e-5],
  [5, 1.5374597944280349e-12],
  [-1, 1.8427007929497148],
])('erfc(%f)', (x, expected) => {
  expect(Math.abs(erfc(x) / expected - 1)).toBeLessThan(1e-12)
})

test('gaussLegendre(n) integrates every polynomial up to degree 2n − 1', () => {
  const { nodes, weights } = gaussLegendre(8)
  for (let degree = 0; degree < 16; degree++) {
    const integral = nodes.reduce((total, x, i) => total + weights[i] * x ** degree, 0)
    expect(integral).toBeCloseTo(degree % 2 === 0 ? 2 / (degree + 1) : 0, 13)
  }
})

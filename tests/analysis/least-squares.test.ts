import { describe, expect, test } from 'vitest'
import {
  compressProblem,
  euclideanNorm,
  factorQr,
  inverseGram,
  multiplyQ,
  multiplyQTransposed,
  solveLeastSquares,
  solveUpper,
  solveUpperTransposed,
} from '@/lib/analysis/least-squares'

const columns = [
  Float64Array.of(1, 1, 1, 1, 1),
  Float64Array.of(0, 1, 2, 3, 5),
  Float64Array.of(1e6, -2e6, 3e6, 1e6, 4e6),
]
const values = Float64Array.of(2, -1, 0.5, 7, 3)

/** Normal equations by Cramer's rule: slow, plain and independent of the reflections. */
function cramer(a: readonly Float64Array[], y: Float64Array): number[] {
  const dot = (u: Float64Array, v: Float64Array) => u.reduce((sum, x, i) => sum + x * v[i], 0)
  const determinant = (m: number[][]): number =>
    m.length === 1
      ? m[0][0]
      : m[0].reduce(
          (sum, x, j) => sum + (j % 2 ? -x : x) * determinant(m.slice(1).map((row) => row.filter((_, k) => k !== j))),
          0,
        )
  const gram = a.map((u) => a.map((v) => dot(u, v)))
  const right = a.map((u) => dot(u, y))
  return a.map(
    (_, j) => determinant(gram.map((row, i) => row.map((x, k) => (k === j ? right[i] : x)))) / determinant(gram),
  )
}

describe('solveLeastSquares', () => {
  test('agrees with the normal equations on a small problem', () => {
    const solution = solveLeastSquares(columns, values)
    if (!solution.ok) throw new Error(solution.reason)
    cramer(columns, values).forEach((expected, j) => {
      expect(Math.abs(solution.coefficients[j] / expected - 1)).toBeLessThan(1e-10)
    })
    let rss = 0
    for (let i = 0; i < 5; i++) {
      const left = values[i] - columns.reduce((sum, column, j) => sum + column[i] * solution.coefficients[j], 0)
      expect(solution.residual[i]).toBeCloseTo(left, 12)
      rss += left * left
    }
    expect(solution.rss).toBeCloseTo(rss, 12)
  })

  test('names dependent columns, a column of zeros and too few rows', () => {
    const doubled = columns[1].map((x) => 2 * x)
    expect(solveLeastSquares([columns[0], columns[1], doubled], values)).toEqual({ ok: false, reason: 'singular' })
    expect(solveLeastSquares([new Float64Array(5)], values)).toEqual({ ok: false, reason: 'singular' })
    const short = columns.map((column) => column.slice(0, 2))
    expect(solveLeastSquares(short, values.slice(0, 2))).toEqual({ ok: false, reason: 'few-points', needed: 3, got: 2 })
  })

  test('refuses columns of unequal length', () => {
    expect(() => factorQr([columns[0], columns[1].slice(1)])).toThrow(RangeError)
  })
})

describe('the factors', () => {
  const qr = factorQr(columns)
  if (!qr.ok) throw new Error(qr.reason)

  test('Q is orthogonal both ways and R·scale gives the columns back', () => {
    const round = multiplyQ(qr, multiplyQTransposed(qr, values))
    values.forEach((value, i) => expect(round[i]).toBeCloseTo(value, 13))
    columns.forEach((column, j) => {
      const head = new Float64Array(3)
      head.set(qr.r[j])
      const rebuilt = multiplyQ(qr, head)
      column.forEach((value, i) => expect(rebuilt[i] * qr.scale[j]).toBeCloseTo(value, 8))
    })
  })

  test('both triangular solves undo the triangle, and inverseGram is (AᵀA)^{−1}', () => {
    const inverse = inverseGram(qr)
    for (let i = 0; i < 3; i++) {
      for (let k = 0; k < 3; k++) {
        let entry = 0
        for (let j = 0; j < 3; j++)
          entry += inverse[i][j] * columns[j].reduce((sum, x, n) => sum + x * columns[k][n], 0)
        expect(entry).toBeCloseTo(i === k ? 1 : 0, 8)
      }
    }
    const rhs = Float64Array.of(1, 2, 3e6)
    const w = solveUpperTransposed(qr, rhs)
    // wᵀ·(R·scale) = rhsᵀ
    rhs.forEach((value, j) => {
      const back = qr.r[j].reduce((sum, x, i) => sum + x * qr.scale[j] * w[i], 0)
      expect(back / value).toBeCloseTo(1, 12)
    })
    solveUpper(qr, new Float64Array(3)).forEach((c) => expect(Math.abs(c)).toBe(0))
  })
})

test('compressProblem keeps the answer of every subset of columns', () => {
  const compressed = compressProblem(columns, values)
  if (!Array.isArray(compressed)) throw new Error(compressed.reason)
  for (const subset of [[0], [1, 2], [0, 1, 2]]) {
    const whole = solveLeastSquares(
      subset.map((j) => columns[j]),
      values,
    )
    const small = solveLeastSquares(
      subset.map((j) => compressed[j]),
      compressed[3],
    )
    if (!whole.ok || !small.ok) throw new Error('unexpected failure')
    expect(small.rss).toBeCloseTo(whole.rss, 10)
    whole.coefficients.forEach((c, j) => expect(small.coefficients[j] / c).toBeCloseTo(1, 10))
  }
})

test('euclideanNorm neither overflows nor underflows', () => {
  expect(euclideanNorm(Float64Array.of(3e200, 4e200)) / 5e200).toBeCloseTo(1, 14)
  expect(euclideanNorm(Float64Array.of(3e-200, 4e-200)) / 5e-200).toBeCloseTo(1, 14)
  expect(euclideanNorm(new Float64Array(4))).toBe(0)
})

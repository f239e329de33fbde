import type { Failure } from './types'

/**
 * Householder QR factors A·diag(1/scale) = Q·R of N × p columns, each scaled to norm 1 beforehand.
 * Q is kept as p reflectors; R as its columns, r[j] holding rows 0 … j.
 */
export interface QrFactors {
  ok: true
  rowCount: number
  columnCount: number
  /** Norm of each column as it came. */
  scale: Float64Array
  r: Float64Array[]
  /** Unit vectors v_j, zero above row j: Q = H_0 H_1 …, H_j = 1 − 2 v_j v_jᵀ. */
  reflectors: Float64Array[]
}

export interface LeastSquaresSolution {
  ok: true
  coefficients: Float64Array
  /** values − A·coefficients, by projection. */
  residual: Float64Array
  /** Sum of squared residuals. */
  rss: number
  qr: QrFactors
}

/** Smallest |R_jj| against the largest, below which columns count as dependent. */
const RANK_TOLERANCE = 1e-10

/**
 * Thin QR of columns of equal length by Householder reflections (never the normal equations, whose condition is squared).
 *
 * @returns the factors; `few-points` with fewer rows than columns; `singular` where |R_jj| < 1e-10 · max |R_ii|
 * @see Golub & Van Loan, Matrix Computations, Algorithm 5.2.1
 */
export function factorQr(columns: readonly Float64Array[]): QrFactors | Failure {
  const columnCount = columns.length
  const rowCount = columnCount === 0 ? 0 : columns[0].length
  for (const column of columns) {
    if (column.length !== rowCount) {
      throw new RangeError(`columns must be of equal length: got ${rowCount} and ${column.length}`)
    }
  }
  if (rowCount < columnCount) return { ok: false, reason: 'few-points', needed: columnCount, got: rowCount }

  const scale = new Float64Array(columnCount)
  const reflectors: Float64Array[] = []
  const r: Float64Array[] = []
  let largest = 0
  let smallest = Infinity
  for (let j = 0; j < columnCount; j++) {
    const norm = euclideanNorm(columns[j], 0)
    scale[j] = norm
    if (!(norm > 0) || !Number.isFinite(norm)) return { ok: false, reason: 'singular' }
    const work = new Float64Array(rowCount)
    const source = columns[j]
    for (let i = 0; i < rowCount; i++) work[i] = source[i] / norm
    for (let k = 0; k < j; k++) reflectInPlace(reflectors[k], k, work)
    const below = euclideanNorm(work, j)
    const diagonal = work[j] > 0 ? -below : below
    const rColumn = work.slice(0, j + 1)
    rColumn[j] = diagonal
    r.push(rColumn)
    largest = Math.max(largest, below)
    smallest = Math.min(smallest, below)
    if (!(smallest >= RANK_TOLERANCE * largest) || below === 0) return { ok: false, reason: 'singular' }
    // v = (x − diagonal·e_j) / norm; its norm² is 2·below·(below + |x_j|)
    const length = Math.sqrt(2 * below * (below + Math.abs(work[j])))
    work[j] -= diagonal
    for (let i = 0; i < j; i++) work[i] = 0
    for (let i = j; i < rowCount; i++) work[i] /= length
    reflectors.push(work)
  }
  return { ok: true, rowCount, columnCount, scale, r, reflectors }
}

/** Qᵀ·values: the first p entries belong to the columns' span, the others hold what the columns cannot explain. */
export function multiplyQTransposed(qr: QrFactors, values: Float64Array): Float64Array {
  const result = Float64Array.from(values)
  for (let k = 0; k < qr.columnCount; k++) reflectInPlace(qr.reflectors[k], k, result)
  return result
}

/** Q·values, for values of length N (the inverse of multiplyQTransposed) or of length p (then Q is the thin one). */
export function multiplyQ(qr: QrFactors, values: Float64Array): Float64Array {
  const result = new Float64Array(qr.rowCount)
  result.set(values)
  for (let k = qr.columnCount - 1; k >= 0; k--) reflectInPlace(qr.reflectors[k], k, result)
  return result
}

/** Solves A·c = Q·[head; 0] for c by back substitution; head has p entries (more are passed over). */
export function solveUpper(qr: QrFactors, head: Float64Array): Float64Array {
  const { columnCount, r, scale } = qr
  const solution = head.slice(0, columnCount)
  for (let j = columnCount - 1; j >= 0; j--) {
    solution[j] /= r[j][j]
    for (let i = 0; i < j; i++) solution[i] -= r[j][i] * solution[j]
  }
  for (let j = 0; j < columnCount; j++) solution[j] /= scale[j]
  return solution
}

/** Solves (R·diag(scale))ᵀ·w = rhs by forward substitution. */
export function solveUpperTransposed(qr: QrFactors, rhs: Float64Array): Float64Array {
  const { columnCount, r, scale } = qr
  const solution = new Float64Array(columnCount)
  for (let j = 0; j < columnCount; j++) {
    let sum = rhs[j] / scale[j]
    for (let i = 0; i < j; i++) sum -= r[j][i] * solution[i]
    solution[j] = sum / r[j][j]
  }
  return solution
}

/** (AᵀA)^{−1} as p rows, from R alone. */
export function inverseGram(qr: QrFactors): Float64Array[] {
  const { columnCount } = qr
  const inverse: Float64Array[] = []
  for (let j = 0; j < columnCount; j++) {
    const unit = new Float64Array(columnCount)
    unit[j] = 1
    inverse.push(solveUpper(qr, solveUpperTransposed(qr, unit)))
  }
  for (let i = 0; i < columnCount; i++) {
    for (let j = 0; j < i; j++) inverse[i][j] = inverse[j][i] = (inverse[i][j] + inverse[j][i]) / 2
  }
  return inverse
}

/**
 * Least squares A·c ≈ values.
 *
 * @param columns the columns of A, each of length N
 * @param values N values
 * @returns coefficients, residual and RSS, or `few-points` / `singular` (see factorQr)
 */
export function solveLeastSquares(
  columns: readonly Float64Array[],
  values: Float64Array,
): LeastSquaresSolution | Failure {
  const qr = factorQr(columns)
  return qr.ok ? solveWithFactors(qr, values) : qr
}

/** The same for factors that are there already: one factorisation serves many right-hand sides. */
export function solveWithFactors(qr: QrFactors, values: Float64Array): LeastSquaresSolution {
  const rotated = multiplyQTransposed(qr, values)
  const coefficients = solveUpper(qr, rotated)
  let rss = 0
  for (let i = qr.columnCount; i < qr.rowCount; i++) rss += rotated[i] * rotated[i]
  rotated.fill(0, 0, qr.columnCount)
  return { ok: true, coefficients, residual: multiplyQ(qr, rotated), rss, qr }
}

/**
 * The same problem in as few rows as it has unknowns: with [A, values] = Q·S every linear least-squares question about a
 * subset of the columns has the same answer on the p + 1 rows of S.
 *
 * @returns S's columns (p + 1 rows each), the last one standing for the values
 */
export function compressProblem(columns: readonly Float64Array[], values: Float64Array): Float64Array[] | Failure {
  const qr = factorQr(columns)
  if (!qr.ok) return qr
  const { columnCount, r, scale } = qr
  const rotated = multiplyQTransposed(qr, values)
  const compressed = r.map((rColumn, j) => {
    const column = new Float64Array(columnCount + 1)
    for (let i = 0; i <= j; i++) column[i] = rColumn[i] * scale[j]
    return column
  })
  const last = new Float64Array(columnCount + 1)
  last.set(rotated.subarray(0, columnCount))
  last[columnCount] = euclideanNorm(rotated, columnCount)
  compressed.push(last)
  return compressed
}

/** √Σ x_i² over i ≥ start, safe against overflow. */
export function euclideanNorm(values: Float64Array, start = 0): number {
  let sum = 0
  for (let i = start; i < values.length; i++) sum += values[i] * values[i]
  if (sum > 1e-280 && sum < 1e280) return Math.sqrt(sum)
  let largest = 0
  for (let i = start; i < values.length; i++) largest = Math.max(largest, Math.abs(values[i]))
  if (!(largest > 0) || !Number.isFinite(largest)) return largest
  let scaled = 0
  for (let i = start; i < values.length; i++) scaled += (values[i] / largest) ** 2
  return largest * Math.sqrt(scaled)
}

/** Σ u_i v_i over columns of equal length, in four sums at once. */
export function dot(u: Float64Array, v: Float64Array): number {
  let sum0 = 0
  let sum1 = 0
  let sum2 = 0
  let sum3 = 0
  let i = 0
  for (; i + 3 < u.length; i += 4) {
    sum0 += u[i] * v[i]
    sum1 += u[i + 1] * v[i + 1]
    sum2 += u[i + 2] * v[i + 2]
    sum3 += u[i + 3] * v[i + 3]
  }
  for (; i < u.length; i++) sum0 += u[i] * v[i]
  return sum0 + sum1 + (sum2 + sum3)
}

/** H = 1 − 2vvᵀ applied to target. Four sums at once, since a single running sum waits for each addition. */
function reflectInPlace(reflector: Float64Array, start: number, target: Float64Array): void {
  const length = target.length
  let sum0 = 0
  let sum1 = 0
  let sum2 = 0
  let sum3 = 0
  let i = start
  for (; i + 3 < length; i += 4) {
    sum0 += reflector[i] * target[i]
    sum1 += reflector[i + 1] * target[i + 1]
    sum2 += reflector[i + 2] * target[i + 2]
    sum3 += reflector[i + 3] * target[i + 3]
  }
  for (; i < length; i++) sum0 += reflector[i] * target[i]
  const twice = 2 * (sum0 + sum1 + (sum2 + sum3))
  for (let j = start; j < length; j++) target[j] -= twice * reflector[j]
}

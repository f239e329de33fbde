/**
 * Linear least squares by the normal equations and Gauss elimination with pivots: nothing of lib/analysis, so that the
 * simulator's truth is not judged by the code it is there to test. Good enough for a handful of well-scaled columns.
 */
export function fitByNormalEquations(
  columns: ((timeSeconds: number) => number)[],
  timeSeconds: Float64Array,
  values: Float64Array,
): number[] {
  const size = columns.length
  const rows = Array.from({ length: size }, () => new Array<number>(size + 1).fill(0))
  for (let i = 0; i < timeSeconds.length; i++) {
    const row = columns.map((column) => column(timeSeconds[i]))
    for (let a = 0; a < size; a++) {
      for (let b = 0; b < size; b++) rows[a][b] += row[a] * row[b]
      rows[a][size] += row[a] * values[i]
    }
  }
  for (let pivot = 0; pivot < size; pivot++) {
    let best = pivot
    for (let r = pivot + 1; r < size; r++) if (Math.abs(rows[r][pivot]) > Math.abs(rows[best][pivot])) best = r
    ;[rows[pivot], rows[best]] = [rows[best], rows[pivot]]
    for (let r = 0; r < size; r++) {
      if (r === pivot) continue
      const factor = rows[r][pivot] / rows[pivot][pivot]
      for (let c = pivot; c <= size; c++) rows[r][c] -= factor * rows[pivot][c]
    }
  }
  return rows.map((row, i) => row[size] / row[i])
}

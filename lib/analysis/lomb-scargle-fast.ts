import {
  lineFromSums,
  lombScargleDirect,
  withoutPolynomial,
  type FrequencyGrid,
  type LombScargleProblem,
} from './lomb-scargle'
import { nonuniformFft } from './nonuniform-fft'

/** Up to this many sample-frequency pairs the defining sums are quick enough. */
const DIRECT_LIMIT = 2e6

/**
 * Standard powers on a linear grid by non-uniform FFTs: one for the values and the first polynomial, one for every two
 * further polynomials, one for the weights at twice the frequency. Error below 1e-8 in P; take final peaks from lineAt.
 */
export function lombScargleFast(problem: LombScargleProblem, grid: FrequencyGrid): Float64Array {
  const { time, weights, basis, weightedResidual, residualVariance } = problem
  const columns = [weightedResidual, ...basis.map((p) => p.map((x, i) => x * weights[i]))]
  const transforms: Float64Array[] = []
  for (let k = 0; k < columns.length; k += 2) {
    const pair = nonuniformFft({ time, first: columns[k], second: columns[k + 1] ?? null, ...grid })
    transforms.push(pair.first, pair.second)
  }
  const doubled = nonuniformFft({ time, first: weights, second: null, ...grid, stepHz: 2 * grid.stepHz }).first
  const power = new Float64Array(grid.count)
  const projections = new Float64Array(2 * basis.length)
  for (let j = 0; j < grid.count; j++) {
    for (let k = 0; k < basis.length; k++) {
      projections[2 * k] = transforms[k + 1][2 * j]
      projections[2 * k + 1] = -transforms[k + 1][2 * j + 1]
    }
    const raw = {
      yc: transforms[0][2 * j],
      ys: -transforms[0][2 * j + 1],
      cc: 0.5 * (1 + doubled[2 * j]),
      ss: 0.5 * (1 - doubled[2 * j]),
      cs: -0.5 * doubled[2 * j + 1],
    }
    power[j] = lineFromSums(withoutPolynomial(raw, projections), residualVariance).power
  }
  return power
}

/** The direct sums where they are quick, the fast form elsewhere. */
export function lombScargle(problem: LombScargleProblem, grid: FrequencyGrid): Float64Array {
  return problem.time.length * grid.count <= DIRECT_LIMIT
    ? lombScargleDirect(problem, grid)
    : lombScargleFast(problem, grid)
}

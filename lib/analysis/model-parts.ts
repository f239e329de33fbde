import type { JointFit } from './joint-fit'
import type { Track } from './types'

/** The parts of a fitted model at the run's samples, in arc seconds of axis. */
export interface ModelParts {
  drift: Float64Array
  worm: Float64Array
  lines: Float64Array
}

export function splitModel(fit: JointFit, track: Track): ModelParts {
  const count = track.timeSeconds.length
  const wormStart = fit.shape.driftDegree + 1
  const lineStart = wormStart + 2 * fit.shape.wormOrders.length
  const sum = (from: number, to: number) => {
    const part = new Float64Array(count)
    for (let j = from; j < to; j++) {
      const column = fit.jacobian[j]
      const coefficient = fit.coefficients[j]
      for (let i = 0; i < count; i++) part[i] += coefficient * column[i]
    }
    return part
  }
  return { drift: sum(0, wormStart), worm: sum(wormStart, lineStart), lines: sum(lineStart, fit.coefficients.length) }
}

/** The model at other times: drift alone and everything together. */
export function evaluateModel(fit: JointFit, timeSeconds: Float64Array): { drift: Float64Array; fitted: Float64Array } {
  const { time, shape, coefficients, frequencies } = fit
  const drift = timeSeconds.map((t) => {
    const tau = (t - time.referenceSeconds) / time.halfSpanSeconds
    let value = 0
    for (let j = shape.driftDegree; j >= 0; j--) value = value * tau + coefficients[j]
    return value
  })
  const oscillations = [
    ...shape.wormOrders.map((order) => order * frequencies.wormHz),
    ...frequencies.linesHz.slice(0, shape.lineCount),
  ]
  const fitted = timeSeconds.map((t, i) => {
    let value = drift[i]
    oscillations.forEach((hertz, k) => {
      const angle = 2 * Math.PI * hertz * (t - time.referenceSeconds)
      const column = shape.driftDegree + 1 + 2 * k
      value += coefficients[column] * Math.cos(angle) + coefficients[column + 1] * Math.sin(angle)
    })
    return value
  })
  return { drift, fitted }
}

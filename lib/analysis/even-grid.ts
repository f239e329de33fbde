import { GAP_CADENCES } from './clean'
import { medianCadence } from './sampling'

/** Samples at start + n·cadence. Cells without a sample hold 0 and are marked absent; they are never filled. */
export interface EvenGrid {
  startSeconds: number
  cadenceSeconds: number
  values: Float64Array
  isPresent: Uint8Array
  method: 'as-recorded' | 'interpolated' | 'averaged'
}

/** Above this many cells neighbouring samples are averaged. */
const LARGEST_GRID = 2 ** 19

/** Time stamps within this share of a cadence from the grid count as lying on it. */
const ON_GRID_SHARE = 1e-3

/**
 * A track on an even grid, for the picture of its spectrum only: no figure is ever taken from it. Samples that lie on
 * the grid are placed; slightly uneven ones are interpolated linearly (which dims lines near the Nyquist limit); very
 * long records are averaged cell by cell.
 *
 * @param timeSeconds strictly increasing, at least 2
 */
export function toEvenGrid(timeSeconds: Float64Array, values: Float64Array, largestCount = LARGEST_GRID): EvenGrid {
  if (timeSeconds.length < 2) throw new RangeError(`timeSeconds must hold at least 2 times: got ${timeSeconds.length}`)
  const startSeconds = timeSeconds[0]
  const duration = timeSeconds[timeSeconds.length - 1] - startSeconds
  const median = medianCadence(timeSeconds)
  const steps = Math.max(1, Math.min(Math.round(duration / median), largestCount - 1))
  // A grid that ends on the last sample does not run away from stamps that were rounded.
  const cadenceSeconds = duration / steps
  const grid: EvenGrid = {
    startSeconds,
    cadenceSeconds,
    values: new Float64Array(steps + 1),
    isPresent: new Uint8Array(steps + 1),
    method: 'as-recorded',
  }
  if (cadenceSeconds > 1.5 * median) return averageInto(grid, timeSeconds, values)
  return isOnGrid(grid, timeSeconds) ? placeInto(grid, timeSeconds, values) : interpolateInto(grid, timeSeconds, values)
}

const cellOf = (grid: EvenGrid, time: number) => Math.round((time - grid.startSeconds) / grid.cadenceSeconds)

function isOnGrid(grid: EvenGrid, timeSeconds: Float64Array): boolean {
  let previous = -1
  return timeSeconds.every((time) => {
    const position = (time - grid.startSeconds) / grid.cadenceSeconds
    const cell = Math.round(position)
    const isNew = cell > previous
    previous = cell
    return isNew && Math.abs(position - cell) <= ON_GRID_SHARE
  })
}

function placeInto(grid: EvenGrid, timeSeconds: Float64Array, values: Float64Array): EvenGrid {
  timeSeconds.forEach((time, i) => {
    const cell = cellOf(grid, time)
    grid.values[cell] = values[i]
    grid.isPresent[cell] = 1
  })
  return grid
}

function averageInto(grid: EvenGrid, timeSeconds: Float64Array, values: Float64Array): EvenGrid {
  const counts = new Uint32Array(grid.values.length)
  timeSeconds.forEach((time, i) => {
    const cell = cellOf(grid, time)
    grid.values[cell] += values[i]
    counts[cell]++
  })
  counts.forEach((count, cell) => {
    if (count === 0) return
    grid.values[cell] /= count
    grid.isPresent[cell] = 1
  })
  return { ...grid, method: 'averaged' }
}

function interpolateInto(grid: EvenGrid, timeSeconds: Float64Array, values: Float64Array): EvenGrid {
  const longest = GAP_CADENCES * grid.cadenceSeconds
  const lastSample = timeSeconds.length - 1
  let i = 0
  for (let cell = 0; cell < grid.values.length; cell++) {
    const time = Math.min(grid.startSeconds + cell * grid.cadenceSeconds, timeSeconds[lastSample])
    while (i < lastSample - 1 && timeSeconds[i + 1] < time) i++
    const spacing = timeSeconds[i + 1] - timeSeconds[i]
    const share = (time - timeSeconds[i]) / spacing
    if (spacing > longest && share > 0 && share < 1) continue
    grid.values[cell] = values[i] * (1 - share) + values[i + 1] * share
    grid.isPresent[cell] = 1
  }
  return { ...grid, method: 'interpolated' }
}

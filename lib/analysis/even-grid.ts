import { medianCadence } from './sampling'

/** Samples at start + n·cadence. Cells without a sample hold 0 and are marked absent; they are never filled. */
export interface EvenGrid {
  startSeconds: number
  cadenceSeconds: number
  values: Float64Array
  isPresent: Uint8Array
  method: 'as-recorded' | 'fine' | 'averaged'
}

/** Above this many cells neighbouring samples are averaged. */
const LARGEST_GRID = 2 ** 19

/** Time stamps within this share of a cadence from the grid count as lying on it. */
const ON_GRID_SHARE = 1e-3

/**
 * How much finer than the cadence the cells are for uneven times. A sample is at most a sixteenth of a cadence from its
 * cell, which dims a line at the Nyquist limit by 0.6 % and slower ones by the square of their frequency less;
 * interpolation would dim lines and noise alike by up to a half there.
 */
const FINE_CELLS = 8

/**
 * A track on an even grid, for the picture of its spectrum only: no figure is ever taken from it. Samples that lie on
 * the grid of the cadence are placed there, uneven ones into cells an eighth as wide; very long records are averaged
 * cell by cell.
 *
 * @param timeSeconds strictly increasing, at least 2
 */
export function toEvenGrid(timeSeconds: Float64Array, values: Float64Array, largestCount = LARGEST_GRID): EvenGrid {
  if (timeSeconds.length < 2) throw new RangeError(`timeSeconds must hold at least 2 times: got ${timeSeconds.length}`)
  const duration = timeSeconds[timeSeconds.length - 1] - timeSeconds[0]
  const steps = Math.max(1, Math.round(duration / medianCadence(timeSeconds)))
  const frame = (stepCount: number) => ({
    startSeconds: timeSeconds[0],
    // A grid that ends on the last sample does not run away from stamps that were rounded.
    cadenceSeconds: duration / stepCount,
    values: new Float64Array(stepCount + 1),
    isPresent: new Uint8Array(stepCount + 1),
  })
  if (steps >= largestCount) {
    return averageInto({ ...frame(largestCount - 1), method: 'averaged' }, timeSeconds, values)
  }
  const plain: EvenGrid = { ...frame(steps), method: 'as-recorded' }
  if (isOnGrid(plain, timeSeconds)) return averageInto(plain, timeSeconds, values)
  const finer = Math.max(1, Math.min(FINE_CELLS, Math.floor((largestCount - 1) / steps)))
  return averageInto({ ...frame(finer * steps), method: 'fine' }, timeSeconds, values)
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

/** Mean of the samples in each cell; one sample stands as it is. */
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
  return grid
}

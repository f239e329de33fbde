import type { Track } from './types'

/** Means of `size` consecutive samples each, blocks never crossing a gap; samples left over at a gap are passed over. */
export interface BlockAverage {
  track: Track
  size: number
  /** Index of each block's first sample. */
  firstIndex: Int32Array
}

/**
 * Averages for looking for a model in long records. Never used for reported figures: a line of frequency f keeps only
 * sinc(f·size·Δ) of its amplitude.
 */
export function averageBlocks(track: Track, options: { size: number; cadenceSeconds: number }): BlockAverage {
  const { size, cadenceSeconds } = options
  const { timeSeconds, raArcsec } = track
  const times: number[] = []
  const values: number[] = []
  const firsts: number[] = []
  const longest = 1.5 * size * cadenceSeconds
  for (let i = 0; i + size <= timeSeconds.length;) {
    const isWhole = timeSeconds[i + size - 1] - timeSeconds[i] <= longest
    if (!isWhole) {
      i += 1
      continue
    }
    let time = 0
    let value = 0
    for (let k = i; k < i + size; k++) {
      time += timeSeconds[k] - timeSeconds[i]
      value += raArcsec[k]
    }
    times.push(timeSeconds[i] + time / size)
    values.push(value / size)
    firsts.push(i)
    i += size
  }
  return {
    track: { timeSeconds: Float64Array.from(times), raArcsec: Float64Array.from(values) },
    size,
    firstIndex: Int32Array.from(firsts),
  }
}

/** Σ over all blocks of the squared deviations from the block's own mean: what averaging has hidden. */
export function scatterWithinBlocks(blocks: BlockAverage, values: Float64Array): number {
  let total = 0
  for (const first of blocks.firstIndex) {
    let mean = 0
    for (let k = first; k < first + blocks.size; k++) mean += values[k]
    mean /= blocks.size
    for (let k = first; k < first + blocks.size; k++) total += (values[k] - mean) ** 2
  }
  return total
}

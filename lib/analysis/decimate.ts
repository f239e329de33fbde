export interface DecimatedCurve {
  timeSeconds: Float64Array
  /** NaN breaks the line at a gap. */
  values: Float64Array
}

const LARGEST_COUNT = 3000

/** Only the longest gaps break the line when there are more than this share of the points. */
const LARGEST_BREAK_SHARE = 0.1

/**
 * A curve thinned for drawing: every stretch of time keeps its lowest and highest sample in the order they came, so
 * that no peak is lost; a NaN stands in every gap.
 *
 * @param options.segmentStarts first index of every segment, rising from 0
 * @returns at most `largestCount` points, breaks included
 */
export function decimate(options: {
  timeSeconds: Float64Array
  values: Float64Array
  segmentStarts: readonly number[]
  largestCount?: number
}): DecimatedCurve {
  const { timeSeconds, values, largestCount = LARGEST_COUNT } = options
  const count = timeSeconds.length
  if (count === 0) return { timeSeconds: new Float64Array(0), values: new Float64Array(0) }
  const starts = longestBreaks(timeSeconds, options.segmentStarts, Math.floor(LARGEST_BREAK_SHARE * largestCount))
  const breakCount = starts.length - 1
  const isWhole = count + breakCount <= largestCount
  const stretches = Math.max(1, Math.floor((largestCount - 3 * breakCount) / 2) - 1)
  const width = (timeSeconds[count - 1] - timeSeconds[0]) / stretches

  const times: number[] = []
  const kept: number[] = []
  const push = (i: number) => {
    times.push(timeSeconds[i])
    kept.push(values[i])
  }
  starts.forEach((start, segment) => {
    const end = segment + 1 < starts.length ? starts[segment + 1] : count
    if (segment > 0) {
      times.push((timeSeconds[start - 1] + timeSeconds[start]) / 2)
      kept.push(NaN)
    }
    if (isWhole) {
      for (let i = start; i < end; i++) push(i)
      return
    }
    for (let from = start; from < end;) {
      const stretch = Math.floor((timeSeconds[from] - timeSeconds[0]) / width)
      let [lowest, highest, to] = [from, from, from]
      while (to < end && Math.floor((timeSeconds[to] - timeSeconds[0]) / width) === stretch) {
        if (values[to] < values[lowest]) lowest = to
        if (values[to] > values[highest]) highest = to
        to++
      }
      push(Math.min(lowest, highest))
      if (lowest !== highest) push(Math.max(lowest, highest))
      from = to
    }
  })
  return { timeSeconds: Float64Array.from(times), values: Float64Array.from(kept) }
}

function longestBreaks(timeSeconds: Float64Array, segmentStarts: readonly number[], largestCount: number): number[] {
  const breaks = segmentStarts.slice(1)
  if (breaks.length <= largestCount) return [0, ...breaks]
  const length = (start: number) => timeSeconds[start] - timeSeconds[start - 1]
  const longest = breaks.toSorted((a, b) => length(b) - length(a)).slice(0, largestCount)
  return [0, ...longest.toSorted((a, b) => a - b)]
}

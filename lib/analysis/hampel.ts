import { GAUSSIAN_MAD_FACTOR } from './statistics'

export interface HampelOptions {
  /** k: the window reaches from i − k to i + k, cut at the ends of a segment. */
  halfWidth: number
  /** n: a sample further than n·S from the window's median is a stray. */
  threshold: number
  /** Least S, in the unit of the values, so that a run of equal values does not make strays of its neighbours. */
  smallestScale: number
  /** First index of every segment, rising from 0; windows do not cross them. */
  segmentStarts: readonly number[]
}

export interface HampelResult {
  /** 1 where a sample is a stray. */
  isStray: Uint8Array
  medians: Float64Array
  /** S_i = max(1.4826022185·median|x − m_i|, smallest scale). */
  scales: Float64Array
}

/**
 * Hampel's identifier in a running window. The window is kept sorted while it slides (one removal and one insertion
 * per sample) and the median deviation is found by walking outwards from the median, so that a million samples take
 * a fraction of a second; the plain form sorts each window twice.
 *
 * @param values finite samples
 * @see Hampel (1974), J. Am. Stat. Assoc. 69, 383; Davies & Gather (1993), ibid. 88, 782; Pearson (2002),
 * IEEE Trans. Control Syst. Technol. 10, 55
 */
export function hampelFilter(values: Float64Array, options: HampelOptions): HampelResult {
  const { halfWidth, threshold, smallestScale, segmentStarts } = options
  if (!Number.isInteger(halfWidth) || halfWidth < 1) {
    throw new RangeError(`halfWidth must be an integer of at least 1: got ${halfWidth}`)
  }
  const isStray = new Uint8Array(values.length)
  const medians = new Float64Array(values.length)
  const scales = new Float64Array(values.length)
  const sorted = new Float64Array(2 * halfWidth + 2)

  for (let segment = 0; segment < segmentStarts.length; segment++) {
    const first = segmentStarts[segment]
    const end = segment + 1 < segmentStarts.length ? segmentStarts[segment + 1] : values.length
    let size = 0
    for (let i = first; i < Math.min(first + halfWidth, end); i++) size = insert(sorted, size, values[i])
    for (let i = first; i < end; i++) {
      if (i + halfWidth < end) size = insert(sorted, size, values[i + halfWidth])
      if (i - halfWidth - 1 >= first) size = remove(sorted, size, values[i - halfWidth - 1])
      const centre = (sorted[(size - 1) >> 1] + sorted[size >> 1]) / 2
      medians[i] = centre
      scales[i] = Math.max(GAUSSIAN_MAD_FACTOR * medianDeviation(sorted, size, centre), smallestScale)
      if (Math.abs(values[i] - centre) > threshold * scales[i]) isStray[i] = 1
    }
  }
  return { isStray, medians, scales }
}

function insert(sorted: Float64Array, size: number, value: number): number {
  let i = size
  while (i > 0 && sorted[i - 1] > value) {
    sorted[i] = sorted[i - 1]
    i--
  }
  sorted[i] = value
  return size + 1
}

function remove(sorted: Float64Array, size: number, value: number): number {
  let i = 0
  while (sorted[i] !== value) i++
  for (; i < size - 1; i++) sorted[i] = sorted[i + 1]
  return size - 1
}

/** Median of |x − centre| over a sorted window: the deviations grow outwards on both sides, so the two are merged. */
function medianDeviation(sorted: Float64Array, size: number, centre: number): number {
  let right = 0
  while (right < size && sorted[right] < centre) right++
  let left = right - 1
  let lower = 0
  let current = 0
  for (let rank = 0; rank <= size >> 1; rank++) {
    lower = current
    const below = left >= 0 ? centre - sorted[left] : Infinity
    const above = right < size ? sorted[right] - centre : Infinity
    if (below <= above) {
      current = below
      left--
    } else {
      current = above
      right++
    }
  }
  return size % 2 === 1 ? current : (lower + current) / 2
}

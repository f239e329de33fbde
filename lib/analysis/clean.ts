import { failure } from './failure'
import { hampelFilter } from './hampel'
import { medianCadence } from './sampling'
import { differenceNoise } from './seeing-floor'
import { span } from './statistics'
import type { ExcludedSpan, Failure, LeftOutCount, Track } from './types'

/** Fewer samples than this are no record. */
export const FEWEST_SAMPLES = 20

/** With a larger share of missing or infinite samples the whole record is refused. */
const LARGEST_BAD_SHARE = 0.2

/** A pause longer than this many median cadences starts a new segment. */
export const GAP_CADENCES = 3

/** With more strays than this share of the samples something else is wrong: warn. */
export const STRAY_WARNING_SHARE = 0.05

const HAMPEL_HALF_WIDTH = 5
const HAMPEL_THRESHOLD = 5
/** Least scale of the filter as a share of the noise per sample … */
const HAMPEL_SMALLEST_SCALE_SHARE = 0.2
/** … and of the recording's own step: a sample two steps from a run of equal values is not yet a stray. */
const HAMPEL_SMALLEST_SCALE_STEPS = 0.5

export interface CleanOptions {
  /** Both ends belong to the span. */
  excludedSpans: readonly ExcludedSpan[]
  isStrayPointFilterOn: boolean
}

export interface CleanedTrack {
  ok: true
  /** Strictly increasing times, finite values, strays removed; nothing is ever interpolated. */
  track: Track
  /** Row of the input that each kept sample came from. */
  keptIndices: Uint32Array
  leftOut: LeftOutCount[]
  /** Samples that the filter took out, for the picture. */
  strays: Track
  strayShare: number
  /** Pauses of the recording itself; spans that were excluded by hand are not among them. */
  gaps: ExcludedSpan[]
  medianCadenceSeconds: number
  /** First index of every segment of the kept track. */
  segmentStarts: number[]
}

/**
 * Validates a track and leaves out what cannot be used: missing and infinite samples, repeated time stamps (the first
 * stays), spans excluded by hand and, if wished, strays (Hampel filter within segments, k = 5, n = 5).
 *
 * @returns `not-finite` with more than 20 % bad samples, `not-increasing` when time goes back, `few-points` with fewer
 * than 20 samples left
 */
export function cleanTrack(input: Track, options: CleanOptions): CleanedTrack | Failure {
  const rows = input.timeSeconds.length
  const counts: Record<LeftOutCount['reason'], number> = {
    missing: 0,
    'not-finite': 0,
    'repeated-time': 0,
    excluded: 0,
    stray: 0,
  }
  const valid = new Uint32Array(rows)
  let validCount = 0
  for (let i = 0; i < rows; i++) {
    const time = input.timeSeconds[i]
    const value = input.raArcsec[i]
    if (Number.isNaN(time) || Number.isNaN(value)) counts.missing++
    else if (!Number.isFinite(time) || !Number.isFinite(value)) counts['not-finite']++
    else if (validCount > 0 && time === input.timeSeconds[valid[validCount - 1]]) counts['repeated-time']++
    else if (validCount > 0 && time < input.timeSeconds[valid[validCount - 1]]) return failure('not-increasing')
    else valid[validCount++] = i
  }
  if (rows < FEWEST_SAMPLES) return failure('few-points', { needed: FEWEST_SAMPLES, got: rows })
  if (counts.missing + counts['not-finite'] > LARGEST_BAD_SHARE * rows) return failure('not-finite')
  if (validCount < FEWEST_SAMPLES) return failure('few-points', { needed: FEWEST_SAMPLES, got: validCount })

  const validTimes = pick(input.timeSeconds, valid.subarray(0, validCount))
  const medianCadenceSeconds = medianCadence(validTimes)
  const gaps = findGaps(validTimes, medianCadenceSeconds)

  const included = valid
    .slice(0, validCount)
    .filter((row) => !isExcluded(input.timeSeconds[row], options.excludedSpans))
  counts.excluded = validCount - included.length
  if (included.length < FEWEST_SAMPLES) return failure('few-points', { needed: FEWEST_SAMPLES, got: included.length })

  const isStray = options.isStrayPointFilterOn ? findStrays(pickTrack(input, included)) : null
  const keptIndices = isStray ? included.filter((_, i) => isStray[i] === 0) : included
  const strayIndices = isStray ? included.filter((_, i) => isStray[i] === 1) : new Uint32Array(0)
  counts.stray = strayIndices.length
  if (keptIndices.length < FEWEST_SAMPLES) {
    return failure('few-points', { needed: FEWEST_SAMPLES, got: keptIndices.length })
  }

  const track = pickTrack(input, keptIndices)
  return {
    ok: true,
    track,
    keptIndices,
    leftOut: (Object.keys(counts) as LeftOutCount['reason'][])
      .filter((reason) => counts[reason] > 0)
      .map((reason) => ({ reason, count: counts[reason] })),
    strays: pickTrack(input, strayIndices),
    strayShare: counts.stray / included.length,
    gaps,
    medianCadenceSeconds,
    segmentStarts: findSegmentStarts(track.timeSeconds, medianCadenceSeconds),
  }
}

/** First index of every run of samples without a pause of more than three cadences; empty for no samples. */
export function findSegmentStarts(timeSeconds: Float64Array, cadenceSeconds: number): number[] {
  if (timeSeconds.length === 0) return []
  const starts = [0]
  for (let i = 1; i < timeSeconds.length; i++) {
    if (timeSeconds[i] - timeSeconds[i - 1] > GAP_CADENCES * cadenceSeconds) starts.push(i)
  }
  return starts
}

function findGaps(timeSeconds: Float64Array, cadenceSeconds: number): ExcludedSpan[] {
  return findSegmentStarts(timeSeconds, cadenceSeconds)
    .slice(1)
    .map((start) => ({ startSeconds: timeSeconds[start - 1], endSeconds: timeSeconds[start] }))
}

function findStrays({ timeSeconds, raArcsec }: Track): Uint8Array {
  const noise = differenceNoise(timeSeconds, raArcsec)
  // On a coarse grid most second differences are 0 and the robust figure with them; the rms is then the honest one.
  const sigma = noise.ok ? (noise.robust > 0 ? noise.robust : noise.sigma2) : 0
  return hampelFilter(raArcsec, {
    halfWidth: HAMPEL_HALF_WIDTH,
    threshold: HAMPEL_THRESHOLD,
    smallestScale: Math.max(HAMPEL_SMALLEST_SCALE_SHARE * sigma, HAMPEL_SMALLEST_SCALE_STEPS * recordingStep(raArcsec)),
    segmentStarts: findSegmentStarts(timeSeconds, medianCadence(timeSeconds)),
  }).isStray
}

/** Smallest difference of neighbours that is not rounding: the step of a coarse recording, next to 0 for a fine one. */
function recordingStep(values: Float64Array): number {
  const rounding = 1e-9 * span(values)
  let smallest = Infinity
  for (let i = 1; i < values.length; i++) {
    const difference = Math.abs(values[i] - values[i - 1])
    if (difference > rounding && difference < smallest) smallest = difference
  }
  return Number.isFinite(smallest) ? smallest : 0
}

function isExcluded(timeSeconds: number, spans: readonly ExcludedSpan[]): boolean {
  return spans.some(({ startSeconds, endSeconds }) => timeSeconds >= startSeconds && timeSeconds <= endSeconds)
}

function pick(values: Float64Array, indices: Uint32Array): Float64Array {
  const picked = new Float64Array(indices.length)
  for (let i = 0; i < indices.length; i++) picked[i] = values[indices[i]]
  return picked
}

function pickTrack(track: Track, indices: Uint32Array): Track {
  return { timeSeconds: pick(track.timeSeconds, indices), raArcsec: pick(track.raArcsec, indices) }
}

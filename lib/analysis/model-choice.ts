import { drain } from './drain'
import { averageBlocks, scatterWithinBlocks } from './block-average'
import type { BlockAverage } from './block-average'
import { listOscillations } from './fit-covariance'
import { fitJointlyInSteps } from './joint-fit'
import type { JointFit, JointFitRequest } from './joint-fit'
import { autoregressiveFactor, correctLagOne, effectiveSampleCount, lagOneCorrelation } from './noise-model'
import type { Failure, ModelCandidate, ModelChoice, Track } from './types'

export interface ModelChoiceRequest {
  track: Track
  cadenceSeconds: number
  worm: { frequencyHz: number; isFree: boolean }
  lines: readonly { frequencyHz: number; isFree: boolean }[]
  highestFrequencyHz: number
  /** Degrees and counts to choose from; a single one is not chosen but kept. */
  degrees: readonly number[]
  largestHarmonicCount: number
  fixedHarmonicCount: number | null
}

export interface ChosenModel {
  ok: true
  driftDegree: number
  harmonicCount: number
  /** The worm's frequency in the chosen model, a good start for the final fit. */
  wormHz: number
  choice: ModelChoice
  effectiveSampleCount: number
}

/** Records longer than this are averaged in blocks while models are compared. */
const DIRECT_SAMPLE_COUNT = 2000
/** Models whose BIC lies so close to the smallest count as equal; the simplest is taken. */
const BIC_TOLERANCE = 2

/** N_eff ln(RSS/N) + p ln N_eff (Schwarz 1978, Ann. Stat. 6, 461, with the number of independent samples). */
export function informationCriterion(options: {
  rss: number
  sampleCount: number
  effectiveCount: number
  parameterCount: number
}): number {
  const { rss, sampleCount, effectiveCount, parameterCount } = options
  return effectiveCount * Math.log(rss / sampleCount) + parameterCount * Math.log(effectiveCount)
}

/**
 * F-test that one more harmonic (two parameters) explains no more than noise: F = [(RSS_0 − RSS_1)/2]/[RSS_1/(N_eff − p_1)];
 * for two numerator degrees of freedom p = (1 + 2F/ν)^{−ν/2} exactly.
 */
export function harmonicTest(options: {
  rssWithout: number
  rssWith: number
  effectiveCount: number
  parameterCountWith: number
}): { f: number; probability: number } | null {
  const { rssWithout, rssWith, effectiveCount, parameterCountWith } = options
  const freedom = effectiveCount - parameterCountWith
  if (!(freedom > 0) || !(rssWith > 0)) return null
  const f = Math.max(0, (rssWithout - rssWith) / 2 / (rssWith / freedom))
  return { f, probability: Math.exp((-freedom / 2) * Math.log1p((2 * f) / freedom)) }
}

/**
 * Drift degree and number of harmonics together, by BIC on N_eff from the richest model's corrected lag-one correlation;
 * of all within 2 of the smallest, the lowest degree and then the fewest harmonics.
 *
 * Harmonics above the highest one that stands out of the richest fit (A ≥ 3 standard errors), and two more, are not tried,
 * nor what cannot come near the smallest even without any penalty.
 */
export function* chooseModelInSteps(request: ModelChoiceRequest): Generator<void, ChosenModel | Failure> {
  const { track, cadenceSeconds, degrees, fixedHarmonicCount } = request
  const sampleCount = track.timeSeconds.length
  const topDegree = Math.max(...degrees)
  const richest = yield* fitRichest(request, topDegree, fixedHarmonicCount ?? request.largestHarmonicCount)
  if (!richest.ok) return richest
  const lagOne = lagOneCorrelation(track.timeSeconds, richest.residual, cadenceSeconds)
  const corrected = correctLagOne(lagOne, sampleCount, richest.parameterCount)
  const effectiveCount = effectiveSampleCount(sampleCount, corrected)
  const richestCount = richest.shape.wormOrders.length
  const highestCount =
    fixedHarmonicCount ?? Math.min(richestCount, standingOrders(richest, cadenceSeconds, corrected) + 2)

  // Below this a residual is the rounding of the arithmetic and no evidence.
  const largestValue = track.raArcsec.reduce((most, value) => Math.max(most, Math.abs(value)), 0)
  const smallestRss = Math.max(sampleCount * (1e-12 * largestValue) ** 2, Number.MIN_VALUE)
  const search = prepareSearch(request, richest)
  const candidates: (ModelCandidate & { wormHz: number; rss: number; parameterCount: number })[] = []
  let wormHz = richest.frequencies.wormHz
  for (const driftDegree of [...degrees].sort((a, b) => b - a)) {
    for (let count = highestCount; count >= (fixedHarmonicCount ?? 1); count--) {
      const isRichest = driftDegree === topDegree && count === richestCount
      const fit = isRichest ? richest : yield* fitCandidate(request, search, { driftDegree, count, wormHz })
      if (!fit.ok) continue
      const rss = isRichest ? richest.rss : search.totalRss(fit.rss)
      const { parameterCount } = fit
      candidates.push({
        driftDegree,
        harmonicCount: count,
        bic: informationCriterion({
          rss: Math.max(rss, smallestRss),
          sampleCount,
          effectiveCount,
          parameterCount,
        }),
        residualRmsArcsec: Math.sqrt(rss / sampleCount),
        wormHz: fit.frequencies.wormHz,
        rss,
        parameterCount,
      })
      if (driftDegree === topDegree) wormHz = fit.frequencies.wormHz
      // Fewer harmonics can only raise RSS: what they save in parameters bounds what this degree can still reach.
      const { bic } = candidates[candidates.length - 1]
      const smallest = Math.min(...candidates.map((candidate) => candidate.bic))
      if (bic - 2 * (count - 1) * Math.log(effectiveCount) > smallest + BIC_TOLERANCE) break
    }
    wormHz = richest.frequencies.wormHz
  }
  if (candidates.length === 0) return { ok: false, reason: 'singular' }
  candidates.sort((a, b) => a.driftDegree - b.driftDegree || a.harmonicCount - b.harmonicCount)
  const smallest = Math.min(...candidates.map(({ bic }) => bic))
  const chosen = candidates.find(({ bic }) => bic <= smallest + BIC_TOLERANCE) ?? candidates[0]
  const next = candidates.find(
    ({ driftDegree, harmonicCount }) =>
      driftDegree === chosen.driftDegree && harmonicCount === chosen.harmonicCount + 1,
  )
  const test = next
    ? harmonicTest({
        rssWithout: chosen.rss,
        rssWith: next.rss,
        effectiveCount,
        parameterCountWith: next.parameterCount,
      })
    : null
  return {
    ok: true,
    driftDegree: chosen.driftDegree,
    harmonicCount: chosen.harmonicCount,
    wormHz: chosen.wormHz,
    effectiveSampleCount: effectiveCount,
    choice: {
      candidates: candidates.map(({ driftDegree, harmonicCount, bic, residualRmsArcsec }) => ({
        driftDegree,
        harmonicCount,
        bic,
        residualRmsArcsec,
      })),
      isDegreeChosenByEvidence: degrees.length > 1,
      isCountChosenByEvidence: fixedHarmonicCount === null,
      nextHarmonicProbability: test?.probability ?? null,
    },
  }
}

/** The same in one go. */
export function chooseModel(request: ModelChoiceRequest): ChosenModel | Failure {
  return drain(chooseModelInSteps(request))
}

/** Orders 1 … count as a list. */
export function firstOrders(count: number): number[] {
  return Array.from({ length: count }, (_, k) => k + 1)
}

function baseRequest(request: ModelChoiceRequest): Omit<JointFitRequest, 'driftDegree' | 'worm'> {
  const { track, lines, highestFrequencyHz } = request
  return { track, lines, highestFrequencyHz, isPolished: false }
}

/**
 * The fit with everything allowed; where its columns depend on each other, with ever fewer harmonics. In a long record
 * the period is found on block means and then held for one pass over all samples, whose residual is what is wanted.
 */
function* fitRichest(
  request: ModelChoiceRequest,
  driftDegree: number,
  count: number,
): Generator<void, JointFit | Failure> {
  const { track, cadenceSeconds, worm, lines } = request
  const size = lines.length === 0 && worm.isFree ? blockSize(request) : 1
  let fit: JointFit | Failure = { ok: false, reason: 'singular' }
  for (let k = count; k >= 1; k--) {
    const orders = firstOrders(k)
    let { frequencyHz } = worm
    if (size > 1) {
      const blocks = averageBlocks(track, { size, cadenceSeconds })
      const rough = { ...baseRequest(request), track: blocks.track, driftDegree, worm: { ...worm, orders } }
      const found = yield* fitJointlyInSteps(rough)
      if (found.ok) frequencyHz = found.frequencies.wormHz
    }
    const isFree = worm.isFree && size === 1
    fit = yield* fitJointlyInSteps({ ...baseRequest(request), driftDegree, worm: { orders, frequencyHz, isFree } })
    if (fit.ok && worm.isFree && !isFree) return { ...fit, parameterCount: fit.parameterCount + 1 }
    if (fit.ok || request.fixedHarmonicCount !== null) return fit
  }
  return fit
}

/** The highest order whose amplitude is at least 3 standard errors √(2s²F(r, f)/N) in the richest fit. */
function standingOrders(fit: JointFit, cadenceSeconds: number, lagOne: number): number {
  const sampleCount = fit.residual.length
  const variance = fit.rss / (sampleCount - fit.parameterCount)
  let highest = 1
  listOscillations(fit)
    .slice(0, fit.shape.wormOrders.length)
    .forEach(({ column, frequencyHz }, index) => {
      const amplitude = Math.hypot(fit.coefficients[column], fit.coefficients[column + 1])
      const factor = autoregressiveFactor(lagOne, frequencyHz, cadenceSeconds)
      if (amplitude >= 3 * Math.sqrt((2 * variance * factor) / sampleCount)) highest = fit.shape.wormOrders[index]
    })
  return highest
}

/** Samples per block: at most a 60th of a turn, and no more than brings the record down to what is fitted directly. */
function blockSize({ track, cadenceSeconds, worm }: ModelChoiceRequest): number {
  const longest = Math.floor(1 / (worm.frequencyHz * 60 * cadenceSeconds))
  return Math.max(1, Math.min(Math.ceil(track.timeSeconds.length / DIRECT_SAMPLE_COUNT), longest))
}

interface Search {
  track: Track
  lines: ModelChoiceRequest['lines']
  /** RSS on all samples from the RSS on the search's samples. */
  totalRss(rss: number): number
}

/**
 * What candidates are fitted to: the samples themselves, or block means of at most a 60th of a turn, with the scatter
 * inside the blocks taken from the richest fit. Lines are taken off first then, for block means would weaken them.
 */
function prepareSearch(request: ModelChoiceRequest, richest: JointFit): Search {
  const { track, cadenceSeconds, lines } = request
  const sampleCount = track.timeSeconds.length
  const size = blockSize(request)
  if (size < 2) return { track, lines, totalRss: (rss) => rss }
  const withoutLines = subtractLines(track, richest)
  const blocks: BlockAverage = averageBlocks(withoutLines, { size, cadenceSeconds })
  const share = sampleCount / (blocks.track.timeSeconds.length * size)
  const within = scatterWithinBlocks(blocks, richest.residual)
  return { track: blocks.track, lines: [], totalRss: (rss) => share * (size * rss + within) }
}

function subtractLines(track: Track, fit: JointFit): Track {
  const raArcsec = track.raArcsec.slice()
  const first = fit.shape.driftDegree + 1 + 2 * fit.shape.wormOrders.length
  for (let j = first; j < fit.coefficients.length; j++) {
    const column = fit.jacobian[j]
    for (let i = 0; i < raArcsec.length; i++) raArcsec[i] -= fit.coefficients[j] * column[i]
  }
  return { timeSeconds: track.timeSeconds, raArcsec }
}

function* fitCandidate(
  request: ModelChoiceRequest,
  search: Search,
  { driftDegree, count, wormHz }: { driftDegree: number; count: number; wormHz: number },
): Generator<void, JointFit | Failure> {
  const fit = yield* fitJointlyInSteps({
    ...baseRequest(request),
    track: search.track,
    lines: search.lines,
    driftDegree,
    worm: { orders: firstOrders(count), frequencyHz: wormHz, isFree: request.worm.isFree },
  })
  if (!fit.ok) return fit
  // Lines that were taken off before still count as parameters.
  const missing = request.lines.length - search.lines.length
  return missing > 0 ? { ...fit, parameterCount: fit.parameterCount + 3 * missing } : fit
}

import { describe, expect, test } from 'vitest'
import { cleanTrack, type CleanOptions } from '@/lib/analysis/clean'
import { hampelFilter } from '@/lib/analysis/hampel'
import { createRandom } from '@/lib/analysis/random'
import { GAUSSIAN_MAD_FACTOR, median, medianAbsoluteDeviation } from '@/lib/analysis/statistics'
import type { Track } from '@/lib/analysis/types'
import checks from '../reference/checks.json'

const options: CleanOptions = { excludedSpans: [], isStrayPointFilterOn: true }

function cleaned(track: Track, change: Partial<CleanOptions> = {}) {
  const outcome = cleanTrack(track, { ...options, ...change })
  if (!outcome.ok) throw new Error(outcome.reason)
  return outcome
}

/** A worm of 180 teeth in white seeing; time every 2.5 s. */
function wormTrack(count: number, seed = 1): Track {
  const { normal } = createRandom(seed)
  const timeSeconds = Float64Array.from({ length: count }, (_, i) => 2.5 * i)
  return {
    timeSeconds,
    raArcsec: timeSeconds.map((t) => 9 * Math.sin((2 * Math.PI * t) / 478.69) + 0.02 * t + 0.4 * normal()),
  }
}

describe('hampelFilter', () => {
  // Hampel (1974); medians and scales computed window by window in Python.
  test('flags indices 3 and 8 of the worked series (k = 3, n = 3)', () => {
    const result = hampelFilter(Float64Array.from(checks.values['4.hampel_input']), {
      halfWidth: 3,
      threshold: 3,
      smallestScale: 1e-3,
      segmentStarts: [0],
    })
    expect(Array.from(result.isStray)).toEqual(checks.values['4.hampel_flags_k3_n3'])
    checks.values['4.hampel_medians'].forEach((expected, i) => expect(result.medians[i]).toBeCloseTo(expected, 14))
    checks.values['4.hampel_sigmas'].forEach((expected, i) => expect(result.scales[i]).toBeCloseTo(expected, 14))
  })

  test('equals the plain form that sorts every window, over segments and with ties', () => {
    const { normal, uniform } = createRandom(5)
    const values = Float64Array.from({ length: 400 }, () => Math.round(8 * normal()) / 8 + (uniform() < 0.05 ? 6 : 0))
    const segmentStarts = [0, 1, 3, 90, 250]
    const { isStray, medians, scales } = hampelFilter(values, {
      halfWidth: 5,
      threshold: 3,
      smallestScale: 0.05,
      segmentStarts,
    })
    for (let i = 0; i < values.length; i++) {
      const first = segmentStarts.filter((start) => start <= i).at(-1) ?? 0
      const end = segmentStarts.find((start) => start > i) ?? values.length
      const window = values.slice(Math.max(first, i - 5), Math.min(end, i + 6))
      const scale = Math.max(GAUSSIAN_MAD_FACTOR * medianAbsoluteDeviation(window), 0.05)
      expect(medians[i]).toBe(median(window))
      expect(scales[i]).toBeCloseTo(scale, 14)
      expect(isStray[i]).toBe(Math.abs(values[i] - median(window)) > 3 * scale ? 1 : 0)
    }
    expect(isStray.reduce((a, b) => a + b)).toBeGreaterThan(5)
  })

  test('a slope is never flagged, a parabola reaches 0.8993 of its scale at the tip (k = 3)', () => {
    const parabola = Float64Array.from({ length: 41 }, (_, i) => (i - 20) ** 2)
    const { medians, scales } = hampelFilter(parabola, {
      halfWidth: 3,
      threshold: 3,
      smallestScale: 0,
      segmentStarts: [0],
    })
    const ratio = Math.abs(parabola[20] - medians[20]) / scales[20]
    expect(ratio).toBeCloseTo(checks.values['4.hampel_peak_ratio_on_parabola_k3'], 12)
  })
})

describe('cleanTrack', () => {
  test('a clean run keeps every sample and has no gap', () => {
    const result = cleaned(wormTrack(800))
    expect(result.track.timeSeconds.length + (result.leftOut[0]?.count ?? 0)).toBe(800)
    // Gaussian noise passes n = 5 with few exceptions
    expect(result.strays.timeSeconds.length).toBeLessThan(8)
    expect(result.gaps).toEqual([])
    expect(result.medianCadenceSeconds).toBe(2.5)
  })

  test('strays of 15″ are taken out, not replaced; rows and counts say which', () => {
    const track = wormTrack(800)
    const rows = [100, 333, 334, 700]
    for (const row of rows) track.raArcsec[row] += 15
    const result = cleaned(track)
    for (const row of rows) {
      expect(result.keptIndices).not.toContain(row)
      expect(result.strays.timeSeconds).toContain(2.5 * row)
    }
    expect(result.leftOut).toEqual([{ reason: 'stray', count: result.strays.timeSeconds.length }])
    result.keptIndices.forEach((row, i) => expect(result.track.raArcsec[i]).toBe(track.raArcsec[row]))
    expect(cleaned(track, { isStrayPointFilterOn: false }).track.timeSeconds.length).toBe(800)
  })

  test.each([1, 1.5, 3])('values on a coarse grid of %f″: no neighbour of equal values is flagged', (step) => {
    const track = wormTrack(800)
    const coarse = { ...track, raArcsec: track.raArcsec.map((value) => step * Math.round(value / step)) }
    expect(cleaned(coarse).strays.timeSeconds.length).toBe(0)
  })

  test('missing, infinite and repeated samples and excluded spans are counted apart', () => {
    const track = wormTrack(200)
    track.raArcsec[5] = NaN
    track.raArcsec[6] = Infinity
    track.timeSeconds[11] = track.timeSeconds[10]
    const result = cleaned(track, {
      isStrayPointFilterOn: false,
      excludedSpans: [{ startSeconds: 100, endSeconds: 110 }],
    })
    expect(result.leftOut).toEqual([
      { reason: 'missing', count: 1 },
      { reason: 'not-finite', count: 1 },
      { reason: 'repeated-time', count: 1 },
      { reason: 'excluded', count: 5 },
    ])
    expect(result.keptIndices).toContain(10)
    expect(result.keptIndices).not.toContain(11)
    expect(result.gaps).toEqual([])
  })

  test('a pause of more than three cadences is a gap and starts a segment', () => {
    const track = wormTrack(200)
    for (let i = 120; i < 200; i++) track.timeSeconds[i] += 30
    const result = cleaned(track, { isStrayPointFilterOn: false })
    expect(result.gaps).toEqual([{ startSeconds: 297.5, endSeconds: 330 }])
    expect(result.segmentStarts).toEqual([0, 120])
  })

  test('refusals: too few, time that goes back, too many bad samples', () => {
    expect(cleanTrack(wormTrack(19), options)).toEqual({ ok: false, reason: 'few-points', needed: 20, got: 19 })
    expect(cleanTrack(wormTrack(0), options)).toMatchObject({ reason: 'few-points' })
    const back = wormTrack(50)
    back.timeSeconds[30] = 1
    expect(cleanTrack(back, options)).toEqual({ ok: false, reason: 'not-increasing' })
    const bad = wormTrack(50)
    bad.raArcsec.fill(NaN, 0, 11)
    expect(cleanTrack(bad, options)).toEqual({ ok: false, reason: 'not-finite' })
    expect(
      cleanTrack(wormTrack(50), { ...options, excludedSpans: [{ startSeconds: 0, endSeconds: 80 }] }),
    ).toMatchObject({ reason: 'few-points', got: 17 })
  })
})

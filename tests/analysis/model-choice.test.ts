import { describe, expect, test } from 'vitest'
import { drain } from '@/lib/analysis/drain'
import { correctLagOne, effectiveSampleCount, autoregressiveFactor } from '@/lib/analysis/noise-model'
import { chooseModel, harmonicTest, informationCriterion } from '@/lib/analysis/model-choice'
import { prewhiten } from '@/lib/analysis/prewhiten'
import { medianCadence } from '@/lib/analysis/sampling'
import reference from '@/tests/reference/jointfit.json'

const relative = (value: number, expected: number) => Math.abs(value / expected - 1)
const track = { timeSeconds: Float64Array.from(reference.t), raArcsec: Float64Array.from(reference.y) }
const cadenceSeconds = medianCadence(track.timeSeconds)

// Computed with numpy and scipy on the run of tests/reference/jointfit.json: degree 2, K harmonics, one line; p = 7 + 2K.
const LADDER = [
  { harmonicCount: 1, rss: 1295.4197340529918, bic: 432.064345058236 },
  { harmonicCount: 2, rss: 361.17228466715284, bic: -499.99006940921936 },
  { harmonicCount: 3, rss: 167.7482140130759, bic: -1054.3443403753442 },
]
const EFFECTIVE = 740.0893264368118

test.each(LADDER)('BIC on the effective sample count for $harmonicCount harmonics', ({ harmonicCount, rss, bic }) => {
  const parameterCount = 7 + 2 * harmonicCount
  const value = informationCriterion({ rss, sampleCount: 783, effectiveCount: EFFECTIVE, parameterCount })
  expect(relative(value, bic)).toBeLessThan(1e-9)
})

test('F-test of a fourth harmonic: F = 0.0228, p = 0.9774', () => {
  const outcome = harmonicTest({
    rssWithout: 167.7482140130759,
    rssWith: 167.73765662951809,
    effectiveCount: EFFECTIVE,
    parameterCountWith: 15,
  })
  expect(outcome?.f).toBeCloseTo(0.0228, 4)
  expect(outcome?.probability).toBeCloseTo(0.9774, 4)
})

test('three harmonics are chosen, the fourth is not worth it', () => {
  const chosen = chooseModel({
    track,
    cadenceSeconds,
    worm: { frequencyHz: 1 / 479, isFree: true },
    lines: [{ frequencyHz: 1 / 61.3, isFree: true }],
    highestFrequencyHz: 0.19,
    degrees: [0, 1, 2, 3],
    largestHarmonicCount: 12,
    fixedHarmonicCount: null,
  })
  if (!chosen.ok) throw new Error(chosen.reason)
  expect([chosen.driftDegree, chosen.harmonicCount]).toEqual([2, 3])
  expect(chosen.choice.nextHarmonicProbability).toBeCloseTo(0.9774, 3)
  const best = chosen.choice.candidates.find((c) => c.driftDegree === 2 && c.harmonicCount === 3)
  expect(relative(best?.residualRmsArcsec ?? 0, Math.sqrt(167.7482140130759 / 783))).toBeLessThan(1e-6)
})

describe('correlated noise', () => {
  test('lag-one correlation freed of the fit’s pull: r_1 = 0.6, N = 766, p = 9 gives 0.6224543081', () => {
    expect(relative(correctLagOne(0.6, 766, 9), 0.6224543080939947)).toBeLessThan(1e-12)
    expect(correctLagOne(-0.5, 100, 5)).toBe(0)
    expect(correctLagOne(0.99, 100, 5)).toBe(0.985)
    expect(effectiveSampleCount(1000, 0.6)).toBeCloseTo(250, 10)
  })

  test('AR(1) factor at three periods, r = 0.6, cadence 2.5 s', () => {
    // (1 − r²)/(1 − 2r cos 2πfΔ + r²), confirmed against the exact variance of a least-squares amplitude
    expect(autoregressiveFactor(0.6, 1 / 478.69, 2.5)).toBeCloseTo(3.983914545, 8)
    expect(autoregressiveFactor(0.6, 1 / 61.3, 2.5)).toBeCloseTo(3.213133395, 8)
    expect(autoregressiveFactor(0.6, 1 / 10, 2.5)).toBeCloseTo(0.4705882353, 9)
  })
})

test('prewhitening without a worm finds its harmonics and the line, in this order, and nothing else', () => {
  // Computed with numpy: signal-to-noise when found; periods of the last joint fit.
  const outcome = drain(
    prewhiten({
      track,
      cadenceSeconds,
      driftDegree: 2,
      worm: null,
      highestFrequencyHz: 0.19,
      chanceLevel: 1e-3,
    }),
  )
  if (!outcome.ok) throw new Error(outcome.reason)
  expect(outcome.stoppedBy).toBe('nothing-left')
  const periods = [478.89937943966714, 238.99351014561597, 159.37129398847685, 61.297311923068314]
  const ratios = [43.40455714555677, 21.897340689085052, 19.065668579710366, 21.91]
  expect(outcome.lines).toHaveLength(4)
  outcome.lines.forEach((line, i) => {
    expect(relative(1 / line.frequencyHz, periods[i])).toBeLessThan(2e-6)
    expect(relative(line.signalToNoise, ratios[i])).toBeLessThan(1e-3)
    expect(line.falseAlarmProbability).toBeLessThan(1e-3)
    expect(line.isUnresolved).toBe(false)
  })
})

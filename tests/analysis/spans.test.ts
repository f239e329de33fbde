import { describe, expect, test } from 'vitest'
import { expectedRangeFactor, spanShares, spanSplit } from '@/lib/analysis/spans'
import checks from '../reference/checks.json'
import published from '../reference/published.json'
import { referenceRun } from '../support/reference-run'

// Tippett (1925), Biometrika 17, 364, by another quadrature.
test.each([
  [2, checks.values['12.range_2']],
  [5, checks.values['12.range_5']],
  [10, checks.values['12.range_10']],
  [100, checks.values['12.range_100']],
  [783, checks.values['12.range_783']],
  [1000, checks.values['12.range_1000']],
  [10000, checks.values['12.range_10000']],
])('expectedRangeFactor(%i) is %f', (count, expected) => {
  expect(Math.abs(expectedRangeFactor(count) / expected - 1)).toBeLessThan(1e-10)
})

// d₂ as printed to three decimals with control charts.
test.each(Object.entries(published.d2_as_used_in_control_charts))('d₂(%s) rounds to %f', (count, printed) => {
  expect(Math.abs(expectedRangeFactor(Number(count)) - printed)).toBeLessThan(0.0005001)
})

test('one value has no range; a million and a fractional number have one', () => {
  expect([expectedRangeFactor(1), expectedRangeFactor(0)]).toEqual([0, 0])
  expect(expectedRangeFactor(1e6)).toBeGreaterThan(expectedRangeFactor(1e5))
  const between = expectedRangeFactor(4.5)
  expect(between).toBeGreaterThan(expectedRangeFactor(4))
  expect(between).toBeLessThan(expectedRangeFactor(5))
})

describe('spanSplit of the reference run', () => {
  const run = referenceRun()
  const spans = spanSplit({ raw: run.raArcsec, drift: run.drift, worm: run.wormArcsec, lines: run.lineArcsec })

  test('spans one after the other, and the parts of their own', () => {
    const expected = checks.values['12.ledger_spans']
    expect(spans.rawArcsec).toBeCloseTo(expected.raw, 10)
    expect(spans.afterDriftArcsec).toBeCloseTo(expected['after drift'], 9)
    expect(spans.afterWormArcsec).toBeCloseTo(expected['after worm'], 9)
    expect(spans.afterLinesArcsec).toBeCloseTo(expected['after lines'], 9)
    expect(spans.rawWithoutWormArcsec).toBeCloseTo(checks.values['12.raw_without_worm'], 9)
    expect(spans.driftArcsec).toBeCloseTo(checks.values['12.drift_own_span'], 9)
    expect(spans.wormArcsec).toBeCloseTo(checks.values['12.worm_own_span'], 9)
  })

  test('shares add up to the raw span', () => {
    const shares = spanShares(spans)
    const expected = checks.values['12.ledger_shares']
    expect(shares.drift).toBeCloseTo(expected.drift, 9)
    expect(shares.worm).toBeCloseTo(expected.worm, 9)
    expect(shares.lines).toBeCloseTo(expected.lines, 9)
    expect(shares.drift + shares.worm + shares.lines + shares.residual).toBeCloseTo(spans.rawArcsec, 12)
  })

  test('a correction of 90 % hardly lowers the raw span: 54.60″ → 41.51″', () => {
    const after = spanSplit({
      raw: run.raArcsec.map((y, i) => y - 0.9 * run.wormArcsec[i]),
      drift: run.drift,
      worm: run.wormArcsec.map((w) => 0.1 * w),
      lines: run.lineArcsec,
    })
    const expected = checks.values['12.after_90pct_correction']
    expect(after.rawArcsec).toBeCloseTo(expected.raw, 9)
    expect(after.afterDriftArcsec).toBeCloseTo(expected.after_drift, 9)
  })

  test('expected residual range 2.9596640″', () => {
    const expected = checks.values['12.expected_residual_span']
    expect(run.sigmaArcsec * expectedRangeFactor(783)).toBeCloseTo(expected, 9)
  })
})

import { describe, expect, test } from 'vitest'
import { samplePicture } from '@/components/landing/sample-picture'
import { landingDial } from '@/lib/figures/landing-dial'

const degrees = Float64Array.from({ length: 180 }, (_, i) => 2 * i)
const radiansOf = (value: number) => (value * Math.PI) / 180

describe('landingDial', () => {
  test('a curve of zero is the zero circle', () => {
    const curveArcsec = new Float64Array(180)
    const turns = [{ turnNumber: 1, angleDegrees: Float64Array.of(0), arcsec: Float64Array.of(5) }]
    const { curvePath, centre, zeroRadius } = landingDial({
      angleDegrees: degrees,
      curveArcsec,
      turns,
      tableArcsec: null,
    })
    for (const { x, y } of pointsOf(curvePath)) {
      expect(Math.abs(Math.hypot(x - centre, y - centre) - zeroRadius)).toBeLessThan(0.1)
    }
  })

  test('starts on top, runs clockwise, has ahead outside and stays within the rim', () => {
    // Furthest ahead at 90°: the rightmost point is further out than the leftmost one.
    const curveArcsec = degrees.map((angle) => 8 * Math.sin(radiansOf(angle)))
    const dial = landingDial({ angleDegrees: degrees, curveArcsec, turns: [], tableArcsec: null })
    const points = pointsOf(dial.curvePath)
    expect(points[0].x).toBeCloseTo(dial.centre, 1)
    expect(points[0].y).toBeCloseTo(dial.centre - dial.zeroRadius, 1)
    expect(points[45].x).toBeGreaterThan(dial.centre + dial.zeroRadius)
    expect(points[135].x).toBeGreaterThan(dial.centre - dial.zeroRadius)
    for (const { x, y } of points) expect(Math.hypot(x - dial.centre, y - dial.centre)).toBeLessThan(dial.rimRadius)
    expect(dial.curvePath.endsWith('Z')).toBe(true)
  })

  test('a turn breaks at a missing value and where it passes from 360° to 0°', () => {
    const angleDegrees = Float64Array.of(350, 355, 1, 5, 9)
    const arcsec = Float64Array.of(1, 1, 1, NaN, 1)
    const turns = [{ turnNumber: 1, angleDegrees, arcsec }]
    const { turnPaths } = landingDial({ angleDegrees: degrees, curveArcsec: degrees, turns, tableArcsec: null })
    expect(turnPaths[0].match(/M/g)).toHaveLength(3)
  })

  test('names its circles with signs, at the radius of the value', () => {
    const curveArcsec = degrees.map((angle) => 8 * Math.sin(radiansOf(angle)))
    const { rings, zeroRadius } = landingDial({ angleDegrees: degrees, curveArcsec, turns: [], tableArcsec: null })
    expect(rings.map(({ label }) => label)).toEqual(['−5', '+5'])
    expect(rings[1].at - zeroRadius).toBeCloseTo(zeroRadius - rings[0].at, 9)
  })
})

// The whole analysis runs once: a second or two, more on a busy machine.
describe('the sample run on the landing page', { timeout: 60_000 }, () => {
  test('is drawn whole: six turns, a cloud, three stray points, worm and belt and motor', async () => {
    const { track, stems, dial, findings, narrowTrack, narrowStems } = await samplePicture()
    expect(track.turns.map(({ label }) => label)).toEqual(['turn 1', 'turn 2', 'turn 3', 'turn 4', 'turn 5', 'turn 6'])
    expect(track.gaps).toHaveLength(1)
    expect(track.strayPoints).toHaveLength(3)
    // A path begins anew after the cloud; every point lies within the axes.
    expect(track.recordedPath.match(/M/g)!.length).toBeGreaterThan(1)
    for (const path of [track.recordedPath, track.fittedPath, track.driftPath]) {
      for (const { x, y } of pointsOf(path)) {
        expect(x).toBeGreaterThanOrEqual(track.plot.left - 0.1)
        expect(x).toBeLessThanOrEqual(track.plot.right + 0.1)
        expect(y).toBeGreaterThanOrEqual(track.plot.top)
        expect(y).toBeLessThanOrEqual(track.plot.bottom)
      }
    }
    expect(stems.stems.filter(({ kind }) => kind === 'worm')).toHaveLength(4)
    expect(stems.stems.filter(({ kind }) => kind === 'line')).toHaveLength(2)
    // The record ends a few seconds into the seventh turn.
    expect(dial!.turnPaths).toHaveLength(7)
    expect(JSON.stringify([track, stems, dial])).not.toMatch(/null|NaN/)
    // A phone gets the same swings and turns; the numbers of the orders keep their distance.
    expect(narrowTrack.turns).toHaveLength(6)
    expect(narrowStems.stems).toHaveLength(6)
    expect(narrowStems.orderTicks.length).toBeLessThan(stems.orderTicks.length)
    for (const { orderTicks } of [stems, narrowStems]) {
      orderTicks.slice(1).forEach(({ at }, i) => expect(at - orderTicks[i].at).toBeGreaterThanOrEqual(17))
    }
    // The simulator's truth: 15.9″ of peak to peak, 0.35″ a minute of drift over 57 minutes.
    expect(findings.track).toMatch(
      /^In 57 minutes the worm swings the axis by 1[56]\.\d″ each turn; drift adds 0\.3[45]″ a minute\.$/,
    )
    expect(findings.stems).toContain('four of its harmonics and two swings of other parts')
  })
})

function pointsOf(path: string) {
  return [...path.matchAll(/[ML](-?[\d.]+) (-?[\d.]+)/g)].map(([, x, y]) => ({ x: Number(x), y: Number(y) }))
}

import { describe, expect, test } from 'vitest'
import { DAY_COLORS, withAlpha } from '@/lib/figures/chart-colors'
import { dialPath, dialPoint, dialRadius, dialScale } from '@/lib/figures/dial'
import { CHI_SQUARE_95, errorEllipse } from '@/lib/figures/error-ellipse'
import type { Figure, FigureFrame } from '@/lib/figures/figure'
import { figureCsv } from '@/lib/figures/figure-table'
import { placeLabels } from '@/lib/figures/place-labels'
import { spectrumFigure } from '@/lib/figures/spectrum-figure'
import { tablePicture } from '@/lib/figures/table-picture'
import { decadeTicks, minuteTicks, niceStep, niceTicks, orderTicks, periodTicks } from '@/lib/figures/ticks'
import { trackFigure } from '@/lib/figures/track-figure'
import { slipFigure, turnFigure } from '@/lib/figures/turn-figure'
import { runAngleDegrees, tableAngleDegrees } from '@/lib/figures/worm-angle'
import { exampleResult, exampleViews } from '../support/example-outcome'

const result = exampleResult()
const views = exampleViews()
const frame: FigureFrame = { colors: DAY_COLORS, widthPx: 870, zoom: null }

describe('ticks', () => {
  test.each([
    [10, 5, 2],
    [11, 5, 5],
    [0.3, 4, 0.1],
    [33, 5, 10],
    [0, 5, 1],
  ])('niceStep(%s, %s) = %s', (span, most, step) => {
    expect(niceStep(span, most)).toBeCloseTo(step, 12)
  })

  test('signed ticks have a true minus, a plus, and a bare zero', () => {
    expect(niceTicks([-12, 34], 5, { isSigned: true }).labels).toEqual(['−10', '0', '+10', '+20', '+30'])
    expect(niceTicks([-0.25, 0.2], 5, { isSigned: true }).labels).toEqual(['−0.2', '−0.1', '0.0', '+0.1', '+0.2'])
  })

  test('minutes fall on steps that people count in', () => {
    expect(minuteTicks([0, 57], 8).values).toEqual([0, 10, 20, 30, 40, 50])
    expect(minuteTicks([0, 57], 5).values).toEqual([0, 15, 30, 45])
    expect(minuteTicks([0, 2], 8).values).toHaveLength(5)
  })

  test('amplitudes are marked 1-3-10', () => {
    expect(decadeTicks([0.01, 12]).labels).toEqual(['0.01', '0.03', '0.1', '0.3', '1', '3', '10'])
  })

  test('the worm period is marked before any round one, and none stand too close', () => {
    const ticks = periodTicks([10, 2000], { firstSeconds: 567.28, widthPx: 800, spacingPx: 50 })
    expect(ticks.labels).toContain('567 s')
    const pixels = ticks.values.map((value) => (Math.log10(value) / Math.log10(200)) * 800)
    pixels.slice(1).forEach((pixel, i) => expect(pixels[i] - pixel).toBeGreaterThanOrEqual(50 - 1e-9))
  })

  test('the ruler counts orders from 1 and labels where there is room', () => {
    const { labelled, plain } = orderTicks([0.3, 40], { widthPx: 800, spacingPx: 26 })
    expect(labelled.slice(0, 4)).toEqual([1, 2, 3, 4])
    expect(plain).toContain(7)
    expect([...labelled, ...plain].every((order) => order >= 1 && order <= 40)).toBe(true)
  })
})

describe('labels beside stems', () => {
  test('no label covers another or a point', () => {
    const points = [0, 1, 2, 3, 4].map((i) => ({ xPx: 300 + 12 * i, yPx: 120 + 8 * i, text: `worm ×${i}` }))
    const placed = placeLabels(points, { widthPx: 800 })
    expect(placed).toHaveLength(5)
    expect(new Set(placed.map(({ anchor, liftPx }) => `${anchor} ${liftPx}`)).size).toBeGreaterThan(1)
  })

  test('keeps out of blocked places and inside the picture', () => {
    const [label] = placeLabels([{ xPx: 40, yPx: 30, text: 'worm' }], {
      widthPx: 800,
      blocked: [{ left: 0, right: 120, top: 0, bottom: 24 }],
    })
    expect(label).toMatchObject({ anchor: 'right', liftPx: -9 })
    expect(placeLabels([{ xPx: 3, yPx: 60, text: 'a long name' }], { widthPx: 800 })[0].anchor).toBe('right')
  })

  test('is not struck through by a stem where another place is free, and stands across one where none is', () => {
    const points = [
      { xPx: 96, yPx: 20, text: 'worm' },
      { xPx: 108, yPx: 90, text: 'belt' },
    ]
    expect(placeLabels(points, { widthPx: 800 })[1].anchor).toBe('over')
    expect(placeLabels(points, { widthPx: 800, floorPx: 200 })[1].anchor).toBe('right')
    expect(placeLabels(points, { widthPx: 130, floorPx: 200 })[1].anchor).toBe('over')
  })
})

describe('error ellipse', () => {
  test('95 in 100 lie within χ² = 5.991 (two degrees of freedom; any published χ² table)', () => {
    expect(CHI_SQUARE_95).toBeCloseTo(5.991, 3)
    const { major, minor, angleDegrees } = errorEllipse([4, 0, 1])
    expect([major, minor, angleDegrees]).toEqual([2 * Math.sqrt(CHI_SQUARE_95), Math.sqrt(CHI_SQUARE_95), 0])
  })

  test('a correlation turns it: [2, 1, 2] has variances 3 and 1 along ±45°', () => {
    const { major, minor, angleDegrees } = errorEllipse([2, 1, 2], 1)
    expect(major).toBeCloseTo(Math.sqrt(3), 12)
    expect(minor).toBeCloseTo(1, 12)
    expect(angleDegrees).toBeCloseTo(45, 12)
  })
})

describe('dial', () => {
  test('0° is up, angles run clockwise, outward is ahead', () => {
    expect(dialPoint(0, 1)).toEqual({ x: 0, y: -1 })
    expect(dialPoint(90, 1).x).toBeCloseTo(1, 12)
    const scale = dialScale([-8, 8])
    expect(dialRadius(8, scale)).toBeGreaterThan(dialRadius(0, scale))
    expect(dialRadius(scale.outerArcsec, scale)).toBe(1)
    expect(scale.ringsArcsec).toContain(0)
  })

  test('a missing value breaks the line', () => {
    const path = dialPath([0, 90, 180, 270], [1, NaN, 1, 1], dialScale([-1, 1]), 100)
    expect(path.match(/M/g)).toHaveLength(2)
    expect(path).not.toContain('NaN')
  })
})

test('CSV quotes what it must and leaves missing cells empty (RFC 4180)', () => {
  const table = {
    columns: [
      { name: 'time, s', values: [1, 2, 3] },
      { name: 'source', values: ['the "belt"', 'worm'] },
      { name: 'x', values: Float64Array.of(0.1, NaN, -2) },
    ],
  }
  expect(figureCsv(table)).toBe('"time, s",source,x\r\n1,"the ""belt""",0.1\r\n2,worm,\r\n3,,-2\r\n')
})

test('a colour with an opacity', () => {
  expect(withAlpha('#d3dad0', 0.5)).toBe('rgba(211,218,208,0.5)')
  expect(withAlpha('red', 0.5)).toBe('red')
})

describe('angles of a table', () => {
  const table = {
    ...result.table!,
    originTimeSeconds: 100,
    settings: { ...result.table!.settings, angleDirection: 'decreasing' as const, offsetDegrees: 30 },
  }

  test('there and back', () => {
    for (const angle of [0, 12.5, 180, 359]) {
      expect(
        runAngleDegrees(tableAngleDegrees(angle, { table, run: result.run }), { table, run: result.run }),
      ).toBeCloseTo(angle, 9)
    }
  })

  test('at its zero the table lists its offset', () => {
    const zero = (360 * 100) / result.table!.wormPeriodSeconds
    expect(tableAngleDegrees(zero, { table, run: result.run })).toBeCloseTo(30, 9)
  })
})

describe('table picture', () => {
  test('the bars are the opposite of the error that is drawn beside them', () => {
    const { bars, curve } = tablePicture(result.table!, result.worm!, result.run)
    bars.forEach(({ angleDegrees, value }) => {
      const around = (curve[Math.floor(angleDegrees)].value + curve[Math.ceil(angleDegrees)].value) / 2
      // Half-way between two points of the curve its bend of at most A(0.5°)²/2 ≈ 0.0003″ is left.
      expect(value).toBeCloseTo(-around, 2)
    })
  })

  test('rates: 9″ once in 478.69 s is at most 0.118132″/s (2πA/P)', () => {
    const fundamental = { ...result.worm!.harmonics[0], cosArcsec: 9, sinArcsec: 0 }
    const table = {
      ...result.table!,
      wormPeriodSeconds: 478.69,
      settings: { ...result.table!.settings, quantity: 'rate' as const, unit: 'arcsec-per-second' as const },
    }
    const { curve } = tablePicture(table, { ...result.worm!, harmonics: [fundamental] }, result.run)
    expect(Math.max(...curve.map(({ value }) => value))).toBeCloseTo((2 * Math.PI * 9) / 478.69, 9)
    expect(curve[90].value).toBeLessThan(0)
  })
})

const track = (over: Partial<FigureFrame> = {}) =>
  trackFigure({
    result,
    track: views.track,
    excludedSpans: [{ startSeconds: 600, endSeconds: 660 }],
    notes: [{ number: 1, timeSeconds: 1490 }],
    senseMark: ' (sense assumed)',
    frame: { ...frame, ...over },
  })
const spectrum = (over: Partial<FigureFrame> = {}, isBeforeShown = true) =>
  spectrumFigure({
    result,
    spectrum: views.spectrum,
    chanceLevel: 0.001,
    isBeforeShown,
    notes: [{ number: 2, periodSeconds: 207.6 }],
    frame: { ...frame, ...over },
  })
const turn = (over: Partial<FigureFrame> = {}) =>
  turnFigure({
    turn: views.turn!,
    senseMark: '',
    notes: [{ number: 3, angleDegrees: 214 }],
    frame: { ...frame, ...over },
  })
const slip = (over: Partial<FigureFrame> = {}) =>
  slipFigure({
    slip: views.slip!,
    slipForTenPercentDegrees: 5.73,
    slipForNoHelpDegrees: 60,
    frame: { ...frame, ...over },
  })

describe.each([
  ['track', track],
  ['spectrum', spectrum],
  ['turn', turn],
  ['slip', slip],
] as [string, (over?: Partial<FigureFrame>) => Figure][])('the %s figure', (_, make) => {
  test('uses no WebGL', () => {
    expect(new Set(make().data.map(({ type }) => type))).toEqual(new Set(['scatter']))
  })

  test('takes every colour from the theme', () => {
    const night = Object.fromEntries(Object.keys(DAY_COLORS).map((name) => [name, '#a00000'])) as typeof DAY_COLORS
    const text = JSON.stringify({ ...make({ colors: night }), table: null })
    const colors = text.match(/#[0-9a-f]{3,8}\b|rgba?\([^)]*\)/gi) ?? []
    expect(colors.length).toBeGreaterThan(5)
    for (const color of colors) expect(color).toMatch(/^(#a00000|rgba\(160,0,0,[\d.]+\)|rgba\(0,0,0,0\))$/)
  })

  test('has no second hover box, which Plotly sets on white', () => {
    const { data, layout } = make()
    if (layout.hovermode === 'x unified') return
    for (const { hovertemplate, hoverinfo } of data)
      expect(hoverinfo === 'skip' || String(hovertemplate).endsWith('<extra></extra>')).toBe(true)
  })

  test('fits a phone and a zoom', () => {
    expect(make({ widthPx: 340 }).layout.width).toBe(340)
    const zoom: [number, number] = make().x.isLog ? [600, 100] : [5, 15]
    expect(make({ zoom }).x.range).toEqual(zoom)
  })

  test('names every column of its numbers', () => {
    expect(make().table.columns.every(({ name }) => /^[a-z0-9_]+$/.test(name))).toBe(true)
  })
})

describe('track', () => {
  test('recorded is thin, fit thick, drift dashed, stray points are crosses', () => {
    const named = Object.fromEntries(track().data.map((trace) => [trace.name, trace]))
    expect(named.recorded.line).toMatchObject({ color: DAY_COLORS.steel, width: 1 })
    expect(Number(named.fitted.line?.width)).toBeGreaterThan(2)
    expect(named.drift.line?.dash).toBe('dash')
    expect(named['left out'].marker?.symbol).toBe('x-thin')
  })

  test('a gap and an excluded span are shaded, the note is marked, the sense is told', () => {
    const { layout } = track()
    const shades = layout.shapes?.filter(({ type }) => type === 'rect').map(({ x0, x1 }) => [x0, x1])
    expect(shades).toEqual([
      [1490 / 60, 1546 / 60],
      [10, 11],
    ])
    const texts = layout.annotations?.map(({ text }) => text)
    expect(texts).toContain('1')
    expect(texts).toContain('turn 6')
    expect(texts).toContain('arcsec on the axis, ahead is up (sense assumed)')
  })

  test('a stray point far away does not flatten the picture and keeps its value', () => {
    const far = { ...views.track, strayArcsec: Float64Array.of(400), strayTimeSeconds: Float64Array.of(500) }
    const { layout, data } = trackFigure({ result, track: far, excludedSpans: [], notes: [], senseMark: '', frame })
    expect(Number(layout.yaxis?.range?.[1])).toBeLessThan(60)
    expect(data.at(-1)?.customdata).toEqual(Float64Array.of(400))
  })
})

describe('spectrum', () => {
  test('is log-log with the longest period at the left, none longer than the run', () => {
    const { layout, x } = spectrum()
    expect([layout.xaxis?.type, layout.yaxis?.type]).toEqual(['log', 'log'])
    expect(x.range[0]).toBeGreaterThan(x.range[1])
    expect(x.range[0]).toBeLessThanOrEqual(result.run.durationSeconds)
  })

  test('the curve before can be switched off', () => {
    const names = (figure: Figure) => figure.data.map(({ name }) => name)
    expect(names(spectrum())).toContain('before')
    expect(names(spectrum({}, false))).not.toContain('before')
  })

  test('lines are labelled with their source, and hover tells the order first', () => {
    const { layout, data } = spectrum()
    const texts = layout.annotations?.map(({ text }) => text)
    for (const name of ['worm', 'worm ×2', 'belt', 'motor pulley']) expect(texts).toContain(name)
    const dots = data.find(({ mode, marker }) => mode === 'markers' && marker?.symbol === 'circle')
    expect(String((dots?.text as string[])[0])).toMatch(/^order 1<br>567\.3\u202fs<br>7\.350″/)
  })

  test('without a worm there is no ruler and no order', () => {
    const bare = { ...result, worm: null, lines: [] }
    const figure = spectrumFigure({
      result: bare,
      spectrum: views.spectrum,
      chanceLevel: 0.001,
      isBeforeShown: true,
      notes: [],
      frame,
    })
    expect(figure.layout.annotations?.map(({ text }) => text)).not.toContain('order')
    expect(figure.table.columns.map(({ name }) => name)).not.toContain('order')
  })
})

describe.each([
  [
    'track',
    (isSettled: boolean) =>
      trackFigure({
        result,
        track: views.track,
        excludedSpans: [],
        notes: [{ number: 47, timeSeconds: 1490, isSettled }],
        senseMark: '',
        frame,
      }),
    1490 / 60,
  ],
  [
    'spectrum',
    (isSettled: boolean) =>
      spectrumFigure({
        result,
        spectrum: views.spectrum,
        chanceLevel: 0.001,
        isBeforeShown: true,
        notes: [{ number: 47, periodSeconds: 207.6, isSettled }],
        frame,
      }),
    207.6,
  ],
  [
    'turn',
    (isSettled: boolean) =>
      turnFigure({ turn: views.turn!, senseMark: '', notes: [{ number: 47, angleDegrees: 214, isSettled }], frame }),
    214,
  ],
] as const)('a note on the %s figure', (_, make, place) => {
  const partsOf = (isSettled: boolean) => {
    const { layout } = make(isSettled)
    return {
      lines: layout.shapes?.filter(({ type, x0 }) => type === 'line' && x0 === place) ?? [],
      boxes: layout.shapes?.filter(({ xanchor }) => xanchor === place) ?? [],
      numbers: layout.annotations?.filter(({ text }) => text === '47') ?? [],
    }
  }

  test('while open has a solid line and a filled box', () => {
    const { lines, boxes, numbers } = partsOf(false)
    expect(lines.map(({ line }) => line?.dash)).toEqual(['solid'])
    expect(boxes).toEqual([])
    expect(numbers).toMatchObject([{ bgcolor: DAY_COLORS.card, bordercolor: DAY_COLORS.plum, borderwidth: 1.5 }])
  })

  test('once settled has a dashed line and a hollow, dotted box about its number', () => {
    const { lines, boxes, numbers } = partsOf(true)
    expect(lines.map(({ line }) => line?.dash)).toEqual(['dash'])
    expect(boxes).toMatchObject([{ type: 'rect', x0: -11, x1: 11, line: { dash: 'dot', color: DAY_COLORS.plum } }])
    expect(boxes[0].fillcolor).toBeUndefined()
    expect(numbers).toHaveLength(1)
    expect(numbers[0].bordercolor).toBeUndefined()
  })
})

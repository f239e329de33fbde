import { describe, expect, test } from 'vitest'
import { displayOf, PLAIN_DISPLAY, type Display } from '@/lib/display-units'
import { DAY_COLORS } from '@/lib/figures/chart-colors'
import type { Figure, FigureFrame } from '@/lib/figures/figure'
import { historyMarks } from '@/lib/figures/history-marks'
import { spectrumFigure } from '@/lib/figures/spectrum-figure'
import { stemsOf } from '@/lib/figures/spectrum-stems'
import { trackFigure } from '@/lib/figures/track-figure'
import { turnFigure } from '@/lib/figures/turn-figure'
import { exampleRecipe, exampleResult, exampleViews } from '../support/example-outcome'

const result = exampleResult()
const views = exampleViews()
const { conversion } = exampleRecipe()
const frame: FigureFrame = { colors: DAY_COLORS, widthPx: 870, zoom: null }
const peak = displayOf({ swingMeasure: 'peak-to-peak', displacementUnit: 'arcsec' }, conversion)
const px = displayOf({ swingMeasure: 'amplitude', displacementUnit: 'px' }, conversion)
const both = displayOf({ swingMeasure: 'peak-to-peak', displacementUnit: 'px' }, conversion)
/** 1.55″ / cos 8.9°. */
const PIXEL_ARCSEC = 1.5689

function spectrum(display?: Display): Figure {
  const { spectrum: curves } = views
  return spectrumFigure({
    result,
    spectrum: curves,
    chanceLevel: 0.001,
    isBeforeShown: true,
    notes: [],
    display,
    frame,
  })
}

function track(display?: Display): Figure {
  return trackFigure({ result, track: views.track, excludedSpans: [], notes: [], senseMark: '', display, frame })
}

function turn(display?: Display): Figure {
  if (!views.turn) throw new Error('The example has turns')
  return turnFigure({ turn: views.turn, senseMark: '', notes: [], display, frame })
}

const texts = ({ layout }: Figure) => (layout.annotations ?? []).map(({ text }) => text)
const hovers = ({ data }: Figure) => data.flatMap(({ hovertemplate }) => hovertemplate ?? []).join('\n')
const column = ({ table }: Figure, name: string) => {
  const found = table.columns.find((each) => each.name === name)
  if (!found) throw new Error(`There is no column ${name} among ${table.columns.map((each) => each.name).join(', ')}`)
  return found.values
}

test.each([
  ['spectrum', spectrum],
  ['track', track],
  ['turn', turn],
])('the plain display leaves the %s as it is', (_, make) => {
  expect(make(PLAIN_DISPLAY)).toEqual(make())
})

describe('the spectrum', () => {
  test.each([
    [PLAIN_DISPLAY, 'arcsec amplitude', '″', 1, 'line_amplitude_arcsec', 'chance_arcsec'],
    [peak, 'arcsec peak-to-peak', '″', 2, 'line_peak_to_peak_arcsec', 'chance_arcsec_peak_to_peak'],
    [px, 'px amplitude', '\u202fpx', 1 / PIXEL_ARCSEC, 'line_amplitude_px', 'chance_px'],
    [both, 'px peak-to-peak', '\u202fpx', 2 / PIXEL_ARCSEC, 'line_peak_to_peak_px', 'chance_px_peak_to_peak'],
  ])('axis, hover, curves, stems and CSV go together: %#', (display, title, unit, factor, lines, chance) => {
    const figure = spectrum(display)
    expect(texts(figure)).toContain(title)
    expect(hovers(figure)).toContain(`%{y:.3~r}${unit} chance level`)
    expect(column(figure, lines)[0]).toBeCloseTo(7.35 * factor, 3)
    expect(column(figure, chance)[0]).toBeCloseTo(views.spectrum.chanceArcsec[0] * factor, 4)
    const stems = stemsOf(result, display)
    expect(stems[0].hover).toContain(`${(7.35 * factor).toFixed(3)}${unit}`)
    const drawn = figure.data.flatMap(({ mode, y }) => (mode === 'markers' ? [...(y as number[])] : []))
    expect(Math.max(...drawn)).toBeCloseTo(7.35 * factor, 3)
    const [low, high] = figure.layout.yaxis?.range as [number, number]
    for (const size of drawn) expect(Math.log10(size)).toBeLessThan(high)
    expect(low).toBeLessThan(Math.log10(Math.min(...drawn)))
  })
})

describe.each([
  ['the track', track, 'arcsec on the axis, ahead is up', 'px on the axis, ahead is up', 'recorded'],
  ['the turn', turn, 'arcsec, ahead is up', 'px, ahead is up', 'fitted'],
])('%s', (_, make, plainTitle, pixelTitle, name) => {
  test('goes by the unit, and never by the measure of a swing', () => {
    const [plain, pixels] = [make(), make(px)]
    expect(make(peak)).toEqual(plain)
    expect(make(both)).toEqual(pixels)
    expect(texts(plain)).toContain(plainTitle)
    expect(texts(pixels)).toContain(pixelTitle)
    expect(hovers(plain)).toContain('%{y:+.2f}″')
    expect(hovers(pixels)).toContain('%{y:+.2f}\u202fpx')
    expect(hovers(pixels)).not.toContain('″')
    const [first] = Array.from(column(plain, `${name}_arcsec`))
      .map(Number)
      .filter(Number.isFinite)
    const [shown] = Array.from(column(pixels, `${name}_px`))
      .map(Number)
      .filter(Number.isFinite)
    expect(shown).toBeCloseTo(first / PIXEL_ARCSEC, 3)
    const span = ({ layout }: Figure) => Number(layout.yaxis?.range?.[1]) - Number(layout.yaxis?.range?.[0])
    expect(span(pixels)).toBeCloseTo(span(plain) / PIXEL_ARCSEC, 2)
  })
})

test('in the history only the fundamental doubles, and stays within the picture', () => {
  const noErrors = { wormAmplitudeStderrArcsec: null, peakToPeakStderrArcsec: null }
  const history = [
    { at: '2026-09-01T00:00:00Z', wormAmplitudeArcsec: 8, peakToPeakArcsec: 15, ...noErrors },
    { at: '2026-10-01T00:00:00Z', wormAmplitudeArcsec: 4, peakToPeakArcsec: 10, ...noErrors },
  ]
  const heights = (display?: Display) => {
    const { points, ticks } = historyMarks(history, display)
    const perTop = (ticks[1].value - ticks[0].value) / (ticks[0].top - ticks[1].top)
    return points.map(({ swing, peakToPeak }) => [(1 - swing.top) * perTop, (1 - peakToPeak.top) * perTop])
  }
  const flat = (rows: number[][]) => rows.flat().map((value) => Number(value.toFixed(6)))
  expect(flat(heights())).toEqual([8, 15, 4, 10])
  expect(flat(heights(peak))).toEqual([16, 15, 8, 10])
  expect(historyMarks(history, peak).points.every(({ swing }) => swing.top >= 0)).toBe(true)
})

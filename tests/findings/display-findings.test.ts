import { describe, expect, test } from 'vitest'
import { displayOf, PLAIN_DISPLAY, type Display } from '@/lib/display-units'
import { advice } from '@/lib/findings/advice'
import { findingText } from '@/lib/findings/finding'
import { harmonicsFinding } from '@/lib/findings/harmonics-finding'
import { keyFigures } from '@/lib/findings/key-figures'
import { overviewFinding } from '@/lib/findings/overview-finding'
import { spansFinding } from '@/lib/findings/spans-finding'
import { titleFinding } from '@/lib/findings/title-finding'
import { exampleRecipe, exampleResult } from '../support/example-outcome'

const recipe = exampleRecipe()
const result = exampleResult()
const NARROW = '\u202f'

const displays: Record<string, Display> = {
  'amplitude, ″': PLAIN_DISPLAY,
  'peak-to-peak, ″': displayOf({ swingMeasure: 'peak-to-peak', displacementUnit: 'arcsec' }, recipe.conversion),
  'amplitude, px': displayOf({ swingMeasure: 'amplitude', displacementUnit: 'px' }, recipe.conversion),
  'peak-to-peak, px': displayOf({ swingMeasure: 'peak-to-peak', displacementUnit: 'px' }, recipe.conversion),
}

/** Worked by hand: a pixel is 1.55″ / cos 8.9° = 1.56889″ of the axis. */
const expected = {
  'amplitude, ″': {
    fundamental: '7.350 ± 0.042″',
    whole: ['16.02', '0.13', '″'],
    swing: '16.0″',
    left: '0.50',
    raw: ['22.5″', '19.9″'],
  },
  'peak-to-peak, ″': {
    fundamental: '14.700 ± 0.084″ from end to end',
    whole: ['16.02', '0.13', '″'],
    swing: '16.0″',
    left: '0.50',
    raw: ['22.5″', '19.9″'],
  },
  'amplitude, px': {
    fundamental: `4.685 ± 0.027${NARROW}px`,
    whole: ['10.211', '0.083', 'px'],
    swing: `10.2${NARROW}px`,
    left: '0.32',
    raw: [`14.3${NARROW}px`, `12.7${NARROW}px`],
  },
  'peak-to-peak, px': {
    fundamental: `9.370 ± 0.054${NARROW}px from end to end`,
    whole: ['10.211', '0.083', 'px'],
    swing: `10.2${NARROW}px`,
    left: '0.32',
    raw: [`14.3${NARROW}px`, `12.7${NARROW}px`],
  },
}

describe.each(Object.entries(expected))('shown as %s', (name, figures) => {
  const display = displays[name]

  test('the title tells the peak-to-peak of the whole worm, which is never doubled', () => {
    expect(findingText(titleFinding(result, recipe, display))).toBe(
      `The worm swings the axis ${figures.swing} each turn, and repeats well enough to correct`,
    )
  })

  test('the fundamental and its standard error go by the measure', () => {
    expect(findingText(harmonicsFinding(result, display))).toContain(
      `The worm’s fundamental, ${figures.fundamental}, carries 94${NARROW}%`,
    )
  })

  test('key figures: peak to peak and RMS in the unit, rates in arc seconds', () => {
    const [period, whole, steepest, drift, left] = keyFigures(result, display)
    expect([whole.value, whole.uncertainty, whole.unit]).toEqual(figures.whole)
    expect([left.value, left.unit]).toEqual([figures.left, figures.whole[2]])
    const plain = keyFigures(result)
    expect([period, steepest, drift]).toEqual([plain[0], plain[2], plain[3]])
  })

  test('spans in the unit', () => {
    const [without, ofDrift] = figures.raw
    expect(findingText(spansFinding(result, display))).toBe(
      `Without the worm the raw track would still span ${without}, because the drift alone spans ${ofDrift}.`,
    )
  })

  test('the overview tells the same figure with its error', () => {
    const point = {
      analysisId: 'a',
      runId: 'r',
      runName: 'run',
      analysisName: 'analysis',
      at: '2026-11-14T21:40:00.000Z',
      isRecordingTimeKnown: true,
      wormAmplitudeArcsec: 7.35,
      wormAmplitudeStderrArcsec: null,
      peakToPeakArcsec: 16.02,
      peakToPeakStderrArcsec: null,
      wormPeriodSeconds: 567.28,
    }
    const sentence = findingText(
      overviewFinding({
        name: 'Hillside',
        runCount: 1,
        analysisCount: 1,
        history: [point],
        latest: { worm: result.worm, turn: null },
        display,
      }),
    )
    const [value, error, unit] = figures.whole
    expect(sentence).toContain(`${value} ± ${error}${unit === 'px' ? `${NARROW}px` : unit} peak to peak`)
  })
})

test('a scale that is only roughly known matters to arc seconds, not to the pixels of the recording', () => {
  expect(keyFigures(result)[1].label).toContain('scale ± 1')
  expect(keyFigures(result, displays['amplitude, px'])[1].label).toBe('Worm, peak to peak')
})

test('advice doubles the swing of a line and leaves the tolerance as it was typed', () => {
  const strong = exampleResult()
  strong.lines[0].amplitudeArcsec.value = 9
  const say = (display: Display) => findingText(advice(strong, recipe, display).sentence)
  expect(say(PLAIN_DISPLAY)).toContain('swings 9.0″, more than the worm itself')
  expect(say(displays['peak-to-peak, ″'])).toContain('swings 18.0″ from end to end, more than the worm itself')
  const kept = exampleResult()
  kept.rate.framesKeptShare = 0.99
  expect(findingText(advice(kept, recipe, displays['peak-to-peak, px']).sentence)).toBe(
    findingText(advice(kept, recipe).sentence),
  )
})

test('a worm of one sine says which size is meant', () => {
  const single = exampleResult()
  if (single.worm) single.worm.harmonics = single.worm.harmonics.slice(0, 1)
  expect(findingText(harmonicsFinding(single))).toBe(
    'The worm’s swing is one plain sine of 7.350 ± 0.042″ to either side.',
  )
  expect(findingText(harmonicsFinding(single, displays['peak-to-peak, ″']))).toBe(
    'The worm’s swing is one plain sine of 14.700 ± 0.084″ from end to end.',
  )
})

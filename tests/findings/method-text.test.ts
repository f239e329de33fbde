import { describe, expect, test } from 'vitest'
import type { AnalysisResult, ErrorModel, Recipe } from '@/lib/analysis/types'
import { ENGINE_VERSION } from '@/lib/analysis/constants'
import { methodText, recomputedText, toleranceText } from '@/lib/findings/method-text'
import { exampleRecipe, exampleResult } from '../support/example-outcome'

/** The paragraph of this title, spaces of every kind as plain ones. */
function paragraph(title: string, result: AnalysisResult, recipe: Recipe): string | undefined {
  return methodText(result, recipe)
    .find((each) => each.title === title)
    ?.text.replace(/\s/g, ' ')
}

function withConversion(change: Partial<Recipe['conversion']>): Recipe {
  const recipe = exampleRecipe()
  return { ...recipe, conversion: { ...recipe.conversion, ...change } }
}

const conversionOf = (change: Partial<Recipe['conversion']>) =>
  paragraph('From the recording to the axis', exampleResult(), withConversion(change))

test('the paragraphs follow the data from the recording to the rehearsal', () => {
  expect(methodText(exampleResult(), exampleRecipe()).map(({ title }) => title)).toEqual([
    'From the recording to the axis',
    'Which way is ahead',
    'What was left out',
    'What was fitted',
    'Standard errors',
    'Spectrum',
    'Rehearsal',
  ])
})

describe('from the recording to the axis', () => {
  test('pixels name their scale, the sky its declination', () => {
    expect(conversionOf({})).toContain(
      'recorded in pixels and turned into arc seconds of the right-ascension axis with an image scale of 1.550″/px. ' +
        'It was measured on the sky at a declination of 8.9°, and divided by its cosine.',
    )
  })

  test('pixels without a scale name none', () => {
    expect(conversionOf({ imageScaleArcsecPerPx: null })).not.toContain('image scale')
  })

  test('a scale that was not used is not named', () => {
    const text = conversionOf({ displacementUnit: 'arcsec', frame: 'axis' })
    expect(text).toContain('recorded in arc seconds and')
    expect(text).toContain('measured on the axis, so the declination plays no part')
    expect(text).not.toContain('image scale')
  })

  test('seconds of right ascension are of the axis, whatever the frame says', () => {
    const text = conversionOf({ displacementUnit: 'ra-seconds', frame: 'sky' })
    expect(text).toContain('recorded in seconds of right ascension')
    expect(text).toContain('the declination plays no part')
  })

  test('an unknown declination divides by nothing', () => {
    const text = conversionOf({ declinationDegrees: null })
    expect(text).toContain('It was measured on the sky.')
    expect(text).not.toContain('cosine')
  })

  test.each([
    [{ timeStamp: 'mid', exposureSeconds: 2 } as const, 'Time stamps mark the middle of each exposure.'],
    [
      { timeStamp: 'start', exposureSeconds: 2 } as const,
      'Time stamps mark the start of each exposure of 2 s; half of it was taken into account.',
    ],
    [
      { timeStamp: 'end', exposureSeconds: 2 } as const,
      'Time stamps mark the end of each exposure of 2 s; half of it was taken into account.',
    ],
    [
      { timeStamp: 'end', exposureSeconds: null } as const,
      'Time stamps mark the end of exposures whose length is not given.',
    ],
  ])('%o', (change, sentence) => {
    expect(conversionOf(change)?.endsWith(sentence)).toBe(true)
  })
})

test('a sense is proven or only assumed', () => {
  const text = (senseBasis: 'proven' | 'assumed') =>
    paragraph('Which way is ahead', exampleResult(), withConversion({ senseBasis }))
  expect(text('proven')).toMatch(/^The sense is proven/)
  expect(text('assumed')).toMatch(/^The sense is only assumed/)
})

describe('what was left out', () => {
  const text = (result: Partial<AnalysisResult>, recipe: Partial<Recipe> = {}) =>
    paragraph('What was left out', { ...exampleResult(), ...result }, { ...exampleRecipe(), ...recipe })

  test('counts come with reasons, gaps are counted and never filled', () => {
    expect(text({})).toBe(
      '1340 of 1343 rows were used, one every 2.5 s, over 56 min 53 s. Left out: 3 stray points. The record has one gap; nothing was filled in.',
    )
  })

  test('reasons without a row are not named', () => {
    const leftOut: AnalysisResult['leftOut'] = [
      { reason: 'missing', count: 0 },
      { reason: 'excluded', count: 7 },
      { reason: 'repeated-time', count: 1 },
    ]
    expect(text({ leftOut })).toContain('Left out: 7 excluded by hand, 1 of a repeated time.')
    expect(text({ leftOut: [] })).toContain('None was left out.')
  })

  test('spans taken out by hand are named in minutes, and a filter that was off is said', () => {
    const said = text({}, { excludedSpans: [{ startSeconds: 60, endSeconds: 150 }], isStrayPointFilterOn: false })
    expect(said).toContain('By hand: 1.00 to 2.50 min.')
    expect(said).toMatch(/The filter for stray points was off\.$/)
  })
})

describe('what was fitted', () => {
  const text = (change: (result: AnalysisResult) => void, recipe: Partial<Recipe> = {}) => {
    const result = exampleResult()
    change(result)
    return paragraph('What was fitted', result, { ...exampleRecipe(), ...recipe })
  }

  test('drift, harmonics and further lines are named as fitted together', () => {
    expect(text(() => undefined)).toMatch(
      /^By least squares, together: a drift of degree 1.*, four harmonics of the worm and two further lines\. The worm’s period was fitted with them: /,
    )
  })

  test.each([
    ['gear', 'held at what the drive train gives'],
    ['typed', 'held as typed'],
  ] as const)('a period from %s was %s', (periodSource, words) => {
    expect(text(({ worm }) => Object.assign(worm!, { periodSource }))).toContain(`The worm’s period was ${words}: `)
  })

  test('no lines, a constant drift, harmonics set by hand', () => {
    const said = text(
      (result) => {
        result.lines = []
        result.drift.degree = 0
      },
      { harmonicCount: 4 },
    )
    expect(said).toContain('together: a constant')
    expect(said).not.toContain('further')
    expect(said).toMatch(/The number of harmonics was set by hand\.$/)
  })

  test('without a worm nothing but the drift is claimed', () => {
    expect(text((result) => Object.assign(result, { worm: null }))).toBe(
      'Only a drift of degree 1 was fitted: the record gives no figure for the worm.',
    )
  })
})

describe('standard errors', () => {
  test.each<[ErrorModel, string]>([
    ['white', 'Neighbouring samples err independently: '],
    ['ar1', 'Neighbouring samples err alike, and fade from one to the next: '],
    ['power-law', 'Slow errors are larger than fast ones, over the whole run: '],
    ['local-spectrum', 'What is left near each line is taken for its noise: '],
  ])('%s', (errorModel, beginning) => {
    const text = paragraph('Standard errors', { ...exampleResult(), errorModel }, exampleRecipe())
    expect(text?.startsWith(beginning)).toBe(true)
  })

  test('the uncertainty of the scale stands apart, or is not given', () => {
    const text = (scaleUncertaintyPercent: number | null) =>
      paragraph('Standard errors', { ...exampleResult(), scaleUncertaintyPercent }, exampleRecipe())
    expect(text(1.04)).toContain('± 1.0 %, is not in them')
    expect(text(null)).toContain('No uncertainty is given for the image scale')
  })
})

test('the spectrum names its window, and whether lines were looked for', () => {
  const text = (change: Partial<Recipe>) => paragraph('Spectrum', exampleResult(), { ...exampleRecipe(), ...change })
  expect(text({ spectrumWindow: 'flat-top' })).toContain('a flat-top window')
  expect(text({ spectrumWindow: 'rectangular', isLineSearchOn: false })).toBe(
    'The spectrum is drawn with no window, on the times as they were recorded. Lines beside the worm were not looked for.',
  )
  expect(text({ spectrumWindow: { kind: 'kaiser', beta: 2.5 * Math.PI } })).toContain('a Kaiser window of β = 7.85, on')
  expect(text({ chanceLevel: 0.001 })).toContain('fewer than 1 in 1000')
})

describe('the rehearsal', () => {
  const text = (change: (result: AnalysisResult) => void) => {
    const result = exampleResult()
    change(result)
    return paragraph('Rehearsal', result, exampleRecipe())
  }

  test('says that no turn was foretold by its own samples, and by which table', () => {
    expect(text(() => undefined)).toMatch(/^Each of .+ complete turns was foretold from the others/)
    expect(text(() => undefined)).toContain('48 bins')
    expect(text((result) => Object.assign(result, { table: null }))).not.toContain('bins')
  })

  test('a single turn has no others', () => {
    const said = text(({ turn }) => Object.assign(turn!, { completeTurns: 1, heldOutReduction: null }))
    expect(said).toBe('With one complete turn none can be foretold by the others.')
  })

  test('without a turn there is no such paragraph', () => {
    expect(text((result) => Object.assign(result, { turn: null }))).toBeUndefined()
  })
})

test('the tolerance is of the sky, for one picture', () => {
  const text = toleranceText({ ...exampleRecipe(), toleranceSkyArcsec: 2, pictureExposureSeconds: 60 })
  expect(text.replace(/\s/g, ' ')).toBe('Measured by pictures of 1 min that tolerate 2.0″ on the sky.')
})

test('figures of another version of the computation are told from those of this one', () => {
  const saved = { ...exampleResult(), engineVersion: ENGINE_VERSION }
  expect(recomputedText(saved, saved)).toBe(
    'Computed again from the stored recording, every figure is the same to the last digit.',
  )
  const older = { ...exampleResult(), engineVersion: '0.0.9' }
  const text = recomputedText(older, { ...older })
  expect(text).toContain('saved by version 0.0.9 of the computation')
  expect(text).toContain(`drawn by version ${ENGINE_VERSION}`)
})

import { describe, expect, test } from 'vitest'
import type { Recipe } from '@/lib/analysis/types'
import { defaultRecipe } from '@/lib/schemas/recipe'
import {
  readRecipeAddress,
  RECIPE_ADDRESS_KEYS,
  withRecipeAddress,
  writeRecipeAddress,
} from '@/lib/schemas/recipe-address'
import { exampleRecipe } from '../support/example-outcome'

/** Differs from the default in every single setting. */
function farRecipe(): Recipe {
  return {
    version: 1,
    conversion: {
      displacementUnit: 'px',
      imageScaleArcsecPerPx: 1.5500000000000003,
      imageScaleUncertaintyPercent: 0,
      declinationDegrees: -8.9,
      declinationUncertaintyDegrees: 1e-7,
      frame: 'axis',
      positiveMeans: 'behind',
      senseBasis: 'proven',
      exposureSeconds: 2.5,
      timeStamp: 'end',
    },
    excludedSpans: [
      { startSeconds: -3.25, endSeconds: 0.1 + 0.2 },
      { startSeconds: 1490, endSeconds: 1546 },
    ],
    isStrayPointFilterOn: false,
    driftDegree: 0,
    driveTrain: {
      axisKind: 'worm',
      wheelTeeth: 152,
      wormStarts: 2,
      stages: [
        { kind: 'belt', name: 'belt, short: 50 % & more', drivenTeeth: 60, drivingTeeth: 22, beltTeeth: 90 },
        { kind: 'gear-pair', name: '', drivenTeeth: 48, drivingTeeth: 12 },
      ],
    },
    wormPeriod: 'typed',
    typedPeriodSeconds: 566.86901645,
    harmonicCount: 7,
    isLineSearchOn: false,
    chanceLevel: 0.01,
    spectrumWindow: 'blackman-harris',
    toleranceSkyArcsec: 0.5,
    pictureExposureSeconds: 300,
    table: {
      binCount: 48,
      quantity: 'rate',
      unit: 'percent-sidereal',
      meaning: 'error',
      angleDirection: 'decreasing',
      origin: { kind: 'index-time', timeSeconds: -12.5 },
      offsetDegrees: -90,
      orders: [1, 2, 5],
      gain: 0.8,
      playback: 'held-at-centre',
    },
  }
}

describe('recipe in the address', () => {
  test.each([
    ['an unchanged recipe', defaultRecipe(), defaultRecipe()],
    ['every setting changed', farRecipe(), defaultRecipe()],
    ['every setting back to the default', defaultRecipe(), farRecipe()],
    ['the example run', exampleRecipe(), defaultRecipe()],
    [
      'a Kaiser window',
      { ...defaultRecipe(), spectrumWindow: { kind: 'kaiser', beta: 2.5 * Math.PI } },
      defaultRecipe(),
    ],
    ['a window that is none of Kaiser’s', farRecipe(), { ...farRecipe(), spectrumWindow: { kind: 'kaiser', beta: 0 } }],
    ['no orders at all', { ...farRecipe(), table: { ...farRecipe().table, orders: [] } }, farRecipe()],
    [
      'the column as origin',
      { ...farRecipe(), table: { ...farRecipe().table, origin: { kind: 'worm-angle-column' } } },
      farRecipe(),
    ],
  ] as [string, Recipe, Recipe][])('%s is read back to the last digit', (_, recipe, base) => {
    expect(readRecipeAddress(withRecipeAddress('', recipe, base), base)).toEqual({ recipe, refused: [] })
  })

  test('every setting of a recipe has a parameter', () => {
    expect(writeRecipeAddress(farRecipe(), defaultRecipe()).map(([key]) => key)).toEqual(RECIPE_ADDRESS_KEYS)
  })

  test('names only what differs, in words', () => {
    const base = exampleRecipe()
    const recipe = { ...base, driftDegree: 2 as const, excludedSpans: [{ startSeconds: 10, endSeconds: 20.5 }] }
    expect(withRecipeAddress('', recipe, base)).toBe('?leave-out=10..20.5&drift=2')
    expect(withRecipeAddress('', base, base)).toBe('')
  })

  test('an address from before there was a Kaiser window is read as it was', () => {
    const reading = readRecipeAddress('?window=blackman-harris&drift=2', defaultRecipe())
    expect(reading).toEqual({
      recipe: { ...defaultRecipe(), driftDegree: 2, spectrumWindow: 'blackman-harris' },
      refused: [],
    })
  })

  test('a Kaiser window stands in clear', () => {
    const recipe: Recipe = { ...defaultRecipe(), spectrumWindow: { kind: 'kaiser', beta: 8 } }
    expect(withRecipeAddress('', recipe, defaultRecipe())).toBe('?window=kaiser:8')
  })

  test('leaves other parameters alone', () => {
    const base = defaultRecipe()
    expect(withRecipeAddress('?sample=1&drift=3', { ...base, harmonicCount: 4 }, base)).toBe('?sample=1&harmonics=4')
  })

  test.each([
    ['drift', '4'],
    ['drift', 'steep'],
    ['harmonics', '0'],
    ['harmonics', '2.5'],
    ['leave-out', '20..10'],
    ['leave-out', '10'],
    ['leave-out', '1..2..3'],
    ['chance', '0.5'],
    ['tolerance', '-1'],
    ['tolerance', 'none'],
    ['wheel', '1e999'],
    ['stages', 'belt:60:22:belt'],
    ['stages', 'gear:60:0x16:pinion%'],
    ['zero', 'index:'],
    ['orders', '1.x'],
    ['bins', '7'],
    ['stray-filter', 'yes'],
    ['unit', 'parsec'],
    ['window', 'kaiser'],
    ['window', 'kaiser:'],
    ['window', 'kaiser:none'],
    ['window', 'kaiser:-1'],
    ['window', 'kaiser:20.1'],
    ['window', 'bartlett'],
    ['period', 'guessed'],
  ])('%s=%s is refused and leaves the base as it was', (key, value) => {
    const base = exampleRecipe()
    const search = `?${new URLSearchParams([[key, value]])}`
    expect(readRecipeAddress(search, base)).toEqual({ recipe: base, refused: [key] })
  })

  test('one refused parameter does not take the others with it', () => {
    const base = exampleRecipe()
    const reading = readRecipeAddress('drift=9&harmonics=3&foreign=1', base)
    expect(reading).toEqual({ recipe: { ...base, harmonicCount: 3 }, refused: ['drift'] })
  })
})

import { expect, test } from 'vitest'
import { hintsFromMetadata } from '@/lib/formats/metadata-hints'
import { readMetadata } from '@/lib/formats/preamble'

test('units are heeded, decimal commas and a true minus sign read', () => {
  expect(
    hintsFromMetadata({
      'Exposure time': '500 ms',
      declination: '\u22128,9°',
      'image scale': '1.55 arcsec/px',
      'Focal length': '1.2 m',
      'pixel size': '3.75 µm',
      Binning: '2',
    }),
  ).toEqual({
    exposureSeconds: 0.5,
    declinationDegrees: -8.9,
    imageScaleArcsecPerPx: 1.55,
    focalLengthMillimetres: 1200,
    pixelSizeMicrometres: 3.75,
    binning: 2,
  })
})

test.each([
  ['exposure', '2 furlongs'],
  ['exposure', '-1'],
  ['declination', '+91 deg'],
  ['declination', '12 30 40'],
  ['focal length', 'unknown'],
  ['binning', '2.5'],
])('%s = %s says nothing', (key, value) => {
  expect(Object.values(hintsFromMetadata({ [key]: value })).filter((hint) => hint !== null)).toEqual([])
})

test('pairs of one line and of many; the first of equal keys counts; odd keys do no harm', () => {
  const pairs = readMetadata([
    '# a = 1, b = 2',
    'note: it was clear: quite',
    '% a = 3',
    '__proto__: x',
    'constructor = y',
    'no pair here',
    '12: 3',
  ])
  expect(Object.entries(pairs)).toEqual([
    ['a', '1'],
    ['b', '2'],
    ['note', 'it was clear: quite'],
    ['constructor', 'y'],
  ])
})

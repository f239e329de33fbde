import { describe, expect, test } from 'vitest'
import { HELP, parseAnalyseOptions, type AnalyseOptions } from '@/lib/cli/analyse-options'
import { CliFault } from '@/lib/cli/cli-fault'

const PLAIN: AnalyseOptions = {
  file: 'run.csv',
  isHelp: false,
  isPretty: false,
  teeth: null,
  wormPeriodSeconds: null,
  columns: { time: null, ra: null, dec: null, wormAngle: null },
  unit: null,
  scaleArcsecPerPx: null,
  declinationDegrees: null,
  positive: null,
  frame: null,
  exposureSeconds: null,
  stamp: null,
  drift: 'auto',
  harmonics: 'auto',
}

const column = (role: keyof AnalyseOptions['columns'], name: string) => ({
  columns: { ...PLAIN.columns, [role]: name },
})

test.each([
  [[], {}],
  [['--pretty'], { isPretty: true }],
  [['--help'], { isHelp: true }],
  [['--teeth', '180'], { teeth: 180 }],
  [['--worm-period', '478.69'], { wormPeriodSeconds: 478.69 }],
  [['--time', 't [s]'], column('time', 't [s]')],
  [['--ra', '2'], column('ra', '2')],
  [['--dec', 'Dec'], column('dec', 'Dec')],
  [['--worm-angle', 'Worm'], column('wormAngle', 'Worm')],
  [['--unit', 'px'], { unit: 'px' }],
  [['--unit=arcsec'], { unit: 'arcsec' }],
  [['--unit', 'ra-seconds'], { unit: 'ra-seconds' }],
  [['--scale', '1.55'], { scaleArcsecPerPx: 1.55 }],
  [['--declination', '-12'], { declinationDegrees: -12 }],
  [['--declination', '-.5'], { declinationDegrees: -0.5 }],
  [['--declination=-12.25'], { declinationDegrees: -12.25 }],
  [['--declination', '+8.9'], { declinationDegrees: 8.9 }],
  [['--positive', 'ahead'], { positive: 'ahead' }],
  [['--positive', 'behind'], { positive: 'behind' }],
  [['--on', 'sky'], { frame: 'sky' }],
  [['--on', 'axis'], { frame: 'axis' }],
  [['--exposure', '0'], { exposureSeconds: 0 }],
  [['--exposure', '2.5'], { exposureSeconds: 2.5 }],
  [['--stamp', 'start'], { stamp: 'start' }],
  [['--stamp', 'mid'], { stamp: 'mid' }],
  [['--stamp', 'end'], { stamp: 'end' }],
  [['--drift', '0'], { drift: 0 }],
  [['--drift', '3'], { drift: 3 }],
  [['--drift', 'auto'], { drift: 'auto' }],
  [['--harmonics', '1'], { harmonics: 1 }],
  [['--harmonics', '12'], { harmonics: 12 }],
  [['--harmonics', 'auto'], { harmonics: 'auto' }],
] as [string[], Partial<AnalyseOptions>][])('%j', (argv, changed) => {
  const expected = { ...PLAIN, ...changed }
  expect(parseAnalyseOptions(['run.csv', ...argv])).toEqual(expected)
  expect(parseAnalyseOptions([...argv, 'run.csv'])).toEqual(expected)
})

test('--help needs no file', () => {
  expect(parseAnalyseOptions(['--help'])).toMatchObject({ isHelp: true, file: '' })
})

test.each([
  [[], 'No file was named'],
  [[''], 'No file was named'],
  [['a.csv', 'b.csv'], 'One file at a time: got “a.csv”, “b.csv”'],
  [['a.csv', '--tooth', '5'], "Unknown option '--tooth'"],
  [['a.csv', '--teeth'], "'--teeth <value>' argument missing"],
  [['a.csv', '--scale', '--pretty'], '--scale'],
  [['a.csv', '--pretty=yes'], '--pretty'],
  [['a.csv', '--teeth', '0'], '--teeth takes a whole number from 1 to 100000: got “0”'],
  [['a.csv', '--teeth', '-180'], '--teeth takes a whole number from 1 to 100000: got “-180”'],
  [['a.csv', '--teeth', '18.5'], 'got “18.5”'],
  [['a.csv', '--teeth', '100001'], 'got “100001”'],
  [['a.csv', '--teeth', '0x10'], 'got “0x10”'],
  [['a.csv', '--teeth', ' '], 'got “ ”'],
  [['a.csv', '--teeth', ''], 'got “”'],
  [['a.csv', '--teeth', '180', '--worm-period', '478'], 'both give the period: take one of them'],
  [['a.csv', '--worm-period', '0'], '--worm-period takes a number of seconds above 0: got “0”'],
  [['a.csv', '--worm-period', 'NaN'], 'got “NaN”'],
  [['a.csv', '--worm-period', 'Infinity'], 'got “Infinity”'],
  [['a.csv', '--worm-period', '1e999'], 'got “1e999”'],
  [['a.csv', '--unit', 'arcmin'], '--unit takes px or arcsec or ra-seconds: got “arcmin”'],
  [['a.csv', '--scale', '1,55'], '--scale takes arc seconds per pixel above 0: got “1,55”'],
  [['a.csv', '--scale', '-1'], 'got “-1”'],
  [['a.csv', '--declination', '89'], '--declination takes degrees between -89 and 89: got “89”'],
  [['a.csv', '--declination', '-90'], 'got “-90”'],
  [['a.csv', '--positive', 'east'], '--positive takes ahead or behind: got “east”'],
  [['a.csv', '--on', 'Sky'], '--on takes sky or axis: got “Sky”'],
  [['a.csv', '--exposure', '-1'], '--exposure takes seconds from 0 to 3600: got “-1”'],
  [['a.csv', '--exposure', '3601'], 'got “3601”'],
  [['a.csv', '--stamp', 'middle'], '--stamp takes start or mid or end: got “middle”'],
  [['a.csv', '--drift', '4'], '--drift takes 0, 1, 2, 3 or auto: got “4”'],
  [['a.csv', '--drift', 'none'], 'got “none”'],
  [['a.csv', '--harmonics', '13'], '--harmonics takes a whole number from 1 to 12, or auto: got “13”'],
  [['a.csv', '--harmonics', '0'], 'got “0”'],
])('%j is refused', (argv, told) => {
  const parse = () => parseAnalyseOptions(argv)
  expect(parse).toThrow(CliFault)
  expect(parse).toThrow(told)
})

describe('help', () => {
  const options = [...HELP.matchAll(/--([a-z-]+)/g)].map(([, name]) => name)

  test('names every option, and no other', () => {
    const named = [
      ...['declination', 'dec', 'drift', 'exposure', 'harmonics', 'help', 'on', 'positive', 'pretty', 'ra', 'scale'],
      ...['stamp', 'teeth', 'time', 'unit', 'worm-angle', 'worm-period'],
    ]
    expect([...new Set(options)].filter((name) => name !== 'silent').sort()).toEqual(named.sort())
  })

  test('fits a terminal of 120 columns', () => {
    for (const line of HELP.split('\n')) expect(line.length).toBeLessThanOrEqual(120)
  })
})

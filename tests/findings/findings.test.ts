import { describe, expect, test } from 'vitest'
import type { AnalysisResult, Reason } from '@/lib/analysis/types'
import { advice } from '@/lib/findings/advice'
import { additionOnlyWarning, assumedSenseWarning, correctionFinding } from '@/lib/findings/correction-finding'
import { finding, findingText, joinFindings, line, worm } from '@/lib/findings/finding'
import { harmonicCountSentence, harmonicsFinding } from '@/lib/findings/harmonics-finding'
import { keyFigures } from '@/lib/findings/key-figures'
import { reasonSentence } from '@/lib/findings/reason-sentence'
import { spansFinding } from '@/lib/findings/spans-finding'
import { spectrumFinding } from '@/lib/findings/spectrum-finding'
import { titleFinding } from '@/lib/findings/title-finding'
import { trackFinding } from '@/lib/findings/track-finding'
import { turnFinding } from '@/lib/findings/turn-finding'
import { exampleRecipe, exampleResult } from '../support/example-outcome'

const recipe = exampleRecipe()

function changed(change: (result: AnalysisResult) => void): AnalysisResult {
  const result = exampleResult()
  change(result)
  return result
}

const withoutWorm = changed((result) => {
  result.worm = null
  result.wormReason = 'short-run'
  result.turn = null
  result.table = null
  result.tableReason = 'short-run'
  result.run.turns = null
})

describe('finding parts', () => {
  test('keep the emphasis and melt neighbours together', () => {
    expect(finding`A ${worm('1″')} and ${'2″'} and ${finding`${line('x')}!`}`).toEqual([
      { text: 'A ', emphasis: null },
      { text: '1″', emphasis: 'worm' },
      { text: ' and 2″ and ', emphasis: null },
      { text: 'x', emphasis: 'line' },
      { text: '!', emphasis: null },
    ])
  })

  test('join with blanks', () => {
    expect(findingText(joinFindings([finding`One.`, finding`Two.`]))).toBe('One. Two.')
  })
})

describe('title', () => {
  test('says how far the worm swings and whether that repeats', () => {
    expect(findingText(titleFinding(exampleResult(), recipe))).toBe(
      'The worm swings the axis 16.0″ each turn, and repeats well enough to correct',
    )
  })

  test.each([
    [0.3, 'The worm swings the axis 16.0″ each turn, but a table would take only 30\u202f% off the RMS'],
    [-0.1, 'The worm swings the axis 16.0″ each turn, but a table would take nothing off the RMS'],
    [null, 'The worm swings the axis 16.0″ each turn; more turns would show how well that repeats'],
  ])('with a held-out reduction of %s', (heldOutReduction, sentence) => {
    const result = changed(({ turn }) => {
      if (turn) turn.heldOutReduction = heldOutReduction
    })
    expect(findingText(titleFinding(result, recipe))).toBe(sentence)
  })

  test('without a worm tells why, or what the record allows', () => {
    expect(findingText(titleFinding(withoutWorm, recipe))).toBe(
      'The run is too short: a worm figure takes one whole turn where the teeth are known, three where they are not',
    )
    const interval = { ...withoutWorm, wormPeriodIntervalSeconds: [427.5, 543.8] as [number, number] }
    expect(findingText(titleFinding(interval, recipe))).toBe(
      'The strongest swing takes between 428 and 544 s; the run is too short to say more',
    )
  })
})

describe('track', () => {
  test('counts turns, gaps and stray points', () => {
    expect(trackFinding(exampleResult())).toEqual([
      { text: 'The run covers ', emphasis: null },
      { text: '6.0 turns', emphasis: 'worm' },
      { text: ' of the worm; a gap of 56\u202fs and three stray points are left out.', emphasis: null },
    ])
  })

  test('says so when nothing is left out', () => {
    const result = changed((each) => {
      each.leftOut = []
      each.run.gaps = []
    })
    expect(findingText(trackFinding(result))).toBe('The run covers 6.0 turns of the worm; nothing is left out.')
  })

  test('agrees in number and counts each reason', () => {
    const result = changed((each) => {
      each.run.gaps = []
      each.leftOut = [{ reason: 'stray', count: 1 }]
      each.run.turns = 1.02
    })
    expect(findingText(trackFinding(result))).toBe('The run covers 1.0 turn of the worm; one stray point is left out.')
    result.leftOut = [
      { reason: 'missing', count: 20 },
      { reason: 'excluded', count: 1 },
    ]
    expect(findingText(trackFinding(result))).toContain('; 20 missing values and one sample by hand are left out.')
  })

  test('gives the duration where turns cannot be counted', () => {
    expect(findingText(trackFinding(withoutWorm))).toContain('The run lasts 56\u202fmin 53\u202fs; a gap')
  })
})

describe('spectrum', () => {
  test('names harmonics and the sources of other lines', () => {
    expect(findingText(spectrumFinding(exampleResult(), recipe))).toBe(
      'Four worm harmonics stand clear of noise, and two lines more: order 0.652 fits the belt, order 2.732 fits the motor pulley.',
    )
  })

  test('a harmonic below three standard errors is not counted', () => {
    const result = changed(({ worm: each }) => {
      if (each) each.harmonics[3].isPhaseMeaningful = false
    })
    expect(findingText(spectrumFinding(result, recipe))).toMatch(/^Three worm harmonics stand clear/)
  })

  test('unexplained lines are called so, and a fourth is only counted', () => {
    const result = changed((each) => {
      each.lines = [0, 1, 2, 3].map(() => ({ ...each.lines[0], source: null }))
    })
    expect(findingText(spectrumFinding(result, recipe))).toBe(
      'Four worm harmonics stand clear of noise, and four lines more: order 0.652 has no known source, order 0.652 has no known source, order 0.652 has no known source, and one more.',
    )
  })

  test('no line, and lines not looked for', () => {
    const result = changed((each) => {
      each.lines = []
    })
    expect(findingText(spectrumFinding(result, recipe))).toBe(
      'Four worm harmonics stand clear of noise, and no other line passes what chance reaches 1 in 1000 times.',
    )
    expect(findingText(spectrumFinding(result, { ...recipe, isLineSearchOn: false }))).toBe(
      'Four worm harmonics stand clear of noise, and other lines were not looked for.',
    )
  })

  test('without a worm lines have periods instead of orders', () => {
    const result = { ...withoutWorm, lines: withoutWorm.lines.map((each) => ({ ...each, order: null })) }
    expect(findingText(spectrumFinding(result, recipe))).toBe(
      'Nothing can be told to be the worm’s, and two lines: 869.8\u202fs fits the belt, 207.6\u202fs fits the motor pulley.',
    )
  })
})

describe('harmonics', () => {
  test('says who carries the power', () => {
    expect(findingText(harmonicsFinding(exampleResult()))).toBe(
      'The worm’s fundamental, 7.350 ± 0.042″, carries 94\u202f% of the swing’s power; the second harmonic most of the rest.',
    )
  })

  test('a second harmonic above the fundamental comes first', () => {
    const result = changed(({ worm: each }) => {
      if (!each) return
      each.harmonics[1].amplitudeArcsec.value = 9
      each.fundamentalPowerShare = 0.4
    })
    expect(findingText(harmonicsFinding(result))).toBe(
      'The second harmonic swings most; the worm’s fundamental, 7.350 ± 0.042″, carries only 40\u202f% of the swing’s power.',
    )
  })

  test('the choice of their number is told', () => {
    const { modelChoice } = exampleResult()
    expect(harmonicCountSentence(modelChoice, recipe)).toContain('a chance of 41\u202f%')
    expect(harmonicCountSentence(modelChoice, { ...recipe, harmonicCount: 3 })).toBe(
      'The number of harmonics was set by hand.',
    )
  })
})

describe('turn and spans', () => {
  test('variance that repeats, and the RMS a perfect table leaves', () => {
    expect(findingText(turnFinding(exampleResult()))).toBe(
      '99.0\u202f% of the variance repeats each turn; a perfect table leaves 10\u202f% of the RMS.',
    )
    expect(findingText(turnFinding(withoutWorm))).toContain('too short')
    const single = changed((result) => {
      result.run.turns = 1.4
      if (result.turn) result.turn.completeTurns = 1
    })
    expect(findingText(turnFinding(single))).toBe(
      'With 1.4 turns there is nothing to compare a turn with; two or more would show what repeats.',
    )
  })

  test('a raw span that is mostly drift says so', () => {
    expect(findingText(spansFinding(exampleResult()))).toBe(
      'Without the worm the raw track would still span 22.5″, because the drift alone spans 19.9″.',
    )
    const result = changed(({ spans }) => {
      spans.rawWithoutWormArcsec = 4.2
      spans.driftArcsec = 0.9
    })
    expect(findingText(spansFinding(result))).toBe(
      'Without the worm the raw track would span 4.2″ instead of 33.2″; the drift alone spans 0.90″.',
    )
  })
})

describe('correction', () => {
  test('what it takes off, and where the axis is furthest ahead', () => {
    expect(findingText(correctionFinding(exampleResult(), recipe))).toBe(
      'Rehearsed on turns it was not made from, it removes 93\u202f% of the RMS. At 33° the axis runs 8.6″ ahead; there the table holds it back.',
    )
  })

  test('an assumed sense is said beside "ahead"', () => {
    const assumed = { ...recipe, conversion: { ...recipe.conversion, senseBasis: 'assumed' as const } }
    expect(findingText(correctionFinding(exampleResult(), assumed))).toContain('8.6″ ahead (sense assumed);')
    expect(assumedSenseWarning(assumed)).toContain('only assumed')
    expect(assumedSenseWarning(recipe)).toBeNull()
  })

  test('the angle is the table’s own', () => {
    const result = changed(({ table }) => {
      if (!table) return
      table.settings = { ...table.settings, angleDirection: 'decreasing', offsetDegrees: 10 }
      table.originTimeSeconds = table.wormPeriodSeconds / 4
    })
    // 10° − (33° − 90°) = 67°
    expect(findingText(correctionFinding(result, recipe))).toContain('At 67° the axis')
  })

  test('a table that does harm says so', () => {
    const result = changed(({ table }) => {
      if (table) table.rehearsal.heldOutReduction = -0.12
    })
    expect(correctionFinding(result, recipe)).toContainEqual({ text: 'adds 12\u202f%', emphasis: 'limit' })
  })

  test('a correction that was on, or may have been, gives only an addition', () => {
    expect(additionOnlyWarning('off')).toBeNull()
    expect(additionOnlyWarning('on')).toContain('added')
    expect(additionOnlyWarning('unknown')).toContain('not known')
  })
})

describe('advice', () => {
  test.each<[string, (result: AnalysisResult) => void]>([
    ['correct', () => {}],
    ['leave', ({ rate }) => void (rate.framesKeptShare = 0.97)],
    ['inspect', ({ turn }) => void (turn!.heldOutReduction = 0.2)],
    ['inspect', ({ lines }) => void (lines[0].amplitudeArcsec.value = 9)],
    ['guide', ({ turn }) => void (turn!.heldOutReduction = null)],
    ['unknown', (result) => void (result.worm = null)],
    [
      'inspect',
      ({ turn, rate }) => {
        turn!.heldOutReduction = null
        rate.longestCorrectionIntervalSeconds = 0.4
      },
    ],
  ])('%s', (verdict, change) => {
    const given = advice(changed(change), recipe)
    expect(given.verdict).toBe(verdict)
    expect(findingText(given.sentence)).toMatch(/\.$/)
    expect(given.rule).not.toBe('')
  })
})

describe('figures over the sheet', () => {
  test('five, with units and uncertainties', () => {
    expect(keyFigures(exampleResult())).toEqual([
      { label: 'Worm period', value: '567.28', uncertainty: '0.27', unit: 's' },
      { label: 'Worm, peak to peak (scale ± 1\u202f%)', value: '16.02', uncertainty: '0.13', unit: '″' },
      { label: 'Steepest rate', value: '0.1221', uncertainty: '0.0011', unit: '″/s' },
      { label: 'Drift', value: '+0.3510', uncertainty: '0.0020', unit: '″/min' },
      { label: 'Left after the fit, RMS', value: '0.50', unit: '″' },
    ])
  })

  test('without a worm a dash stands where there is no figure', () => {
    expect(keyFigures(withoutWorm)[0]).toEqual({ label: 'Worm period', value: '–' })
  })
})

test.each<Reason>([
  'few-points',
  'short-run',
  'not-finite',
  'not-increasing',
  'singular',
  'out-of-range',
  'no-period',
  'no-index',
])('the reason word %s has a sentence of what is the matter and one of what to do', (reason) => {
  expect(reasonSentence({ reason }).match(/\.( |$)/g)).toHaveLength(2)
})

test('counts are told with too few samples', () => {
  expect(reasonSentence({ reason: 'few-points', needed: 20, got: 5 })).toContain('20 are needed, 5 are there.')
})

import { expect, test } from 'vitest'
import { WARNING_CODES, type WarningCode } from '@/lib/analysis/warnings'
import { warningSentence } from '@/lib/findings/warning-sentence'

const details = {
  declinationDegrees: 82,
  percent: 7.2,
  turns: 2.4,
  neededTurns: 3,
  fittedSeconds: 570.1,
  gearSeconds: 566.869,
  standardErrors: 4.2,
  lineSeconds: 283,
  factor: 0.4,
  periodSeconds: 61.3,
  count: 20,
  wanted: 8,
  kept: 5,
  ratio: 1.4,
  name: 'belt teeth',
  order: 60,
  aliasSeconds: 31.2,
  recorded: 'falling',
}

test.each(Object.keys(WARNING_CODES) as WarningCode[])('%s is told in a whole sentence', (code) => {
  const { text } = warningSentence({ code, details })
  expect(text).toMatch(/^[A-Zb0-9].*\.$/)
  expect(text).not.toMatch(/–|undefined|NaN|warns of/)
})

test('figures stand in the sentence', () => {
  expect(warningSentence({ code: 'period-differs-from-gear', details })).toEqual({
    stage: 'harmonics',
    text: 'The fitted period of 570.1\u202fs is 4.2 standard errors away from the 566.9\u202fs of the drive train. Look at the count of teeth, the tracking rate and the clock of the recording.',
  })
})

test('under two turns the standard errors are worth less than between two and four', () => {
  const text = (turns: number) => warningSentence({ code: 'errors-may-be-small', details: { turns } }).text
  expect(text(1.1)).toContain('slow noise passes for harmonics')
  expect(text(2.4)).toContain('a fifth too small')
})

test('a word of a newer core is shown as it is', () => {
  expect(warningSentence({ code: 'moon-in-the-way', details: {} }).text).toBe(
    'The analysis warns of “moon in the way”.',
  )
})

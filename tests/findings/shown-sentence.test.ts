import { expect, test } from 'vitest'
import {
  analysisFilterWords,
  auditFilterWords,
  correctionFilterWords,
  projectFilterWords,
  runFilterWords,
  shownSentence,
} from '@/lib/findings/shown-sentence'
import {
  analysisQuerySchema,
  auditQuerySchema,
  correctionQuerySchema,
  projectQuerySchema,
  runQuerySchema,
} from '@/lib/schemas/lists'

const runs = { one: 'run', many: 'runs' }

test('the sentence counts what is shown and says why', () => {
  const words = runFilterWords(runQuerySchema.parse({ correction: 'off' }))
  expect(shownSentence({ total: 12, all: 340 }, runs, words)).toBe(
    '12 of 340 runs: recorded with the mount’s correction off',
  )
  expect(shownSentence({ total: 340, all: 340 }, runs, [])).toBe('340 runs')
  expect(shownSentence({ total: 0, all: 1 }, runs, ['read'])).toBe('0 of 1 run: read')
})

test.each([
  [{ q: ' wind ' }, ['with “wind”']],
  [{ side: 'east', sense: 'assumed' }, ['on the east side of the pier', 'with the sense only assumed']],
  [{ state: 'unread' }, ['not read yet']],
  [{ from: '2026-11-01' }, ['recorded since 1 November 2026']],
  [{ to: '2026-11-30' }, ['recorded until 30 November 2026']],
  [{ from: '2026-11-01', to: '2026-11-30' }, ['recorded from 1 November 2026 to 30 November 2026']],
  [{ from: '2026-11-01', to: '2026-11-01' }, ['recorded on 1 November 2026']],
  [{ sort: 'name', limit: 100 }, []],
])('runs filtered by %o', (query, words) => {
  expect(runFilterWords(runQuerySchema.parse(query))).toEqual(words)
})

test('the other lists', () => {
  const runId = '5f0c0b9e-7d3c-4a58-9f0a-3d2f6b1c9e11'
  expect(analysisFilterWords(analysisQuerySchema.parse({ runId, worm: 'without' }), 'Night 2')).toEqual([
    'of the run “Night 2”',
    'without a figure for the worm',
  ])
  expect(correctionFilterWords(correctionQuerySchema.parse({ kind: 'addition' }))).toEqual([
    'added to the table in the mount',
  ])
  expect(projectFilterWords(projectQuerySchema.parse({}))).toEqual([])
  expect(projectFilterWords(projectQuerySchema.parse({ archived: 'only', role: 'owner' }))).toEqual([
    'that you own',
    'archived',
  ])
  expect(auditFilterWords(auditQuerySchema.parse({ person: runId, thing: 'note' }), 'Ines')).toEqual([
    'by Ines',
    'about notes',
  ])
})

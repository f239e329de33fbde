import { describe, expect, test } from 'vitest'
import { driveFinding } from '@/lib/findings/drive-finding'
import { findingText } from '@/lib/findings/finding'
import { analysesFinding, correctionsFinding, projectsFinding, runsFinding } from '@/lib/findings/list-findings'
import { historyFinding, overviewFinding } from '@/lib/findings/overview-finding'
import { projectHistory } from '@/lib/findings/project-history'
import { closureFinding, tableFinding } from '@/lib/findings/table-finding'

// The wheel of the demo: 86164.0905 s / 152 = 566.8690 s (sidereal day after Aoki et al. 1982, A&A 105, 359).
const hillside = { axisKind: 'worm' as const, wheelTeeth: 152, wormStarts: 1, stages: [] }

test('driveFinding states the worm period of the teeth', () => {
  expect(findingText(driveFinding(hillside))).toBe('A wheel of 152 teeth turns its worm once in 566.87\u202fs')
  expect(findingText(driveFinding({ ...hillside, wormStarts: 2 }))).toContain('1133.74\u202fs')
  expect(findingText(driveFinding({ ...hillside, wheelTeeth: null }))).toContain('not known yet')
})

const analysis = (id: string, runId: string, createdAt: string, peakToPeakArcsec: number | null) => ({
  id,
  name: id,
  runId,
  runName: `run ${runId}`,
  createdAt,
  updatedAt: createdAt,
  wormPeriodSeconds: 566.9,
  wormAmplitudeArcsec: peakToPeakArcsec === null ? null : peakToPeakArcsec / 2,
  peakToPeakArcsec,
})
const run = (id: string, startedAt: string | null) => ({ id, createdAt: '2026-12-01T00:00:00Z', facts: { startedAt } })

describe('projectHistory', () => {
  const analyses = [
    analysis('late', 'b', '2026-11-30T10:00:00Z', 15),
    analysis('old', 'a', '2026-11-20T10:00:00Z', 20),
    analysis('new', 'a', '2026-11-21T10:00:00Z', 16),
    analysis('none', 'c', '2026-11-22T10:00:00Z', null),
  ]
  const runs = [run('b', '2026-11-14T23:00:00+02:00'), run('a', '2026-11-14T20:00:00Z'), run('c', null)]

  test('takes the newest analysis of each run, in the order of recording, and skips runs without a figure', () => {
    expect(projectHistory(analyses, runs).map(({ analysisId }) => analysisId)).toEqual(['new', 'late'])
  })

  test('a run whose start nobody noted stands where it was brought in, and says so', () => {
    const [, last] = projectHistory(analyses.slice(0, 2), [runs[0], run('a', null)])
    expect(last).toMatchObject({ runId: 'a', at: '2026-12-01T00:00:00Z', isRecordingTimeKnown: false })
  })

  test('historyFinding states both ends', () => {
    expect(findingText(historyFinding(projectHistory(analyses, runs)))).toBe(
      'From the first to the last of two analysed runs the peak-to-peak went from 16.0″ to 15.0″.',
    )
    expect(findingText(historyFinding([]))).toContain('no history yet')
  })

  test('overviewFinding says what comes next until there is a figure', () => {
    const state = { name: 'Hillside', runCount: 0, analysisCount: 0, history: [], latest: null }
    expect(findingText(overviewFinding(state))).toBe('Hillside has no recording yet')
    expect(findingText(overviewFinding({ ...state, runCount: 1 }))).toBe(
      'One run of Hillside waits for a first analysis',
    )
    const history = projectHistory(analyses, runs)
    const latest = {
      worm: {
        periodSeconds: { value: 567.28, stderr: 0.27 },
        peakToPeakArcsec: { value: 16.02, stderr: 0.13 },
        steepestRateArcsecPerSecond: { value: 0.12, stderr: null },
        harmonics: [],
      },
      turn: null,
    }
    expect(findingText(overviewFinding({ ...state, runCount: 2, analysisCount: 3, history, latest }))).toBe(
      'The worm swings the axis 16.02 ± 0.13″ peak to peak in the latest analysed run',
    )
  })
})

describe('sentences over lists', () => {
  test('empty lists say so', () => {
    const findings = [projectsFinding([]), runsFinding([]), analysesFinding([]), correctionsFinding([])]
    for (const finding of findings) expect(findingText(finding)).toMatch(/^No .* yet$/)
  })

  test('runsFinding counts what is left to do', () => {
    const done = { status: 'ready' as const, analysisCount: 1, conversion: { senseBasis: 'proven' as const } }
    expect(findingText(runsFinding([done, done]))).toBe('Two runs, all read and analysed')
    const unread = { status: 'uploaded' as const, analysisCount: 0, conversion: null }
    const assumed = { status: 'ready' as const, analysisCount: 0, conversion: { senseBasis: 'assumed' as const } }
    expect(findingText(runsFinding([done, unread, assumed]))).toBe(
      'Three runs, one not read yet, one without an analysis, one with the sense only assumed',
    )
  })

  test('analysesFinding gives the range of the swing', () => {
    const list = [analysis('x', 'a', '2026-11-20T10:00:00Z', 16), analysis('y', 'b', '2026-11-20T10:00:00Z', 14.6)]
    expect(findingText(analysesFinding(list))).toBe('Two analyses: the worm’s swing lies between 14.6″ and 16.0″')
  })

  test('correctionsFinding tells how many rest on an assumed sense', () => {
    const table = (senseBasis: 'proven' | 'assumed') => ({ name: 't', createdAt: '2026-11-20T10:00:00Z', senseBasis })
    expect(findingText(correctionsFinding([table('proven')]))).toContain('proven')
    expect(findingText(correctionsFinding([table('proven'), table('assumed')]))).toContain('one of them')
    expect(findingText(correctionsFinding([table('assumed'), table('assumed')]))).toContain('only assumed')
  })
})

describe('tableFinding', () => {
  const rehearsed = (heldOutReduction: number | null) => ({
    orders: [1, 2],
    largestRateArcsecPerSecond: 0.12,
    rehearsal: {
      peakToPeakBeforeArcsec: 16,
      peakToPeakAfterArcsec: 0.5,
      heldOutReduction,
      slipForTenPercentDegrees: 5.7,
      slipForNoHelpDegrees: 60,
      binningLossShare: 0.001,
    },
  })

  test('warns where the table would make things worse', () => {
    expect(findingText(tableFinding(rehearsed(0.93), 48))).toContain('93\u202f% off the RMS')
    expect(findingText(tableFinding(rehearsed(-0.1), 48))).toContain('do not load it')
    expect(findingText(tableFinding(rehearsed(null), 48))).toContain('Too few turns')
    expect(findingText(tableFinding(null, 48))).toContain('not rehearsed')
  })

  test('closureFinding tells a table that closes from one that creeps', () => {
    expect(findingText(closureFinding(2e-15, 'rate'))).toContain('closes to zero')
    expect(findingText(closureFinding(-0.02, 'position'))).toContain('creeps')
  })
})

import { describe, expect, test } from 'vitest'
import { driveFinding } from '@/lib/findings/drive-finding'
import { findingText } from '@/lib/findings/finding'
import {
  analysesFinding,
  auditFinding,
  correctionsFinding,
  projectsFinding,
  runsFinding,
} from '@/lib/findings/list-findings'
import { historyFinding, overviewFinding } from '@/lib/findings/overview-finding'
import { closureFinding, tableFinding } from '@/lib/findings/table-finding'

// The wheel of the demo: 86164.0905 s / 152 = 566.8690 s (sidereal day after Aoki et al. 1982, A&A 105, 359).
const hillside = { axisKind: 'worm' as const, wheelTeeth: 152, wormStarts: 1, stages: [] }

test('driveFinding states the worm period of the teeth', () => {
  expect(findingText(driveFinding(hillside))).toBe('A wheel of 152 teeth turns its worm once in 566.87\u202fs')
  expect(findingText(driveFinding({ ...hillside, wormStarts: 2 }))).toContain('1133.74\u202fs')
  expect(findingText(driveFinding({ ...hillside, wheelTeeth: null }))).toContain('not known yet')
})

const point = (id: string, at: string, peakToPeakArcsec: number, peakToPeakStderrArcsec: number | null = null) => ({
  analysisId: id,
  runId: id,
  runName: `run ${id}`,
  analysisName: id,
  at,
  isRecordingTimeKnown: true,
  wormAmplitudeArcsec: peakToPeakArcsec / 2,
  wormAmplitudeStderrArcsec: null,
  peakToPeakArcsec,
  peakToPeakStderrArcsec,
  wormPeriodSeconds: 566.9,
})

describe('the history', () => {
  const history = [point('new', '2026-11-14T20:00:00Z', 16, 0.13), point('late', '2026-11-14T21:00:00Z', 15)]

  test('historyFinding states both ends', () => {
    expect(findingText(historyFinding(history))).toBe(
      'From the first to the last of two analysed runs the peak-to-peak went from 16.00 ± 0.13″ to 15.0″.',
    )
    expect(findingText(historyFinding(history, 310))).toContain('the latest 2 of 310 analysed runs')
    expect(findingText(historyFinding([]))).toContain('no history yet')
  })

  test('overviewFinding says what comes next until there is a figure', () => {
    const state = { name: 'Hillside', runCount: 0, analysisCount: 0, history: [], latest: null }
    expect(findingText(overviewFinding(state))).toBe('Hillside has no recording yet')
    expect(findingText(overviewFinding({ ...state, runCount: 1 }))).toBe(
      'One run of Hillside waits for a first analysis',
    )
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
  const noRuns = { unread: 0, withoutAnalysis: 0, assumedSense: 0 }
  const noSwing = { leastPeakToPeakArcsec: null, mostPeakToPeakArcsec: null }

  test('empty lists say so', () => {
    const findings = [
      projectsFinding({ all: 0, overview: { archived: 0, lastChangedName: null } }),
      runsFinding({ all: 0, overview: noRuns }),
      analysesFinding({ all: 0, overview: noSwing }),
      correctionsFinding({ all: 0, overview: { assumedSense: 0 } }),
      auditFinding({ all: 0 }),
    ]
    for (const finding of findings) expect(findingText(finding)).toMatch(/^No.* yet$/)
  })

  test('projectsFinding tells of archived ones', () => {
    const text = (all: number, archived: number) =>
      findingText(projectsFinding({ all, overview: { archived, lastChangedName: 'Hillside' } }))
    expect(text(1, 0)).toBe('You work on one mount, Hillside')
    expect(text(1, 1)).toBe('You work on one mount, Hillside, which is archived')
    expect(text(3, 0)).toBe('You work on three mounts; Hillside changed last')
    expect(text(3, 2)).toBe('You work on three mounts, two of them archived; Hillside changed last')
  })

  test('runsFinding counts what is left to do', () => {
    expect(findingText(runsFinding({ all: 2, overview: noRuns }))).toBe('Two runs, all read and analysed')
    const overview = { unread: 1, withoutAnalysis: 1, assumedSense: 14 }
    expect(findingText(runsFinding({ all: 30, overview }))).toBe(
      '30 runs, one not read yet, one without an analysis, 14 with the sense only assumed',
    )
  })

  test('analysesFinding gives the range of the swing', () => {
    const text = (least: number | null, most: number | null) =>
      findingText(analysesFinding({ all: 2, overview: { leastPeakToPeakArcsec: least, mostPeakToPeakArcsec: most } }))
    expect(text(14.6, 16)).toBe('Two analyses: the worm’s swing lies between 14.6″ and 16.0″')
    expect(text(16, 16)).toBe('Two analyses: the worm swings the axis by 16.0″')
    expect(text(null, null)).toBe('Two analyses, none with a figure for the worm')
  })

  test('correctionsFinding tells how many rest on an assumed sense', () => {
    const text = (all: number, assumedSense: number) =>
      findingText(correctionsFinding({ all, overview: { assumedSense } }))
    expect(text(1, 0)).toContain('proven')
    expect(text(2, 1)).toContain('one of them')
    expect(text(2, 2)).toContain('only assumed')
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

import { expect } from 'vitest'
import { POST as createProject } from '@/app/api/projects/route'
import { POST as createPreset } from '@/app/api/projects/[projectId]/optics-presets/route'
import { POST as uploadRun } from '@/app/api/projects/[projectId]/runs/route'
import { PUT as importRun } from '@/app/api/projects/[projectId]/runs/[runId]/import/route'
import { POST as saveAnalysis } from '@/app/api/projects/[projectId]/analyses/route'
import { POST as writeNote } from '@/app/api/projects/[projectId]/analyses/[analysisId]/notes/route'
import { POST as makeCorrection } from '@/app/api/projects/[projectId]/corrections/route'
import type { createDatabase } from '@/db/create-db'
import type { AnalysisResult, Conversion, DriveTrain } from '@/lib/analysis/types'
import type { ImportSettings } from '@/lib/formats/types'
import type { Run } from '@/lib/schemas/api'
import { defaultRecipe } from '@/lib/schemas/recipe'
import { unknownRunFacts } from '@/lib/schemas/run-facts'
import { call, signUpPerson, type Person } from './test-server'

type Db = ReturnType<typeof createDatabase>['db']

export const DRIVE_TRAIN: DriveTrain = { axisKind: 'worm', wheelTeeth: 152, wormStarts: 1, stages: [] }

export const OPTICS = {
  name: 'Guide scope',
  focalLengthMm: 240,
  pixelSizeUm: 3.75,
  binning: 1,
  imageScaleArcsecPerPx: 3.22,
  imageScaleUncertaintyPercent: 1,
}

export const SETTINGS: ImportSettings = {
  version: 1,
  layout: { encoding: 'utf-8', delimiter: ',', decimalMark: '.', headerRow: 1, unitsRow: null, firstDataRow: 2 },
  columns: {
    time: 0,
    timeUnit: 'seconds',
    displacement: 1,
    displacementUnit: 'arcsec',
    declination: null,
    wormAngle: null,
    wormAngleUnit: 'degrees',
  },
}

export const CONVERSION: Conversion = { ...defaultRecipe().conversion, frame: 'axis' }

/** A short recording: 60 rows, one every 10 s, a swing of 4″ in 566.87 s. */
export function recordingText(rowCount = 60): string {
  const rows = Array.from({ length: rowCount }, (_, i) => {
    const timeSeconds = i * 10
    return `${timeSeconds},${(4 * Math.sin((2 * Math.PI * timeSeconds) / 566.87)).toFixed(3)}`
  })
  return ['time (s),ra (arcsec)', ...rows, ''].join('\n')
}

/** Numbers invented for what the server does with them; no figure of it is tested. */
export function someResult(given: Partial<AnalysisResult> = {}): AnalysisResult {
  const estimate = { value: 4.000000000000001, stderr: 0.1 }
  return {
    engineVersion: '0.1.0',
    rows: 60,
    used: 59,
    leftOut: [{ reason: 'stray', count: 1 }],
    run: {
      durationSeconds: 590,
      medianCadenceSeconds: 10,
      firstUsedTimeSeconds: 0,
      lastUsedTimeSeconds: 590,
      turns: 1.04,
      gaps: [],
      finestSplitOrders: 0.96,
      shortestPeriodSeconds: 20,
    },
    drift: { degree: 1, coefficients: [estimate], rateArcsecPerSecond: estimate, percentOfSidereal: 0.1 },
    worm: {
      periodSeconds: { value: 566.8690164473684, stderr: null },
      periodSource: 'gear',
      fittedPeriodSeconds: null,
      gearPeriodSeconds: 566.8690164473684,
      harmonics: [
        {
          order: 1,
          periodSeconds: 566.8690164473684,
          amplitudeArcsec: estimate,
          phaseDegrees: { value: 90, stderr: 1 },
          isPhaseMeaningful: true,
          cosArcsec: 1e-15,
          sinArcsec: 4,
          covarianceArcsec2: [0.01, 0, 0.01],
        },
      ],
      peakToPeakArcsec: { value: 8, stderr: 0.2 },
      rmsArcsec: 2.8,
      steepestRateArcsecPerSecond: { value: 0.044, stderr: 0.001 },
      furthestAheadDegrees: 90,
      furthestAheadArcsec: 4,
      furthestBehindDegrees: 270,
      furthestBehindArcsec: -4,
      fundamentalPowerShare: 1,
    },
    wormReason: null,
    wormPeriodIntervalSeconds: null,
    modelChoice: null,
    lines: [],
    predictedOrders: [{ name: 'worm', order: 1, periodSeconds: 566.87 }],
    residual: {
      rmsArcsec: 0.3,
      lagOneCorrelation: 0.1,
      correctedLagOneCorrelation: 0.12,
      effectiveSampleCount: 48,
      seeingFloorArcsec: 0.2,
      isSeeingFloorLowerBound: true,
    },
    errorModel: 'white',
    turn: null,
    spans: {
      rawArcsec: 9,
      afterDriftArcsec: 8.5,
      afterWormArcsec: 1,
      afterLinesArcsec: 1,
      rawWithoutWormArcsec: 1.5,
      driftArcsec: 0.5,
      wormArcsec: 8,
    },
    rate: {
      steepestArcsecPerSecond: 0.044,
      steepestWithDriftArcsecPerSecond: 0.05,
      percentOfSidereal: 0.3,
      longestCorrectionIntervalSeconds: null,
      framesKeptShare: 0.5,
      toleranceAxisArcsec: 2,
    },
    table: {
      bins: Array.from({ length: 8 }, (_, index) => ({ index, angleDegrees: index * 45, value: index - 3.5 })),
      settings: { ...defaultRecipe().table, binCount: 8 },
      orders: [1],
      wormPeriodSeconds: 566.8690164473684,
      originTimeSeconds: 0,
      closureError: 0,
      largestRateArcsecPerSecond: 0.044,
      rehearsal: {
        orders: [{ order: 1, beforeArcsec: 4, afterArcsec: 0.1, isIncluded: true }],
        peakToPeakBeforeArcsec: 8,
        peakToPeakAfterArcsec: 0.2,
        heldOutReduction: null,
        slipForTenPercentDegrees: 5.73,
        slipForNoHelpDegrees: 60,
        binningLossShare: 0.02,
      },
    },
    tableReason: null,
    scaleUncertaintyPercent: null,
    declination: null,
    warnings: [{ code: 'short-run', details: { turns: 1.04 } }],
    ...given,
  }
}

async function made(pending: Promise<Response>, status = 201) {
  const response = await pending
  const body = await response.json()
  expect([response.status, body.error]).toEqual([status, undefined])
  return body
}

export type Role = 'none' | 'stranger' | 'viewer' | 'editor' | 'owner'

export interface TestProject {
  id: string
  people: Record<Exclude<Role, 'none'>, Person>
}

/** A project with one person of each role, and one who is no member. */
export async function makeProject(db: Db): Promise<TestProject> {
  const [owner, editor, viewer, stranger] = [
    await signUpPerson('Olga Owner'),
    await signUpPerson('Edda Editor'),
    await signUpPerson('Viktor Viewer'),
    await signUpPerson('Stina Stranger'),
  ]
  const body = { name: 'Test mount', driveTrain: DRIVE_TRAIN }
  const { id } = await made(call(createProject, '/api/projects', {}, { method: 'POST', body, cookie: owner.cookie }))
  await db
    .insertInto('memberships')
    .values([
      { projectId: id, userId: editor.id, role: 'editor' },
      { projectId: id, userId: viewer.id, role: 'viewer' },
    ])
    .execute()
  return { id, people: { owner, editor, viewer, stranger } }
}

interface InProject {
  projectId: string
  cookie: string
}

const post = ({ cookie }: InProject, body: unknown) => ({ method: 'POST', body, cookie })

export function makePreset(where: InProject) {
  const { projectId } = where
  return made(call(createPreset, '/', { projectId }, post(where, OPTICS)))
}

export function upload(where: InProject, text = recordingText()): Promise<Run> {
  const { projectId } = where
  const path = `/api/projects/${projectId}/runs?name=First%20light&fileName=night.csv`
  return made(call(uploadRun, path, { projectId }, post(where, new TextEncoder().encode(text))))
}

/** A run that has been read, recorded without a correction in the mount unless said otherwise. */
export async function makeRun(where: InProject, mountCorrection: 'off' | 'on' | 'unknown' = 'off'): Promise<Run> {
  const { projectId, cookie } = where
  const run = await upload(where)
  const facts = { ...unknownRunFacts(), mountCorrection }
  const body = { version: run.version, settings: SETTINGS, conversion: CONVERSION, facts }
  return made(call(importRun, '/', { projectId, runId: run.id }, { method: 'PUT', body, cookie }), 200)
}

export function makeAnalysis(where: InProject, runId: string, result: AnalysisResult = someResult()) {
  const { projectId } = where
  const body = { runId, name: 'First look', recipe: defaultRecipe(), result }
  return made(call(saveAnalysis, '/', { projectId }, post(where, body)))
}

export function makeNote(where: InProject, analysisId: string) {
  const { projectId } = where
  const body = { anchor: { kind: 'whole' }, text: 'A calm night' }
  return made(call(writeNote, '/', { projectId, analysisId }, post(where, body)))
}

export function makeTable(where: InProject, analysisId: string) {
  const { projectId } = where
  const body = { analysisId, name: 'Table for the club', kind: 'stand-alone', isAssumedSenseConfirmed: true }
  return made(call(makeCorrection, '/', { projectId }, post(where, body)))
}

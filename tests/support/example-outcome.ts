import type {
  AnalysisResult,
  AnalysisSuccess,
  AnalysisViews,
  HarmonicResult,
  Recipe,
  TableBin,
} from '@/lib/analysis/types'
import type { Note } from '@/lib/schemas/api'
import { defaultRecipe } from '@/lib/schemas/recipe'

/*
 * A made-up outcome, written by hand and not by the numerical core: tests of words, pictures and screens need figures that
 * stay put when the core changes. The worm is that of an invented mount with a wheel of 152 teeth.
 */

const PERIOD_SECONDS = 567.28
const DURATION_SECONDS = 3412.5
const CADENCE_SECONDS = 2.5
const DRIFT_RATE = 0.351 / 60
const TERMS = [
  { order: 1, amplitude: 7.35, phaseDegrees: 31, stderr: 0.042, phaseStderr: 0.33 },
  { order: 2, amplitude: 1.75, phaseDegrees: 102, stderr: 0.042, phaseStderr: 1.4 },
  { order: 3, amplitude: 0.61, phaseDegrees: 329, stderr: 0.043, phaseStderr: 4 },
  { order: 4, amplitude: 0.27, phaseDegrees: 113, stderr: 0.041, phaseStderr: 8.8 },
]
const LINES = [
  { source: 'belt', periodSeconds: 869.8, periodStderr: 4.1, order: 0.652, orderStderr: 0.003, amplitude: 0.6 },
  {
    source: 'motor pulley',
    periodSeconds: 207.6,
    periodStderr: 0.22,
    order: 2.732,
    orderStderr: 0.003,
    amplitude: 0.75,
  },
]
const GAP = { startSeconds: 1490, endSeconds: 1546 }
const STRAYS = [
  { timeSeconds: 527.5, arcsec: 10.4 },
  { timeSeconds: 1832.5, arcsec: 11.4 },
  { timeSeconds: 2972.5, arcsec: 30.6 },
]

const radians = (degrees: number) => (degrees * Math.PI) / 180

function wormArcsec(angleDegrees: number): number {
  return TERMS.reduce(
    (sum, term) => sum + term.amplitude * Math.cos(radians(term.order * angleDegrees - term.phaseDegrees)),
    0,
  )
}

function linesArcsec(timeSeconds: number): number {
  return LINES.reduce(
    (sum, line) => sum + line.amplitude * Math.cos((2 * Math.PI * timeSeconds) / line.periodSeconds),
    0,
  )
}

/** Repeatable unevenness that stands in for seeing, about 0.3″ RMS. */
function unevenness(step: number): number {
  const x = Math.sin(step * 12.9898) * 43758.5453
  return (x - Math.floor(x) - 0.5) * 1.04
}

const driftArcsec = (timeSeconds: number) => 1 + DRIFT_RATE * timeSeconds

export function exampleRecipe(): Recipe {
  const base = defaultRecipe()
  return {
    ...base,
    conversion: {
      ...base.conversion,
      displacementUnit: 'px',
      imageScaleArcsecPerPx: 1.55,
      imageScaleUncertaintyPercent: 1,
      declinationDegrees: 8.9,
      declinationUncertaintyDegrees: 0.1,
      senseBasis: 'proven',
      exposureSeconds: 2,
    },
    driveTrain: {
      axisKind: 'worm',
      wheelTeeth: 152,
      wormStarts: 1,
      stages: [{ kind: 'belt', name: 'belt', drivenTeeth: 60, drivingTeeth: 22, beltTeeth: 90 }],
    },
    table: { ...base.table, binCount: 48 },
  }
}

function harmonics(): HarmonicResult[] {
  return TERMS.map((term) => ({
    order: term.order,
    periodSeconds: PERIOD_SECONDS / term.order,
    amplitudeArcsec: { value: term.amplitude, stderr: term.stderr },
    phaseDegrees: { value: term.phaseDegrees, stderr: term.phaseStderr },
    isPhaseMeaningful: true,
    cosArcsec: term.amplitude * Math.cos(radians(term.phaseDegrees)),
    sinArcsec: term.amplitude * Math.sin(radians(term.phaseDegrees)),
    covarianceArcsec2: [term.stderr ** 2, 0.1 * term.stderr ** 2, (1.1 * term.stderr) ** 2],
  }))
}

function bins(): TableBin[] {
  return Array.from({ length: 48 }, (_, index) => ({
    index,
    angleDegrees: (index * 360) / 48,
    value: -wormArcsec((index * 360) / 48),
  }))
}

export function exampleResult(): AnalysisResult {
  return {
    engineVersion: '0.1.0',
    rows: 1343,
    used: 1340,
    leftOut: [{ reason: 'stray', count: 3 }],
    run: {
      durationSeconds: DURATION_SECONDS,
      medianCadenceSeconds: CADENCE_SECONDS,
      firstUsedTimeSeconds: 0,
      lastUsedTimeSeconds: DURATION_SECONDS,
      turns: DURATION_SECONDS / PERIOD_SECONDS,
      gaps: [GAP],
      finestSplitOrders: PERIOD_SECONDS / DURATION_SECONDS,
      shortestPeriodSeconds: 5,
    },
    drift: {
      degree: 1,
      coefficients: [{ value: DRIFT_RATE, stderr: 0.002 / 60 }],
      rateArcsecPerSecond: { value: DRIFT_RATE, stderr: 0.002 / 60 },
      percentOfSidereal: (100 * DRIFT_RATE) / 15.041068645644,
    },
    worm: {
      periodSeconds: { value: PERIOD_SECONDS, stderr: 0.27 },
      periodSource: 'fitted',
      fittedPeriodSeconds: null,
      gearPeriodSeconds: 566.86901645,
      harmonics: harmonics(),
      peakToPeakArcsec: { value: 16.02, stderr: 0.13 },
      rmsArcsec: 5.37,
      steepestRateArcsecPerSecond: { value: 0.1221, stderr: 0.0011 },
      furthestAheadDegrees: 33,
      furthestAheadArcsec: 8.6,
      furthestBehindDegrees: 174,
      furthestBehindArcsec: -7.42,
      fundamentalPowerShare: 0.9404,
    },
    wormReason: null,
    wormPeriodIntervalSeconds: null,
    modelChoice: {
      candidates: [1, 2, 3, 4, 5].map((harmonicCount) => ({
        driftDegree: 1,
        harmonicCount,
        bic: [900, 120, -380, -460, -452][harmonicCount - 1],
        residualRmsArcsec: [1.5, 0.74, 0.58, 0.5, 0.5][harmonicCount - 1],
      })),
      isDegreeChosenByEvidence: true,
      isCountChosenByEvidence: true,
      nextHarmonicProbability: 0.41,
    },
    lines: LINES.map((line) => ({
      periodSeconds: { value: line.periodSeconds, stderr: line.periodStderr },
      frequencyHz: { value: 1 / line.periodSeconds, stderr: line.periodStderr / line.periodSeconds ** 2 },
      order: { value: line.order, stderr: line.orderStderr },
      amplitudeArcsec: { value: line.amplitude, stderr: 0.042 },
      phaseDegrees: { value: 0, stderr: 4 },
      falseAlarmProbability: 1e-12,
      signalToNoise: 14,
      source: line.source,
      isUnresolved: false,
    })),
    predictedOrders: [
      { name: 'worm', order: 1, periodSeconds: 566.86901645 },
      { name: 'belt', order: 60 / 90, periodSeconds: 850.30352467 },
      { name: 'motor pulley', order: 60 / 22, periodSeconds: 207.8519727 },
      { name: 'belt teeth', order: 60, periodSeconds: 9.4478169408 },
    ],
    residual: {
      rmsArcsec: 0.5,
      lagOneCorrelation: 0.61,
      correctedLagOneCorrelation: 0.63,
      effectiveSampleCount: 304,
      seeingFloorArcsec: 0.28,
      isSeeingFloorLowerBound: true,
    },
    errorModel: 'ar1',
    turn: {
      completeTurns: 6,
      repeatability: 0.99,
      rmsShareLeft: 0.1,
      predictions: [
        [5.18, 0.46],
        [5.36, 0.36],
        [5.41, 0.38],
        [5.38, 0.35],
        [5.47, 0.44],
        [5.49, 0.41],
      ].map(([rmsBeforeArcsec, rmsLeftArcsec], index) => ({ turnNumber: index + 1, rmsBeforeArcsec, rmsLeftArcsec })),
      predictiveShare: 0.9944,
      heldOutReduction: 0.925,
      scatter: 0.021,
    },
    spans: {
      rawArcsec: 33.2,
      afterDriftArcsec: 19.9,
      afterWormArcsec: 4.9,
      afterLinesArcsec: 3.3,
      rawWithoutWormArcsec: 22.5,
      driftArcsec: 19.9,
      wormArcsec: 16.02,
    },
    rate: {
      steepestArcsecPerSecond: 0.1221,
      steepestWithDriftArcsecPerSecond: 0.1549,
      percentOfSidereal: 0.81,
      longestCorrectionIntervalSeconds: 16.4,
      framesKeptShare: 0.21,
      toleranceAxisArcsec: 2.02,
    },
    table: {
      bins: bins(),
      settings: exampleRecipe().table,
      orders: [1, 2, 3, 4],
      wormPeriodSeconds: PERIOD_SECONDS,
      originTimeSeconds: 0,
      closureError: 2.2e-15,
      largestRateArcsecPerSecond: 0.1219,
      rehearsal: {
        orders: TERMS.map((term) => ({
          order: term.order,
          beforeArcsec: term.amplitude,
          afterArcsec: term.amplitude * 0.005 * term.order ** 2,
          isIncluded: true,
        })),
        peakToPeakBeforeArcsec: 16.02,
        peakToPeakAfterArcsec: 0.12,
        heldOutReduction: 0.925,
        slipForTenPercentDegrees: 5.73,
        slipForNoHelpDegrees: 60,
        binningLossShare: 0.023,
      },
    },
    tableReason: null,
    scaleUncertaintyPercent: 1,
    declination: null,
    warnings: [],
  }
}

export function exampleViews(): AnalysisViews {
  const timeSeconds: number[] = []
  const recordedArcsec: number[] = []
  for (let step = 0; step * CADENCE_SECONDS <= DURATION_SECONDS; step += 1) {
    const time = step * CADENCE_SECONDS
    const isInGap = time >= GAP.startSeconds && time <= GAP.endSeconds
    timeSeconds.push(time)
    const angle = (360 * time) / PERIOD_SECONDS
    recordedArcsec.push(isInGap ? NaN : driftArcsec(time) + wormArcsec(angle) + linesArcsec(time) + unevenness(step))
  }
  const modelTimes = Array.from({ length: 1201 }, (_, i) => (i * DURATION_SECONDS) / 1200)
  const frequencies = Array.from({ length: 1500 }, (_, i) => (1 / 1800) * 270 ** (i / 1499))
  const angles = Array.from({ length: 361 }, (_, i) => i)
  return {
    track: {
      timeSeconds: Float64Array.from(timeSeconds),
      recordedArcsec: Float64Array.from(recordedArcsec),
      modelTimeSeconds: Float64Array.from(modelTimes),
      fittedArcsec: Float64Array.from(
        modelTimes,
        (t) => driftArcsec(t) + wormArcsec((360 * t) / PERIOD_SECONDS) + linesArcsec(t),
      ),
      driftArcsec: Float64Array.from(modelTimes, driftArcsec),
      strayTimeSeconds: Float64Array.from(STRAYS, (stray) => stray.timeSeconds),
      strayArcsec: Float64Array.from(STRAYS, (stray) => stray.arcsec),
      turnStartSeconds: [0, 1, 2, 3, 4, 5, 6].map((turn) => turn * PERIOD_SECONDS),
    },
    spectrum: {
      frequencyHz: Float64Array.from(frequencies),
      beforeArcsec: Float64Array.from(frequencies, spectrumBefore),
      afterArcsec: Float64Array.from(frequencies, spectrumAfter),
      chanceArcsec: Float64Array.from(frequencies, (f) => 0.19 / Math.sqrt(1 + (f / 0.05) ** 2)),
    },
    turn: {
      angleDegrees: Float64Array.from(angles),
      curveArcsec: Float64Array.from(angles, wormArcsec),
      turns: [1, 2, 3, 4, 5, 6].map((turnNumber) => ({
        turnNumber,
        angleDegrees: Float64Array.from({ length: 91 }, (_, i) => i * 4),
        arcsec: Float64Array.from({ length: 91 }, (_, i) => wormArcsec(i * 4) + 1.1 * unevenness(turnNumber * 97 + i)),
      })),
      tableArcsec: Float64Array.from(angles, (angle) => -wormArcsec(angle)),
    },
    slip: {
      slipDegrees: Float64Array.from({ length: 361 }, (_, i) => i - 180),
      shareLeft: Float64Array.from({ length: 361 }, (_, i) => 2 * Math.abs(Math.sin(radians(i - 180) / 2))),
    },
  }
}

export function exampleOutcome(): AnalysisSuccess {
  return { ok: true, result: exampleResult(), views: exampleViews() }
}

export function exampleNotes(): Note[] {
  const common = {
    version: 1,
    analysisId: '6f0c5a1e-6a52-4c54-9d3e-2f6b7f3c9a10',
    authorId: '0b1f8a52-3f0e-4a8f-8a55-57a1d6a5b0c2',
    authorName: 'Mira',
    createdAt: '2031-11-15T19:20:00.000Z',
    updatedAt: '2031-11-15T19:20:00.000Z',
    updatedByName: 'Mira',
    mentions: [],
    resolvedAt: null,
    resolvedByName: null,
  }
  return [
    {
      ...common,
      id: '3d2b9a0c-7d60-4f2b-8f0a-3a1f5a0e7b11',
      anchor: { kind: 'time', timeSeconds: 1490 },
      text: 'Cloud took the guide star for a minute; left out by hand.',
    },
    {
      ...common,
      id: '3d2b9a0c-7d60-4f2b-8f0a-3a1f5a0e7b12',
      anchor: { kind: 'period', periodSeconds: 207.6 },
      text: 'Grub screw of the motor pulley was loose in spring.',
    },
    {
      ...common,
      id: '3d2b9a0c-7d60-4f2b-8f0a-3a1f5a0e7b13',
      anchor: { kind: 'worm-angle', angleDegrees: 214 },
      text: 'The knee here is on every run since 2029.',
    },
    { ...common, id: '3d2b9a0c-7d60-4f2b-8f0a-3a1f5a0e7b14', anchor: { kind: 'whole' }, text: 'Steady air, no wind.' },
  ]
}

function peak(frequencyHz: number, centreHz: number, amplitude: number): number {
  const x = Math.PI * (frequencyHz - centreHz) * DURATION_SECONDS
  return Math.abs(x) < 1e-9 ? amplitude : (amplitude * Math.abs(Math.sin(x))) / Math.abs(x)
}

function spectrumAfter(frequencyHz: number): number {
  const ripple = 0.55 + 0.45 * Math.sin(frequencyHz * DURATION_SECONDS * 3.1 + 2 * Math.sin(frequencyHz * 9000))
  return 0.004 + (0.11 / Math.sqrt(1 + (frequencyHz / 0.04) ** 2)) * Math.abs(ripple)
}

function spectrumBefore(frequencyHz: number): number {
  const worm = TERMS.reduce((sum, term) => sum + peak(frequencyHz, term.order / PERIOD_SECONDS, term.amplitude), 0)
  const others = LINES.reduce((sum, line) => sum + peak(frequencyHz, 1 / line.periodSeconds, line.amplitude), 0)
  return spectrumAfter(frequencyHz) + worm + others
}

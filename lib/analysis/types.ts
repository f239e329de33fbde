/**
 * The words of the numerical core: what goes in, what comes out, and the conventions that every step keeps.
 *
 * Sign. An RA tracking error e is in arc seconds of axis; e > 0 means that the axis is ahead (too far west, the drive ran
 * fast). The correction to apply is −e.
 *
 * Phase. One harmonic is A cos(kθ − φ) = a cos kθ + b sin kθ with θ = 2π(t − t_ref)/P; A is half of its peak-to-peak.
 * Stored and exchanged phases refer to the first used sample (t_ref = firstUsedTimeSeconds) and lie in [0°, 360°).
 *
 * Units. Seconds, arc seconds, arc seconds per second, degrees, hertz. No frequency is angular unless its name says so.
 *
 * Absence. A quantity that cannot be had is null, with a reason word or a warning; no result is ever NaN or infinite.
 */

/** Why a quantity cannot be had; the same words everywhere, shown to people through lib/findings. */
export type Reason =
  'few-points' | 'short-run' | 'not-finite' | 'not-increasing' | 'singular' | 'out-of-range' | 'no-period' | 'no-index'

export interface Failure {
  ok: false
  reason: Reason
  needed?: number
  got?: number
}

/** A figure and its standard error in the same unit; stderr is null where none can be given. */
export interface Estimate {
  value: number
  stderr: number | null
}

// ---------------------------------------------------------------------------------------------------------------------
// What goes in

/** Columns of one run as they were read, all of equal length N, in the units of the file (see Conversion). */
export interface RunColumns {
  /** Seconds since the first row that was read. */
  timeSeconds: Float64Array
  /** Displacement in right ascension, in Conversion.displacementUnit. NaN where the cell was missing. */
  displacement: Float64Array
  /** Displacement in declination, in the same unit, or null when no such column was chosen. */
  declinationDisplacement: Float64Array | null
  /** Mechanical worm angle in degrees as recorded (it may wrap), or null. */
  wormAngleDegrees: Float64Array | null
}

/** How recorded displacement becomes tracking error on the axis (see convert.ts). */
export interface Conversion {
  displacementUnit: 'px' | 'arcsec' | 'ra-seconds'
  /** Needed for px only. */
  imageScaleArcsecPerPx: number | null
  /** Type-B uncertainty of the image scale in percent; kept apart from random errors. */
  imageScaleUncertaintyPercent: number | null
  /** Declination of the field; needed for px and arcsec on the sky. */
  declinationDegrees: number | null
  declinationUncertaintyDegrees: number | null
  /** px and arcsec are on the sky (divided by cos δ) unless said to be on the axis; RA seconds are on the axis. */
  frame: 'sky' | 'axis'
  /** What a growing recorded value means for the axis. */
  positiveMeans: 'ahead' | 'behind'
  senseBasis: 'proven' | 'assumed'
  exposureSeconds: number | null
  timeStamp: 'start' | 'mid' | 'end'
}

export interface ExcludedSpan {
  startSeconds: number
  endSeconds: number
}

/** One stage upstream of the worm (see gear-train.ts). Stages are listed from the worm towards the motor. */
export type GearStage =
  | { kind: 'gear-pair'; name: string; drivenTeeth: number; drivingTeeth: number }
  | { kind: 'belt'; name: string; drivenTeeth: number; drivingTeeth: number; beltTeeth: number }

export interface DriveTrain {
  axisKind: 'worm'
  /** Teeth of the worm wheel; null when unknown. */
  wheelTeeth: number | null
  wormStarts: number
  stages: GearStage[]
}

/** A part of the drive train and the order (cycles per worm turn) that it predicts. */
export interface PredictedOrder {
  name: string
  order: number
  periodSeconds: number
}

export type WindowName = 'rectangular' | 'hann' | 'hamming' | 'blackman' | 'blackman-harris' | 'flat-top'

export interface KaiserWindow {
  kind: 'kaiser'
  /** β = πα, 0 … 20: the larger, the lower the side lobes and the wider a line. */
  beta: number
}

export type SpectrumWindow = WindowName | KaiserWindow

export interface TableSettings {
  /** 8 … 4096. */
  binCount: number
  quantity: 'position' | 'rate'
  /** Unit of the written values: arcsec for position; arcsec-per-second or percent-sidereal for rate. */
  unit: 'arcsec' | 'arcsec-per-second' | 'percent-sidereal'
  /** 'correction': what the axis should do; 'error': what it does wrong. */
  meaning: 'correction' | 'error'
  /** Whether the listed worm angle grows or falls with time. */
  angleDirection: 'increasing' | 'decreasing'
  origin: { kind: 'run-start' } | { kind: 'index-time'; timeSeconds: number } | { kind: 'worm-angle-column' }
  /** Added to the angle of every bin. */
  offsetDegrees: number
  /** 'default': amplitude ≥ 3 standard errors and, from three turns, useful on left-out turns. */
  orders: 'default' | number[]
  /** Share of the error taken out, normally 1. */
  gain: number
  /** How the device plays the table. */
  playback: 'interpolated' | 'held-from-start' | 'held-at-centre'
}

/** Everything that decides the figures of an analysis; saved with it, kept in the address bar, undone and redone. */
export interface Recipe {
  version: 1
  conversion: Conversion
  excludedSpans: ExcludedSpan[]
  isStrayPointFilterOn: boolean
  driftDegree: 'auto' | 0 | 1 | 2 | 3
  driveTrain: DriveTrain
  /** 'fitted': P free (needs three turns); 'gear': held at the drive train's value; 'typed': held at typedPeriodSeconds. */
  wormPeriod: 'fitted' | 'gear' | 'typed'
  typedPeriodSeconds: number | null
  harmonicCount: 'auto' | number
  /** Look for lines that are not harmonics of the worm. */
  isLineSearchOn: boolean
  /** False-alarm probability that a line must stay under, e.g. 0.001. */
  chanceLevel: number
  spectrumWindow: SpectrumWindow
  /** Peak motion on the sky that a picture tolerates. */
  toleranceSkyArcsec: number
  /** Exposure of the pictures whose share within the tolerance is wanted. */
  pictureExposureSeconds: number
  table: TableSettings
}

// ---------------------------------------------------------------------------------------------------------------------
// Between the steps

/** Evenly or unevenly sampled tracking error on the axis; time strictly increases and every value is finite. */
export interface Track {
  /** Mid-exposure, seconds since the first row of the run. */
  timeSeconds: Float64Array
  raArcsec: Float64Array
}

/** a cos kθ + b sin kθ, in arc seconds of axis. */
export interface HarmonicCoefficients {
  order: number
  cosArcsec: number
  sinArcsec: number
}

/** Progress of a long computation, reported every 20 ms or so. */
export interface Progress {
  /** What is being computed, in words for the progress bar. */
  stage: 'reading' | 'cleaning' | 'searching' | 'fitting' | 'lines' | 'folding' | 'correcting'
  /** 0 … 1 within the whole analysis. */
  fraction: number
}

// ---------------------------------------------------------------------------------------------------------------------
// What comes out: figures (saved as JSON) and views (drawn, never saved)

export interface LeftOutCount {
  reason: 'missing' | 'not-finite' | 'repeated-time' | 'excluded' | 'stray'
  count: number
}

export interface HarmonicResult {
  order: number
  periodSeconds: number
  amplitudeArcsec: Estimate
  /** At the first used sample; null value is never given: where A < 3 standard errors, isPhaseMeaningful is false. */
  phaseDegrees: Estimate
  isPhaseMeaningful: boolean
  /** Coefficients at the first used sample, and their covariance [aa, ab, bb] in arcsec². */
  cosArcsec: number
  sinArcsec: number
  covarianceArcsec2: [number, number, number]
}

export interface WormResult {
  periodSeconds: Estimate
  periodSource: 'fitted' | 'gear' | 'typed'
  /** P as the record alone gives it, when the reported one is held fixed and three turns are there. */
  fittedPeriodSeconds: Estimate | null
  /** What the drive train predicts; null when the teeth are unknown. */
  gearPeriodSeconds: number | null
  harmonics: HarmonicResult[]
  peakToPeakArcsec: Estimate
  rmsArcsec: number
  steepestRateArcsecPerSecond: Estimate
  /** Worm angle (degrees from the first used sample) at which the axis is furthest ahead and furthest behind. */
  furthestAheadDegrees: number
  furthestAheadArcsec: number
  furthestBehindDegrees: number
  furthestBehindArcsec: number
  /** Share of the periodic part's power (sum of A²) carried by the fundamental, 0 … 1. */
  fundamentalPowerShare: number
}

export interface LineResult {
  periodSeconds: Estimate
  frequencyHz: Estimate
  /** Swings per worm turn; null without a worm period. */
  order: Estimate | null
  amplitudeArcsec: Estimate
  phaseDegrees: Estimate
  falseAlarmProbability: number
  signalToNoise: number
  /** Name of the part of the drive train whose predicted order lies within the line's uncertainty; null: unexplained. */
  source: string | null
  /** Closer to another line or harmonic than the record can resolve. */
  isUnresolved: boolean
}

export interface ModelCandidate {
  driftDegree: number
  harmonicCount: number
  bic: number
  residualRmsArcsec: number
}

export interface ModelChoice {
  candidates: ModelCandidate[]
  isDegreeChosenByEvidence: boolean
  isCountChosenByEvidence: boolean
  /** p of the F-test that one more harmonic explains nothing but noise; null where it could not be made. */
  nextHarmonicProbability: number | null
}

export interface TurnPrediction {
  /** 1, 2, … counted from the first used sample. */
  turnNumber: number
  rmsBeforeArcsec: number
  rmsLeftArcsec: number
}

export interface TurnResult {
  completeTurns: number
  /** Adjusted share of variance explained by phase (Stellingwerf 1978, ApJ 224, 953), 0 … 1. */
  repeatability: number
  /** √(1 − repeatability): share of the RMS that a perfect table leaves. */
  rmsShareLeft: number
  /** Empty when fewer than three turns can be left out. */
  predictions: TurnPrediction[]
  /** Q² and 1 − √(1 − Q²); null with fewer than three turns. */
  predictiveShare: number | null
  heldOutReduction: number | null
  /** Turn-to-turn scatter of the fundamental relative to its amplitude; null with fewer than two turns. */
  scatter: number | null
}

export interface SpanResult {
  rawArcsec: number
  afterDriftArcsec: number
  afterWormArcsec: number
  afterLinesArcsec: number
  /** Span of the raw track with the worm's periodic part taken away, and the drift's own span. */
  rawWithoutWormArcsec: number
  driftArcsec: number
  wormArcsec: number
}

export interface RateResult {
  /** Worm alone, and worm plus drift and lines (worst case). */
  steepestArcsecPerSecond: number
  steepestWithDriftArcsecPerSecond: number
  percentOfSidereal: number
  /** Longest time between guide corrections for the tolerance, in seconds; null: never needed within a turn. */
  longestCorrectionIntervalSeconds: number | null
  /** Share of pictures of the given exposure whose motion stays within the tolerance, 0 … 1. */
  framesKeptShare: number
  toleranceAxisArcsec: number
}

export interface ResidualResult {
  rmsArcsec: number
  lagOneCorrelation: number
  /** Lag-one correlation with the fit's pull removed, r_c of noise-model.ts. */
  correctedLagOneCorrelation: number
  effectiveSampleCount: number
  seeingFloorArcsec: number
  isSeeingFloorLowerBound: boolean
}

/** One row of the correction table. */
export interface TableBin {
  index: number
  angleDegrees: number
  value: number
}

export interface TableRehearsal {
  /** Per order: amplitude before, after playing the table as written, both in arcsec. */
  orders: { order: number; beforeArcsec: number; afterArcsec: number; isIncluded: boolean }[]
  peakToPeakBeforeArcsec: number
  peakToPeakAfterArcsec: number
  /** Periodic part plus noise on turns that the table was not made from; null with fewer than three turns. */
  heldOutReduction: number | null
  /** Slip (degrees of worm angle) at which a tenth of the fundamental is back, and at which the table stops helping. */
  slipForTenPercentDegrees: number
  slipForNoHelpDegrees: number
  /** Largest share of any included harmonic lost to the number of bins and to playback, 0 … 1. */
  binningLossShare: number
}

export interface TableResult {
  bins: TableBin[]
  settings: TableSettings
  orders: number[]
  wormPeriodSeconds: number
  /** Time at which worm angle is zero, seconds since the first row of the run. */
  originTimeSeconds: number
  /** Sum of the written rates, or last position step back to the first: zero to rounding. */
  closureError: number
  largestRateArcsecPerSecond: number
  rehearsal: TableRehearsal
}

export interface AnalysisWarning {
  /** A reason word, or one of the words listed in lib/analysis/warnings.ts. */
  code: string
  /** Numbers that the sentence needs; the wording is made by lib/findings. */
  details: Record<string, number | string>
}

export type ErrorModel = 'white' | 'ar1' | 'power-law' | 'local-spectrum'

export interface AnalysisResult {
  engineVersion: string
  rows: number
  used: number
  leftOut: LeftOutCount[]
  run: {
    durationSeconds: number
    medianCadenceSeconds: number
    firstUsedTimeSeconds: number
    lastUsedTimeSeconds: number
    /** Turns of the worm covered; null without a period. */
    turns: number | null
    gaps: ExcludedSpan[]
    /** Orders that two lines must lie apart to be told apart: P/T. */
    finestSplitOrders: number | null
    /** Shortest period that cadence and exposure allow. */
    shortestPeriodSeconds: number
  }
  drift: {
    degree: number
    /** Of (t − t_mid)^1, ^2, ^3 in ″/s, ″/s², ″/s³; t_mid is the mean of first and last used time. */
    coefficients: Estimate[]
    /** At t_mid, ″/s. */
    rateArcsecPerSecond: Estimate
    percentOfSidereal: number
  }
  /** Null with a reason where there is no worm figure; the interval is what the record allows instead. */
  worm: WormResult | null
  wormReason: Reason | null
  wormPeriodIntervalSeconds: [number, number] | null
  modelChoice: ModelChoice | null
  lines: LineResult[]
  predictedOrders: PredictedOrder[]
  residual: ResidualResult
  /** Which estimate of noise-model.ts gave the largest, hence reported, standard error of the fundamental. */
  errorModel: ErrorModel
  turn: TurnResult | null
  spans: SpanResult
  rate: RateResult
  table: TableResult | null
  tableReason: Reason | null
  /** u_scale and declination in quadrature, percent; null when not given. */
  scaleUncertaintyPercent: number | null
  declination: { rmsArcsec: number; driftArcsecPerSecond: number } | null
  warnings: AnalysisWarning[]
}

/** Decimated curves for the pictures; NaN breaks a line. At most some thousand points each. */
export interface AnalysisViews {
  track: {
    timeSeconds: Float64Array
    recordedArcsec: Float64Array
    modelTimeSeconds: Float64Array
    fittedArcsec: Float64Array
    driftArcsec: Float64Array
    strayTimeSeconds: Float64Array
    strayArcsec: Float64Array
    turnStartSeconds: number[]
  }
  spectrum: {
    frequencyHz: Float64Array
    beforeArcsec: Float64Array
    afterArcsec: Float64Array
    /** Amplitude that chance alone reaches with the recipe's probability, on the same frequencies. */
    chanceArcsec: Float64Array
  }
  /** Null without a worm period. */
  turn: {
    angleDegrees: Float64Array
    curveArcsec: Float64Array
    turns: { turnNumber: number; angleDegrees: Float64Array; arcsec: Float64Array }[]
    /** Harmonic fit only, on angleDegrees, and the table's values as played. */
    tableArcsec: Float64Array | null
  } | null
  /** Slip chart: share of the periodic part's RMS left against slip in degrees. */
  slip: { slipDegrees: Float64Array; shareLeft: Float64Array } | null
}

export interface AnalysisSuccess {
  ok: true
  result: AnalysisResult
  views: AnalysisViews
}

export type AnalysisOutcome = AnalysisSuccess | Failure

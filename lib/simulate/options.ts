import type { Conversion } from '@/lib/analysis/types'

/** A cos(kθ − φ) in arc seconds of axis; θ is the worm's angle from its index mark, growing with time. */
export interface SimulatedHarmonic {
  /** k: whole cycles per turn of the worm. */
  order: number
  amplitudeArcsec: number
  phaseDegrees: number
}

/** A part that does not close with the worm: A cos(2πft − φ), f = order / worm period, t from the start of the run. */
export interface SimulatedGear {
  name: string
  /** Cycles per turn of the worm; any positive number. */
  order: number
  amplitudeArcsec: number
  phaseDegrees: number
}

/** Motion of the star by the air, per frame and as seen on the sky; it is not averaged any further by the exposure. */
export interface SimulatedSeeing {
  /** Standard deviation of the part that is new in every frame. */
  whiteSkyArcsec: number
  /** Standard deviation of the part that lives on from frame to frame: correlation exp(−Δt/τ), an AR(1) process. */
  correlatedSkyArcsec: number
  /** τ of that part. */
  correlationSeconds: number
}

export interface SimulatedGap {
  startSeconds: number
  endSeconds: number
}

export interface SimulatedStrayPoint {
  /** The frame nearest to this time is hit. */
  atSeconds: number
  offsetSkyArcsec: number
}

/** A star switch or a bumped tube: everything from this time on is displaced on the axis. */
export interface SimulatedStep {
  atSeconds: number
  heightArcsec: number
}

/** A cell that the recorder left empty: the frame nearest to this time has no displacement. */
export interface SimulatedMissingCell {
  atSeconds: number
}

export interface SimulatedDeclination {
  driftSkyArcsecPerSecond: number
  seeing: SimulatedSeeing
}

/** Everything that decides one simulated run. Times count from the start of the run, before any row is lost. */
export interface SimulationOptions {
  wheelTeeth: number
  wormStarts: number
  harmonics: SimulatedHarmonic[]
  gears: SimulatedGear[]
  /** c_1, c_2, … of Σ c_j t^j: arc seconds of axis per second, per second², … */
  driftCoefficients: number[]
  seeing: SimulatedSeeing
  /**
   * Standard deviation, in arc seconds of axis, by which the cosine and the sine of the fundamental differ from turn to
   * turn; they run linearly between their values at the turns.
   */
  turnWanderArcsec: number
  cadenceSeconds: number
  /** Standard deviation of a frame's start about the even beat, cut at 0.4 of the cadence so that time never goes back. */
  cadenceJitterSeconds: number
  durationSeconds: number
  /** Worm angle, from its index mark, at the start of the run. */
  startWormAngleDegrees: number
  gaps: SimulatedGap[]
  strayPoints: SimulatedStrayPoint[]
  steps: SimulatedStep[]
  missingCells: SimulatedMissingCell[]
  /** Unit, frame, sense, declination, image scale, exposure and time stamps of what is recorded. */
  conversion: Conversion
  /** Recorded displacements are whole multiples of this, in the recorded unit; 0 leaves them as they are. */
  quantum: number
  /** Records the declination beside it when not null. */
  declination: SimulatedDeclination | null
  /** Records the worm's angle beside it, in whole multiples of this many degrees (0: exactly); null: no such column. */
  wormAngleQuantumDegrees: number | null
  /** An unsigned 32-bit whole number; equal options give equal runs. */
  seed: number
}

export const STILL_AIR: SimulatedSeeing = { whiteSkyArcsec: 0, correlatedSkyArcsec: 0, correlationSeconds: 1 }

/** Displacement in arc seconds of axis, growing when the axis is ahead: what is recorded is the tracking error itself. */
export function axisArcsecConversion(exposureSeconds: number | null = null): Conversion {
  return {
    displacementUnit: 'arcsec',
    imageScaleArcsecPerPx: null,
    imageScaleUncertaintyPercent: null,
    declinationDegrees: null,
    declinationUncertaintyDegrees: null,
    frame: 'axis',
    positiveMeans: 'ahead',
    senseBasis: 'proven',
    exposureSeconds,
    timeStamp: 'mid',
  }
}

type Required = 'wheelTeeth' | 'harmonics' | 'cadenceSeconds' | 'durationSeconds'

/** Options of a perfect recording (no noise, no drift, nothing lost), changed by what is given. */
export function simulationOptions(
  given: Pick<SimulationOptions, Required> & Partial<Omit<SimulationOptions, Required>>,
): SimulationOptions {
  return {
    wormStarts: 1,
    gears: [],
    driftCoefficients: [],
    seeing: STILL_AIR,
    turnWanderArcsec: 0,
    cadenceJitterSeconds: 0,
    startWormAngleDegrees: 0,
    gaps: [],
    strayPoints: [],
    steps: [],
    missingCells: [],
    conversion: axisArcsecConversion(),
    quantum: 0,
    declination: null,
    wormAngleQuantumDegrees: null,
    seed: 12345,
    ...given,
  }
}

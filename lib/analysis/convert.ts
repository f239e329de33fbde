import { IMAGE_SCALE_FACTOR } from './constants'
import { failure } from './failure'
import type { Conversion, Failure, RunColumns, Track } from './types'

/** Seconds of right ascension to arc seconds of axis. */
const ARCSEC_PER_RA_SECOND = 15

/** From here on a sky displacement says too little about the axis (1/cos δ > 57). */
export const DECLINATION_LIMIT_DEGREES = 89

/** Noise is magnified more than 5.76 times beyond this declination: warn. */
export const DECLINATION_WARNING_DEGREES = 80

export interface ConvertedRun {
  ok: true
  /** Tracking error on the axis; may still hold NaN where a cell was missing (see cleanTrack). */
  track: Track
  /** Declination displacement in arc seconds of sky, signs as recorded. */
  declinationArcsec: Float64Array | null
  /** Arc seconds of axis per recorded unit, with the sign of the sense. */
  axisArcsecPerUnit: number
  /** What was added to the time stamps. */
  timeShiftSeconds: number
  /** Stamps mark start or end of an exposure of unknown length, so that they stand uncorrected. */
  isTimeStampUncorrected: boolean
}

/**
 * Image scale s = 206.264806·p·b/F in arc seconds per pixel: pixel size in µm, focal length in mm.
 *
 * @returns `out-of-range` unless all three are positive and finite
 */
export function imageScale(optics: {
  pixelSizeMicrometres: number
  binning: number
  focalLengthMillimetres: number
}): { ok: true; arcsecPerPx: number } | Failure {
  const { pixelSizeMicrometres, binning, focalLengthMillimetres } = optics
  const isUsable = [pixelSizeMicrometres, binning, focalLengthMillimetres].every((x) => Number.isFinite(x) && x > 0)
  if (!isUsable) return failure('out-of-range')
  return { ok: true, arcsecPerPx: (IMAGE_SCALE_FACTOR * pixelSizeMicrometres * binning) / focalLengthMillimetres }
}

/** cos δ for a displacement on the sky along RA; `out-of-range` at |δ| ≥ 89° or when δ is not known. */
function skyFactor(declinationDegrees: number | null): { ok: true; factor: number } | Failure {
  if (declinationDegrees === null || !Number.isFinite(declinationDegrees)) return failure('out-of-range')
  if (Math.abs(declinationDegrees) >= DECLINATION_LIMIT_DEGREES) return failure('out-of-range')
  return { ok: true, factor: 1 / Math.cos((declinationDegrees * Math.PI) / 180) }
}

/**
 * Recorded columns to tracking error e on the axis at mid-exposure. px and arc seconds lie on the sky (÷ cos δ) unless
 * the frame says axis; seconds of RA are axis already (× 15). e > 0: the axis is ahead, too far west.
 *
 * @returns `few-points` without rows; `out-of-range` for a missing or impossible scale or declination
 */
export function toTrack(columns: RunColumns, conversion: Conversion): ConvertedRun | Failure {
  const { timeSeconds, displacement, declinationDisplacement } = columns
  if (timeSeconds.length !== displacement.length) {
    throw new RangeError(`columns must be of equal length: got ${timeSeconds.length} and ${displacement.length}`)
  }
  if (timeSeconds.length === 0) return failure('few-points', { needed: 1, got: 0 })

  const { displacementUnit, imageScaleArcsecPerPx, frame, positiveMeans, exposureSeconds, timeStamp } = conversion
  let arcsecPerUnit = 1
  if (displacementUnit === 'px') {
    const scale = imageScaleArcsecPerPx ?? 0
    if (!Number.isFinite(scale) || scale <= 0) return failure('out-of-range')
    arcsecPerUnit = scale
  } else if (displacementUnit === 'ra-seconds') {
    arcsecPerUnit = ARCSEC_PER_RA_SECOND
  }

  let axisFactor = 1
  if (displacementUnit !== 'ra-seconds' && frame === 'sky') {
    const sky = skyFactor(conversion.declinationDegrees)
    if (!sky.ok) return sky
    axisFactor = sky.factor
  }
  const axisArcsecPerUnit = (positiveMeans === 'ahead' ? 1 : -1) * arcsecPerUnit * axisFactor

  const halfExposure = exposureSeconds === null ? 0 : exposureSeconds / 2
  const timeShiftSeconds = timeStamp === 'start' ? halfExposure : timeStamp === 'end' ? -halfExposure : 0

  return {
    ok: true,
    track: {
      timeSeconds: timeSeconds.map((t) => t + timeShiftSeconds),
      raArcsec: displacement.map((d) => d * axisArcsecPerUnit),
    },
    declinationArcsec: declinationDisplacement?.map((d) => d * arcsecPerUnit) ?? null,
    axisArcsecPerUnit,
    timeShiftSeconds: timeShiftSeconds + 0,
    isTimeStampUncorrected: timeStamp !== 'mid' && exposureSeconds === null,
  }
}

/**
 * Type-B uncertainty of the whole run's scale in percent: that of the image scale and tan δ·σ_δ in quadrature. It
 * scales everything alike and is never mixed with the random errors. Null where nothing was said about it.
 */
export function scaleUncertaintyPercent(conversion: Conversion): number | null {
  const { displacementUnit, frame, imageScaleUncertaintyPercent, declinationDegrees } = conversion
  if (displacementUnit === 'ra-seconds') return null
  const scalePart = imageScaleUncertaintyPercent
  const declinationPart =
    frame === 'sky' && declinationDegrees !== null && conversion.declinationUncertaintyDegrees !== null
      ? 100 *
        Math.abs(Math.tan((declinationDegrees * Math.PI) / 180)) *
        ((conversion.declinationUncertaintyDegrees * Math.PI) / 180)
      : null
  if (scalePart === null && declinationPart === null) return null
  return Math.hypot(scalePart ?? 0, declinationPart ?? 0)
}

/** Three neighbouring complex bins of a transform, the highest in the middle. */
export interface PeakBins {
  left: readonly [re: number, im: number]
  centre: readonly [re: number, im: number]
  right: readonly [re: number, im: number]
}

/**
 * Vertex of the parabola through three equally spaced values, in steps from the middle one. On the logarithm of a
 * padded amplitude spectrum (8 times or more) it is accurate for any window.
 */
export function parabolaOffset(left: number, centre: number, right: number): number {
  const curvature = left - 2 * centre + right
  return curvature === 0 ? 0 : (0.5 * (left - right)) / curvature
}

/** Height of that parabola at its vertex. */
export function parabolaHeight(left: number, centre: number, right: number): number {
  return centre - 0.25 * (left - right) * parabolaOffset(left, centre, right)
}

/** Re[(X₋ − X₊)/(2X₀ − X₋ − X₊)]. */
function differenceRatio({ left, centre, right }: PeakBins): number {
  const upRe = left[0] - right[0]
  const upIm = left[1] - right[1]
  const downRe = 2 * centre[0] - left[0] - right[0]
  const downIm = 2 * centre[1] - left[1] - right[1]
  const squared = downRe * downRe + downIm * downIm
  return squared === 0 ? 0 : (upRe * downRe + upIm * downIm) / squared
}

/**
 * Where a line lies between unpadded bins of a rectangular window, in bins from the middle one.
 *
 * @see Jacobsen & Kootsookos (2007), IEEE Signal Process. Mag. 24(3), 123
 */
export function rectangularPeakOffset(bins: PeakBins): number {
  return differenceRatio(bins)
}

/**
 * The same for a Hann window: twice the ratio, exact for one line and N → ∞. The Hann transform falls as
 * 1/(δ(1 − δ²)), from which X₋ : X₀ : X₊ give δ directly.
 */
export function hannPeakOffset(bins: PeakBins): number {
  return 2 * differenceRatio(bins)
}

/** Amplitude of a line δ bins from the middle bin relative to the middle bin's, Hann window: πδ(1 − δ²)/sin πδ. */
export function hannAmplitudeFactor(offsetBins: number): number {
  const angle = Math.PI * offsetBins
  return angle === 0 ? 1 : (angle * (1 - offsetBins ** 2)) / Math.sin(angle)
}

export interface ErrorEllipse {
  /** Half axes, in the unit of the coefficients. */
  major: number
  minor: number
  /** Of the major axis, counter-clockwise from the first coordinate, in (−90, 90]. */
  angleDegrees: number
}

/** χ² of two degrees of freedom that 95 in 100 repeats stay below: −2 ln 0.05. */
export const CHI_SQUARE_95 = -2 * Math.log(0.05)

/**
 * Ellipse in which 95 of 100 repeats of a pair with normal errors fall: half axes √(χ²λ) along the eigenvectors of the
 * covariance [aa, ab, bb].
 */
export function errorEllipse([aa, ab, bb]: readonly [number, number, number], chiSquare = CHI_SQUARE_95): ErrorEllipse {
  const mean = (aa + bb) / 2
  const spread = Math.hypot((aa - bb) / 2, ab)
  const angle = 0.5 * Math.atan2(2 * ab, aa - bb)
  return {
    major: Math.sqrt(chiSquare * Math.max(0, mean + spread)),
    minor: Math.sqrt(chiSquare * Math.max(0, mean - spread)),
    angleDegrees: (angle * 180) / Math.PI + 0,
  }
}

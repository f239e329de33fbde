import { extent } from './figure'
import { niceStep } from './ticks'

export interface DialScale {
  /** Arc seconds at the rim and at the centre. */
  outerArcsec: number
  innerArcsec: number
  /** Radii of the rings to draw, in arc seconds; zero is among them. */
  ringsArcsec: number[]
}

/** A scale that leaves the inner third of the dial free, with rings at a round step on both sides of zero. */
export function dialScale(...series: readonly ArrayLike<number>[]): DialScale {
  const [low, high] = extent(...series)
  const largest = Math.max(Math.abs(low), Math.abs(high), 1e-9)
  const step = niceStep(2 * largest, 3)
  return {
    outerArcsec: 1.25 * largest,
    innerArcsec: -2.6 * largest,
    ringsArcsec: [-step, 0, step].filter((ring) => Math.abs(ring) <= 1.25 * largest),
  }
}

/** Radius as a share of the rim's, 0 at the centre; outward is ahead. */
export function dialRadius(arcsec: number, { outerArcsec, innerArcsec }: DialScale): number {
  return Math.max(0, (arcsec - innerArcsec) / (outerArcsec - innerArcsec))
}

/** Place on the dial in units of the rim's radius: 0° at the top, angles clockwise, y downwards as on a screen. */
export function dialPoint(angleDegrees: number, radius: number): { x: number; y: number } {
  const angle = (angleDegrees * Math.PI) / 180
  return { x: radius * Math.sin(angle), y: -radius * Math.cos(angle) }
}

/** SVG path of a curve on the dial; a value that is no number breaks it. */
export function dialPath(
  angleDegrees: ArrayLike<number>,
  arcsec: ArrayLike<number>,
  scale: DialScale,
  rimPx: number,
): string {
  let path = ''
  let isPenDown = false
  for (let i = 0; i < angleDegrees.length; i++) {
    if (!Number.isFinite(arcsec[i])) {
      isPenDown = false
      continue
    }
    const { x, y } = dialPoint(angleDegrees[i], rimPx * dialRadius(arcsec[i], scale))
    path += `${isPenDown ? 'L' : 'M'}${x.toFixed(1)} ${y.toFixed(1)}`
    isPenDown = true
  }
  return path
}

/** The angle at which the curve keeps furthest from the rings, so that their labels stand clear of it. */
export function freestAngle(
  { angleDegrees, curveArcsec }: { angleDegrees: ArrayLike<number>; curveArcsec: ArrayLike<number> },
  ringsArcsec: readonly number[],
): number {
  const room = (degrees: number) => {
    let nearest = Infinity
    for (let i = 0; i < angleDegrees.length; i++) {
      const away = Math.abs(((angleDegrees[i] - degrees + 540) % 360) - 180)
      if (away > 12) continue
      for (const ring of ringsArcsec) nearest = Math.min(nearest, Math.abs(curveArcsec[i] - ring))
    }
    return nearest
  }
  const candidates = Array.from({ length: 24 }, (_, step) => 15 * step)
  return candidates.reduce((best, degrees) => (room(degrees) > room(best) ? degrees : best))
}

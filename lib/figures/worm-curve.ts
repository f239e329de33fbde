import type { HarmonicResult } from '@/lib/analysis/types'

/** The worm's error at an angle from the first used sample: Σ a cos kθ + b sin kθ, in arc seconds of axis. */
export function wormErrorArcsec(harmonics: readonly HarmonicResult[], angleDegrees: number): number {
  const angle = (angleDegrees * Math.PI) / 180
  return harmonics.reduce(
    (sum, { order, cosArcsec, sinArcsec }) =>
      sum + cosArcsec * Math.cos(order * angle) + sinArcsec * Math.sin(order * angle),
    0,
  )
}

/** Its rate, (2π/P) Σ k(−a sin kθ + b cos kθ), in arc seconds per second. */
export function wormRateArcsecPerSecond(
  harmonics: readonly HarmonicResult[],
  angleDegrees: number,
  periodSeconds: number,
): number {
  const angle = (angleDegrees * Math.PI) / 180
  const slope = harmonics.reduce(
    (sum, { order, cosArcsec, sinArcsec }) =>
      sum + order * (sinArcsec * Math.cos(order * angle) - cosArcsec * Math.sin(order * angle)),
    0,
  )
  return (2 * Math.PI * slope) / periodSeconds
}

import jointfit from '../reference/jointfit.json'

/** The reference run of 783 samples and the parts of its published joint fit (tests/reference/jointfit.json). */
export function referenceRun() {
  const [c0, c1, c2, a1, b1, a2, b2, a3, b3, lineA, lineB, periodSeconds, linePeriodSeconds] = jointfit.value
  const timeSeconds = Float64Array.from(jointfit.t)
  const offset = timeSeconds.map((t) => t - jointfit.tref)
  const worm = [
    { order: 1, cosArcsec: a1, sinArcsec: b1 },
    { order: 2, cosArcsec: a2, sinArcsec: b2 },
    { order: 3, cosArcsec: a3, sinArcsec: b3 },
  ]
  return {
    timeSeconds,
    raArcsec: Float64Array.from(jointfit.y),
    referenceSeconds: jointfit.tref,
    periodSeconds,
    harmonics: worm,
    drift: offset.map((s) => c0 + c1 * (s / jointfit.half) + c2 * (s / jointfit.half) ** 2),
    wormArcsec: offset.map((s) =>
      worm.reduce((total, { order, cosArcsec, sinArcsec }) => {
        const angle = (2 * Math.PI * order * s) / periodSeconds
        return total + cosArcsec * Math.cos(angle) + sinArcsec * Math.sin(angle)
      }, 0),
    ),
    lineArcsec: offset.map((s) => {
      const angle = (2 * Math.PI * s) / linePeriodSeconds
      return lineA * Math.cos(angle) + lineB * Math.sin(angle)
    }),
    sigmaArcsec: jointfit.sigma,
  }
}

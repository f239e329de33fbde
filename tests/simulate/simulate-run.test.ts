import { describe, expect, test } from 'vitest'
import { simulateRun } from '@/lib/simulate/simulate-run'
import { axisArcsecConversion, simulationOptions } from '@/lib/simulate/options'
import { averagedErrorParts } from '@/lib/simulate/true-error'
import { fitByNormalEquations } from './fit-by-normal-equations'

const TAU = 2 * Math.PI
/** 86164.0905 s / 180 (mean sidereal day of Aoki et al. 1982, A&A 105, 359), worked by hand. */
const PERIOD_180 = 478.6893916666667

const base = {
  wheelTeeth: 180,
  harmonics: [
    { order: 1, amplitudeArcsec: 9, phaseDegrees: 40 },
    { order: 2, amplitudeArcsec: 1.5, phaseDegrees: 200 },
  ],
  cadenceSeconds: 2,
  durationSeconds: 2000,
}

describe('truth', () => {
  test('the worm period is the sidereal day over the teeth', () => {
    expect(simulateRun(simulationOptions(base)).truth.wormPeriodSeconds).toBeCloseTo(PERIOD_180, 9)
  })

  test('an independent least-squares fit finds the harmonics and the drift that were put in', () => {
    const options = simulationOptions({ ...base, driftCoefficients: [0.02, -3e-6], startWormAngleDegrees: 75 })
    const { track } = simulateRun(options)
    const t = track.timeSeconds
    const omega = TAU / PERIOD_180
    const fit = fitByNormalEquations(
      [
        () => 1,
        (s) => s / 1000,
        (s) => (s / 1000) ** 2,
        (s) => Math.cos(omega * s),
        (s) => Math.sin(omega * s),
        (s) => Math.cos(2 * omega * s),
        (s) => Math.sin(2 * omega * s),
      ],
      t,
      track.raArcsec,
    )
    expect(fit[1] / 1000).toBeCloseTo(0.02, 10)
    expect(fit[2] / 1e6).toBeCloseTo(-3e-6, 12)
    expect(Math.hypot(fit[3], fit[4])).toBeCloseTo(9, 8)
    expect(Math.hypot(fit[5], fit[6])).toBeCloseTo(1.5, 8)
    // Phase at the start of the run: φ_k − k·75°.
    expect(degrees(fit[3], fit[4])).toBeCloseTo(40 - 75 + 360, 6)
    expect(degrees(fit[5], fit[6])).toBeCloseTo(200 - 150, 6)
  })

  test('the stated harmonics are those of an origin at the first row, also when the first frames are lost', () => {
    const options = simulationOptions({ ...base, gaps: [{ startSeconds: -1, endSeconds: 101 }] })
    const { truth, track, columns } = simulateRun(options)
    expect(truth.firstRowSeconds).toBe(102)
    expect(columns.timeSeconds[0]).toBe(0)
    const theta = (i: number) => (TAU * (track.timeSeconds[i] - track.timeSeconds[0])) / PERIOD_180
    for (const i of [0, 17, 800]) {
      const sum = truth.harmonics.reduce(
        (value, h) => value + h.cosArcsec * Math.cos(h.order * theta(i)) + h.sinArcsec * Math.sin(h.order * theta(i)),
        0,
      )
      expect(truth.wormArcsec[i]).toBeCloseTo(sum, 10)
    }
  })

  test('peak-to-peak of one sinusoid is twice its amplitude', () => {
    const options = simulationOptions({ ...base, harmonics: [base.harmonics[0]] })
    expect(simulateRun(options).truth.wormPeakToPeakArcsec).toBeCloseTo(18, 4)
  })

  test('the parts add up to the track', () => {
    const { truth, track } = simulateRun(
      simulationOptions({
        ...base,
        gears: [{ name: 'Gear', order: 7.8, amplitudeArcsec: 1.2, phaseDegrees: 10 }],
        driftCoefficients: [0.01],
        steps: [{ atSeconds: 500, heightArcsec: 4 }],
        seeing: { whiteSkyArcsec: 0.3, correlatedSkyArcsec: 0.3, correlationSeconds: 6 },
      }),
    )
    track.raArcsec.forEach((value, i) => {
      const sum = truth.wormArcsec[i] + truth.gearsArcsec[i] + truth.driftArcsec[i] + truth.stepsArcsec[i]
      expect(value).toBeCloseTo(sum + truth.seeingArcsec[i], 12)
    })
    expect(truth.stepsArcsec[249]).toBe(0)
    expect(truth.stepsArcsec[250]).toBe(4)
  })
})

describe('exposure', () => {
  test('averaging over the exposure equals a sum over 20000 instants of it', () => {
    const options = simulationOptions({
      ...base,
      gears: [{ name: 'Fast gear', order: 61.3, amplitudeArcsec: 2, phaseDegrees: 77 }],
      driftCoefficients: [0.02, 1e-5],
      steps: [{ atSeconds: 301, heightArcsec: 3 }],
    })
    const none = { cosArcsec: new Float64Array(2), sinArcsec: new Float64Array(2) }
    const exposure = 5
    const exact = averagedErrorParts(options, none, 300.2, exposure)
    const sum = { worm: 0, gears: 0, drift: 0, steps: 0 }
    const count = 20_000
    for (let i = 0; i < count; i++) {
      const instant = averagedErrorParts(options, none, 300.2 + exposure * ((i + 0.5) / count - 0.5), 0)
      for (const part of ['worm', 'gears', 'drift', 'steps'] as const) sum[part] += instant[part] / count
    }
    expect(exact.worm).toBeCloseTo(sum.worm, 7)
    expect(exact.gears).toBeCloseTo(sum.gears, 7)
    expect(exact.drift).toBeCloseTo(sum.drift, 7)
    expect(exact.steps).toBeCloseTo(sum.steps, 3)
  })

  test('a swing of 8 s loses 10 % in an exposure of 2 s: sin(πfT)/(πfT) = 0.9003163162', () => {
    // sin(π/4)/(π/4) = 2√2/π, a closed form.
    const swing = (exposureSeconds: number) =>
      simulateRun(
        simulationOptions({
          wheelTeeth: 180,
          harmonics: [],
          gears: [{ name: 'Gear', order: PERIOD_180 / 8, amplitudeArcsec: 1, phaseDegrees: 0 }],
          cadenceSeconds: 0.5,
          durationSeconds: 80,
          conversion: axisArcsecConversion(exposureSeconds),
        }),
      ).track
    const amplitude = ({ timeSeconds, raArcsec }: ReturnType<typeof swing>) => {
      const fit = fitByNormalEquations(
        [(s) => Math.cos((TAU * s) / 8), (s) => Math.sin((TAU * s) / 8)],
        timeSeconds,
        raArcsec,
      )
      return Math.hypot(fit[0], fit[1])
    }
    expect(amplitude(swing(2)) / amplitude(swing(0))).toBeCloseTo((2 * Math.SQRT2) / Math.PI, 10)
  })

  test.each([
    ['start', -1],
    ['mid', 0],
    ['end', 1],
  ] as const)('stamps at the %s of a 2 s exposure lie %i s from its middle', (timeStamp, shift) => {
    const conversion = { ...axisArcsecConversion(2), timeStamp }
    const run = simulateRun(simulationOptions({ ...base, conversion }))
    expect(run.columns.timeSeconds[0]).toBe(0)
    expect(run.track.timeSeconds[0]).toBeCloseTo(-shift, 12)
  })
})

describe('recording', () => {
  test('pixels are the sky displacement over the image scale, with the sense of the camera', () => {
    const conversion = {
      ...axisArcsecConversion(),
      displacementUnit: 'px' as const,
      imageScaleArcsecPerPx: 1.5,
      declinationDegrees: 60,
      frame: 'sky' as const,
      positiveMeans: 'behind' as const,
    }
    const { columns, track } = simulateRun(simulationOptions({ ...base, conversion }))
    // cos 60° = 1/2: 3″ of axis are 1.5″ of sky, one pixel.
    columns.displacement.forEach((px, i) => expect(px).toBeCloseTo(-track.raArcsec[i] / 3, 10))
  })

  test('a second of right ascension is 15″ of axis at any declination', () => {
    const conversion = {
      ...axisArcsecConversion(),
      displacementUnit: 'ra-seconds' as const,
      declinationDegrees: 60,
      frame: 'sky' as const,
    }
    const { columns, track } = simulateRun(simulationOptions({ ...base, conversion }))
    columns.displacement.forEach((seconds, i) => expect(seconds).toBeCloseTo(track.raArcsec[i] / 15, 10))
  })

  test('quantisation gives whole quanta, never further than half of one from the truth', () => {
    const { columns, track } = simulateRun(simulationOptions({ ...base, quantum: 0.25 }))
    const values = new Set<number>()
    columns.displacement.forEach((value, i) => {
      expect(Number.isInteger(value / 0.25)).toBe(true)
      expect(Math.abs(value - track.raArcsec[i])).toBeLessThanOrEqual(0.125 + 1e-12)
      values.add(value)
    })
    expect(values.size).toBeGreaterThan(60)
  })

  test('frames in a gap are lost and counted; the others keep their times', () => {
    const whole = simulateRun(simulationOptions(base)).columns.timeSeconds
    const run = simulateRun(simulationOptions({ ...base, gaps: [{ startSeconds: 299, endSeconds: 401 }] }))
    expect(run.truth.lostRowCount).toBe(51)
    expect([...run.columns.timeSeconds]).toEqual([...whole].filter((t) => t < 299 || t > 401))
  })

  test('stray points are displaced on the sky, missing cells are NaN, neighbours are untouched', () => {
    const plain = simulateRun(simulationOptions(base))
    const run = simulateRun(
      simulationOptions({
        ...base,
        strayPoints: [{ atSeconds: 100.4, offsetSkyArcsec: 5 }],
        missingCells: [{ atSeconds: 200 }],
      }),
    )
    expect(run.truth.strayRows).toEqual([50])
    expect(run.truth.missingRows).toEqual([100])
    run.columns.displacement.forEach((value, i) => {
      if (i === 100) expect(value).toBeNaN()
      else expect(value - plain.columns.displacement[i]).toBeCloseTo(i === 50 ? 5 : 0, 12)
    })
  })

  test('the worm angle turns 360° per period, wraps, and is recorded in whole steps', () => {
    const run = simulateRun(simulationOptions({ ...base, startWormAngleDegrees: 350, wormAngleQuantumDegrees: 0.5 }))
    const angle = run.columns.wormAngleDegrees!
    expect(angle[0]).toBe(350)
    angle.forEach((value, i) => {
      expect(value).toBeGreaterThanOrEqual(0)
      expect(value).toBeLessThan(360)
      expect(value * 2).toBe(Math.round(value * 2))
      const exact = 350 + (360 * i * 2) / PERIOD_180
      const away = (value - exact) / 360
      expect(360 * Math.abs(away - Math.round(away))).toBeLessThanOrEqual(0.25 + 1e-9)
    })
  })

  test('declination is recorded beside it in the same unit', () => {
    const still = { whiteSkyArcsec: 0, correlatedSkyArcsec: 0, correlationSeconds: 1 }
    const run = simulateRun(
      simulationOptions({ ...base, declination: { driftSkyArcsecPerSecond: 0.01, seeing: still } }),
    )
    run.columns.declinationDisplacement!.forEach((value, i) => expect(value).toBeCloseTo(0.02 * i, 10))
    expect(simulateRun(simulationOptions(base)).columns.declinationDisplacement).toBeNull()
  })
})

describe('chance', () => {
  const noisy = {
    ...base,
    seeing: { whiteSkyArcsec: 0.3, correlatedSkyArcsec: 0.4, correlationSeconds: 6 },
    cadenceJitterSeconds: 0.1,
    turnWanderArcsec: 0.2,
    seed: 7,
  }

  test('equal options give equal runs, another seed another run', () => {
    const first = simulateRun(simulationOptions(noisy))
    expect(simulateRun(simulationOptions(noisy))).toEqual(first)
    const other = simulateRun(simulationOptions({ ...noisy, seed: 8 }))
    expect([...other.columns.displacement]).not.toEqual([...first.columns.displacement])
    expect([...other.columns.timeSeconds]).not.toEqual([...first.columns.timeSeconds])
  })

  test('one source of chance switched off leaves the others as they were', () => {
    const first = simulateRun(simulationOptions({ ...noisy, cadenceJitterSeconds: 0 }))
    const calm = simulateRun(simulationOptions({ ...noisy, cadenceJitterSeconds: 0, turnWanderArcsec: 0 }))
    expect([...calm.truth.seeingArcsec]).toEqual([...first.truth.seeingArcsec])
    expect([...calm.truth.wormArcsec]).not.toEqual([...first.truth.wormArcsec])
  })

  test('time strictly increases even with a wild beat', () => {
    const { timeSeconds } = simulateRun(simulationOptions({ ...noisy, cadenceJitterSeconds: 10 })).columns
    for (let i = 1; i < timeSeconds.length; i++) expect(timeSeconds[i]).toBeGreaterThan(timeSeconds[i - 1])
  })

  test('seeing has the standard deviation and the lag-one correlation that were asked for', () => {
    // 40001 frames of 2 s. AR(1) part: r = exp(−2/6) of 0.4²; with 0.3² of white, lag one is 0.16/0.25 · r = 0.4586.
    // Standard errors: variance ≈ 0.25·√(2·Σr²/N) < 0.7 % of it, correlation ≈ 1/√N = 0.005; limits at four of them.
    const { seeingArcsec } = simulateRun(simulationOptions({ ...noisy, durationSeconds: 80_000 })).truth
    const n = seeingArcsec.length
    const mean = seeingArcsec.reduce((a, b) => a + b, 0) / n
    let [variance, covariance] = [0, 0]
    for (let i = 0; i < n; i++) variance += (seeingArcsec[i] - mean) ** 2 / n
    for (let i = 1; i < n; i++) covariance += ((seeingArcsec[i] - mean) * (seeingArcsec[i - 1] - mean)) / n
    expect(Math.abs(variance / 0.25 - 1)).toBeLessThan(0.04)
    expect(Math.abs(covariance / variance - 0.64 * Math.exp(-1 / 3))).toBeLessThan(0.025)
  })

  test('seeing is as large on the axis as the sky divided by cos δ', () => {
    const at = (declinationDegrees: number) =>
      simulateRun(simulationOptions({ ...noisy, conversion: { ...axisArcsecConversion(), declinationDegrees } })).truth
    const [equator, sixty] = [at(0).seeingArcsec, at(60).seeingArcsec]
    sixty.forEach((value, i) => expect(value).toBeCloseTo(2 * equator[i], 10))
  })

  test('the fundamental wanders from turn to turn by as much as was asked for', () => {
    const wander = 0.5
    const run = simulateRun(
      simulationOptions({ ...base, durationSeconds: 400 * PERIOD_180, cadenceSeconds: 20, turnWanderArcsec: wander }),
    )
    const plain = simulateRun(simulationOptions({ ...base, durationSeconds: 400 * PERIOD_180, cadenceSeconds: 20 }))
    const difference = run.truth.wormArcsec.map((value, i) => value - plain.truth.wormArcsec[i])
    const rms = Math.sqrt(difference.reduce((sum, value) => sum + value ** 2, 0) / difference.length)
    // 400 turns of two values: 1/√(2·800) = 2.5 %, limit at four of them. Straight lines between independent values have 2/3 of their variance; a cos + b sin keeps half of a² + b².
    expect(Math.abs(rms / (wander * Math.sqrt(2 / 3)) - 1)).toBeLessThan(0.1)
  })
})

describe('options that describe no mount', () => {
  test.each([
    ['wheelTeeth', { wheelTeeth: 0 }],
    ['wheelTeeth', { wheelTeeth: 151.5 }],
    ['cadenceSeconds', { cadenceSeconds: 0 }],
    ['durationSeconds', { durationSeconds: Number.NaN }],
    ['quantum', { quantum: -1 }],
    ['order of a harmonic', { harmonics: [{ order: 1.5, amplitudeArcsec: 1, phaseDegrees: 0 }] }],
    ['seed', { seed: -1 }],
    ['imageScaleArcsecPerPx', { conversion: { ...axisArcsecConversion(), displacementUnit: 'px' as const } }],
    ['declinationDegrees', { conversion: { ...axisArcsecConversion(), declinationDegrees: 89 } }],
    ['gaps', { gaps: [{ startSeconds: -1, endSeconds: 9999 }] }],
  ])('%s is named', (name, change) => {
    expect(() => simulateRun(simulationOptions({ ...base, ...change }))).toThrow(RangeError)
    expect(() => simulateRun(simulationOptions({ ...base, ...change }))).toThrow(name)
  })
})

function degrees(cosine: number, sine: number) {
  return ((Math.atan2(sine, cosine) * 180) / Math.PI + 360) % 360
}

import type { Conversion } from '@/lib/analysis/types'
import { DEMO_NIGHTS, type DemoNight } from './demo-nights'
import { HILLSIDE_HARMONICS_AS_FOUND, HILLSIDE_HARMONICS_EASED, hillsideConversion, hillsideGears } from './hillside'
import { CHANCE, gaussianStream } from './noise'
import { simulationOptions, type SimulatedHarmonic, type SimulationOptions } from './options'
import { sampleOptions } from './sample'
import { fileLayout, simulateFile, type WrittenImport } from './simulate-file'
import { simulateRun, type SimulationTruth } from './simulate-run'
import { simulatedWormPeriodSeconds } from './true-error'

export { HILLSIDE_DRIVE_TRAIN as DEMO_DRIVE_TRAIN } from './hillside'

export const DEMO_PROJECT_NAME = 'Hillside club mount'

export type DemoPersonKey = 'mira' | 'tomas' | 'ines'

/** The invented people of the demo and what each may do. */
export const DEMO_PEOPLE: {
  key: DemoPersonKey
  displayName: string
  email: string
  role: 'owner' | 'editor' | 'viewer'
}[] = [
  { key: 'mira', displayName: 'Mira Okafor', email: 'mira.okafor@hillside.example', role: 'owner' },
  { key: 'tomas', displayName: 'Tomas Lindqvist', email: 'tomas.lindqvist@hillside.example', role: 'editor' },
  { key: 'ines', displayName: 'Ines Calloway', email: 'ines.calloway@hillside.example', role: 'viewer' },
]

/** The club's telescope and camera; 206.265 · 3.76 µm / 500.4 mm = 1.55″/px. */
export const DEMO_OPTICS = {
  name: 'Club refractor, 500 mm',
  focalLengthMm: 500.4,
  pixelSizeUm: 3.76,
  binning: 1,
  imageScaleArcsecPerPx: 1.55,
  imageScaleUncertaintyPercent: 1,
}

/** The same shape as RunFacts of lib/schemas. */
export interface DemoFacts {
  startedAt: string | null
  hourAngleDegrees: number | null
  sideOfPier: 'east' | 'west' | 'unknown'
  trackingRate: 'sidereal' | 'unknown'
  mountCorrection: 'off' | 'on' | 'unknown'
  mountCorrectionTable: string | null
  guiding: 'off' | 'logged' | 'unknown'
  temperatureCelsius: number | null
  loadAndBalance: string | null
  senseProof: string | null
}

export interface DemoRun {
  key: string
  name: string
  fileName: string
  /** Who may edit: the owner or the editor. */
  recordedBy: 'mira' | 'tomas'
  text: string
  importSettings: WrittenImport
  conversion: Conversion
  facts: DemoFacts
  truth: SimulationTruth
}

/** Standard deviation of a harmonic's cosine and sine from night to night, in arc seconds of axis. */
const NIGHT_SCATTER_ARCSEC = 0.07

/** Every recording of the club's mount in the autumn of 2026, oldest first; the mesh was eased on 16 November. */
export function demoRuns(): DemoRun[] {
  return DEMO_NIGHTS.map(demoRun)
}

function demoRun(night: DemoNight): DemoRun {
  const options = night.isSample ? { ...sampleOptions(), wormAngleQuantumDegrees: 0.1 } : nightOptions(night)
  const run = simulateRun(options)
  const layout = fileLayout({ ...night.layout, startedAtMs: Date.parse(night.startedAt), preamble: preamble(night) })
  const { text, importSettings } = simulateFile(run, layout)
  return {
    key: night.key,
    name: night.name,
    fileName: night.fileName,
    recordedBy: night.recordedBy,
    text,
    importSettings,
    conversion: options.conversion,
    facts: {
      startedAt: night.startedAt,
      hourAngleDegrees: night.hourAngleDegrees,
      sideOfPier: night.sideOfPier,
      trackingRate: 'sidereal',
      mountCorrection: 'off',
      mountCorrectionTable: null,
      guiding: night.guiding,
      temperatureCelsius: night.temperatureCelsius,
      loadAndBalance: night.loadAndBalance,
      senseProof: night.senseProof,
    },
    truth: run.truth,
  }
}

function nightOptions(night: DemoNight): SimulationOptions {
  const wheel = { wheelTeeth: 152, wormStarts: 1 }
  return simulationOptions({
    ...wheel,
    harmonics: scattered(night.isMeshEased ? HILLSIDE_HARMONICS_EASED : HILLSIDE_HARMONICS_AS_FOUND, night.seed),
    gears: hillsideGears(night.beltPhaseDegrees, night.pulleyPhaseDegrees),
    driftCoefficients: night.driftArcsecPerMinute.map((value, i) => value / 60 ** (i + 1)),
    seeing: {
      whiteSkyArcsec: night.seeingArcsec * 0.65,
      correlatedSkyArcsec: night.seeingArcsec * 0.76,
      correlationSeconds: 5,
    },
    turnWanderArcsec: 0.08,
    cadenceSeconds: night.cadenceSeconds,
    cadenceJitterSeconds: 0.02,
    durationSeconds: night.turns * simulatedWormPeriodSeconds(wheel),
    startWormAngleDegrees: night.startWormAngleDegrees,
    gaps: night.gaps,
    strayPoints: night.strayPoints,
    conversion: hillsideConversion({
      declinationDegrees: night.declinationDegrees,
      // The tube changes sides at the meridian, and the camera with it: the same motion runs the other way on the chip.
      positiveMeans: night.sideOfPier === 'west' ? 'ahead' : 'behind',
      senseBasis: night.senseProof === null ? 'assumed' : 'proven',
      exposureSeconds: night.exposureSeconds,
    }),
    quantum: 0.001,
    declination: {
      driftSkyArcsecPerSecond: night.declinationDriftArcsecPerMinute / 60,
      seeing: {
        whiteSkyArcsec: night.seeingArcsec * 0.6,
        correlatedSkyArcsec: night.seeingArcsec * 0.6,
        correlationSeconds: 5,
      },
    },
    wormAngleQuantumDegrees: night.hasWormAngle ? 0.1 : null,
    seed: night.seed,
  })
}

/** The harmonics of one night: the mount's own, moved by its night-to-night scatter. */
function scattered(harmonics: SimulatedHarmonic[], seed: number): SimulatedHarmonic[] {
  const next = gaussianStream(seed, CHANCE.night)
  return harmonics.map(({ order, amplitudeArcsec, phaseDegrees }) => {
    const phase = (phaseDegrees * Math.PI) / 180
    const scatter = NIGHT_SCATTER_ARCSEC / order
    const cosine = amplitudeArcsec * Math.cos(phase) + scatter * next()
    const sine = amplitudeArcsec * Math.sin(phase) + scatter * next()
    return {
      order,
      amplitudeArcsec: Math.hypot(cosine, sine),
      phaseDegrees: (Math.atan2(sine, cosine) * 180) / Math.PI,
    }
  })
}

function preamble(night: DemoNight): string[] {
  return [
    `# ${DEMO_PROJECT_NAME}, an invented recording: ${night.name}`,
    `# started: ${night.startedAt}`,
    '# image scale: 1.55 arcsec/px',
    `# declination: ${night.declinationDegrees} deg`,
    `# exposure: ${night.exposureSeconds} s`,
    '# times: middle of the exposure',
  ]
}

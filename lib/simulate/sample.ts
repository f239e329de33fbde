import { HILLSIDE_DRIVE_TRAIN, HILLSIDE_HARMONICS_AS_FOUND, hillsideConversion, hillsideGears } from './hillside'
import { simulationOptions, type SimulationOptions } from './options'
import { fileLayout, simulateFile, type WrittenImport } from './simulate-file'
import { simulateRun, type SimulatedRun } from './simulate-run'

/** The sample run lies in public/ under this name; db/make-sample.ts writes it. */
export const SAMPLE_FILE_NAME = 'sample-run.csv'
export const SAMPLE_NAME = '14 November, unguided, east of the meridian'
export const SAMPLE_STARTED_AT = '2026-11-14T21:12:30.000Z'

export const SAMPLE_DRIVE_TRAIN = HILLSIDE_DRIVE_TRAIN
export const SAMPLE_CONVERSION = hillsideConversion()

/** Six turns of the club mount's worm: a cloud of 56 s in the third, three frames with a wrong star. */
export function sampleOptions(): SimulationOptions {
  return simulationOptions({
    wheelTeeth: 152,
    harmonics: HILLSIDE_HARMONICS_AS_FOUND,
    gears: hillsideGears(140, 65),
    driftCoefficients: [0.35 / 60],
    seeing: { whiteSkyArcsec: 0.32, correlatedSkyArcsec: 0.36, correlationSeconds: 5 },
    turnWanderArcsec: 0.08,
    cadenceSeconds: 2.5,
    cadenceJitterSeconds: 0.02,
    durationSeconds: 3415,
    startWormAngleDegrees: 3,
    gaps: [{ startSeconds: 1489, endSeconds: 1542.6 }],
    strayPoints: [
      { atSeconds: 526, offsetSkyArcsec: 6.4 },
      { atSeconds: 1824, offsetSkyArcsec: -5.1 },
      { atSeconds: 2968, offsetSkyArcsec: 7.2 },
    ],
    conversion: SAMPLE_CONVERSION,
    quantum: 0.001,
    declination: {
      driftSkyArcsecPerSecond: -0.21 / 60,
      seeing: { whiteSkyArcsec: 0.3, correlatedSkyArcsec: 0.3, correlationSeconds: 5 },
    },
    seed: 20261114,
  })
}

export function sampleRun(): SimulatedRun {
  return simulateRun(sampleOptions())
}

const SAMPLE_LAYOUT = fileLayout({
  preamble: [
    '# Hillside club mount, an invented recording: one star, guiding off, correction off',
    `# started: ${SAMPLE_STARTED_AT}`,
    '# image scale: 1.55 arcsec/px',
    '# declination: +8.9 deg',
    '# exposure: 2 s',
    '# times: middle of the exposure, from the first frame',
  ],
  hasUnits: true,
})

/** The text of public/sample-run.csv. */
export function sampleFileText(): string {
  return simulateFile(sampleRun(), SAMPLE_LAYOUT).text
}

/** How to read it: the same shape as ImportSettings of lib/formats. */
export const SAMPLE_IMPORT: WrittenImport = {
  version: 1,
  layout: { encoding: 'utf-8', delimiter: ',', decimalMark: '.', headerRow: 7, unitsRow: 8, firstDataRow: 9 },
  columns: {
    time: 0,
    timeUnit: 'seconds',
    displacement: 1,
    displacementUnit: 'px',
    declination: 2,
    wormAngle: null,
    wormAngleUnit: 'degrees',
  },
}

import type { SimulatedGap, SimulatedStrayPoint } from './options'
import type { FileLayout } from './simulate-file'
import { SAMPLE_NAME, SAMPLE_STARTED_AT } from './sample'

/** One night of the club's mount: what was recorded and how the air, the drift and the recorder were. */
export interface DemoNight {
  key: string
  name: string
  fileName: string
  recordedBy: 'mira' | 'tomas'
  startedAt: string
  /** The sample run itself, with a worm-angle column; its own options hold instead of those below. */
  isSample: boolean
  isMeshEased: boolean
  turns: number
  cadenceSeconds: number
  exposureSeconds: number
  /** Per minute, per minute², … */
  driftArcsecPerMinute: number[]
  declinationDriftArcsecPerMinute: number
  seeingArcsec: number
  declinationDegrees: number
  hourAngleDegrees: number
  sideOfPier: 'east' | 'west'
  guiding: 'off' | 'unknown'
  temperatureCelsius: number
  loadAndBalance: string
  senseProof: string | null
  hasWormAngle: boolean
  startWormAngleDegrees: number
  beltPhaseDegrees: number
  pulleyPhaseDegrees: number
  gaps: SimulatedGap[]
  strayPoints: SimulatedStrayPoint[]
  layout: Partial<FileLayout>
  seed: number
}

const BALANCED = 'Club refractor, 9 kg, balanced a little heavy to the east'
const proofOf = (direction: string) =>
  `A west pulse of 3 s before the run moved the star towards ${direction} column numbers`

const USUAL = {
  isSample: false,
  isMeshEased: false,
  cadenceSeconds: 2.5,
  exposureSeconds: 2,
  declinationDegrees: 8.9,
  guiding: 'off',
  loadAndBalance: BALANCED,
  hasWormAngle: true,
  gaps: [] as SimulatedGap[],
  strayPoints: [] as SimulatedStrayPoint[],
  layout: { hasUnits: true } as Partial<FileLayout>,
} as const

export const DEMO_NIGHTS: DemoNight[] = [
  {
    ...USUAL,
    key: '2026-09-26',
    name: '26 September, unguided, west of the meridian',
    fileName: 'hillside-0926.csv',
    recordedBy: 'tomas',
    startedAt: '2026-09-26T20:41:00.000Z',
    turns: 5.2,
    cadenceSeconds: 3,
    exposureSeconds: 2.5,
    driftArcsecPerMinute: [0.92],
    declinationDriftArcsecPerMinute: 0.6,
    seeingArcsec: 0.8,
    declinationDegrees: 14.2,
    hourAngleDegrees: 21,
    sideOfPier: 'east',
    temperatureCelsius: 13,
    loadAndBalance: 'Club refractor, 9 kg, balanced evenly',
    senseProof: null,
    hasWormAngle: false,
    startWormAngleDegrees: 212,
    beltPhaseDegrees: 20,
    pulleyPhaseDegrees: 301,
    strayPoints: [{ atSeconds: 800, offsetSkyArcsec: 9 }],
    layout: { delimiter: ';', decimalMark: ',', hasUnits: true, lineEnd: '\r\n' },
    seed: 20260926,
  },
  {
    ...USUAL,
    key: '2026-10-10',
    name: '10 October, unguided, east of the meridian',
    fileName: 'hillside-1010.tsv',
    recordedBy: 'tomas',
    startedAt: '2026-10-10T21:05:00.000Z',
    turns: 5,
    driftArcsecPerMinute: [-0.28],
    declinationDriftArcsecPerMinute: 0.3,
    seeingArcsec: 0.6,
    hourAngleDegrees: -24,
    sideOfPier: 'west',
    temperatureCelsius: 9,
    senseProof: proofOf('higher'),
    hasWormAngle: false,
    startWormAngleDegrees: 75,
    beltPhaseDegrees: 250,
    pulleyPhaseDegrees: 12,
    layout: { delimiter: '\t', timeUnit: 'iso-8601' },
    seed: 20261010,
  },
  {
    ...USUAL,
    key: '2026-10-17',
    name: '17 October, cloudy, stopped after two turns',
    fileName: 'hillside-1017.csv',
    recordedBy: 'mira',
    startedAt: '2026-10-17T19:58:00.000Z',
    turns: 2.2,
    driftArcsecPerMinute: [0.41],
    declinationDriftArcsecPerMinute: -0.2,
    seeingArcsec: 1.1,
    hourAngleDegrees: -38,
    sideOfPier: 'west',
    temperatureCelsius: 11,
    senseProof: proofOf('higher'),
    startWormAngleDegrees: 130,
    beltPhaseDegrees: 95,
    pulleyPhaseDegrees: 200,
    gaps: [
      { startSeconds: 214, endSeconds: 259 },
      { startSeconds: 587, endSeconds: 671 },
      { startSeconds: 1010, endSeconds: 1049 },
    ],
    strayPoints: [
      { atSeconds: 210, offsetSkyArcsec: -8 },
      { atSeconds: 676, offsetSkyArcsec: 11 },
    ],
    seed: 20261017,
  },
  {
    ...USUAL,
    key: '2026-10-24',
    name: '24 October, guiding not noted',
    fileName: 'hillside-1024.csv',
    recordedBy: 'tomas',
    startedAt: '2026-10-24T22:14:00.000Z',
    turns: 4.6,
    driftArcsecPerMinute: [0.15],
    declinationDriftArcsecPerMinute: 0.1,
    seeingArcsec: 0.7,
    hourAngleDegrees: 12,
    sideOfPier: 'east',
    guiding: 'unknown',
    temperatureCelsius: 6,
    senseProof: proofOf('lower'),
    startWormAngleDegrees: 318,
    beltPhaseDegrees: 180,
    pulleyPhaseDegrees: 44,
    layout: { timeUnit: 'minutes', hasUnits: true },
    seed: 20261024,
  },
  {
    ...USUAL,
    key: '2026-11-07',
    name: '7 November, unguided, west of the meridian',
    fileName: 'hillside-1107.csv',
    recordedBy: 'mira',
    startedAt: '2026-11-07T22:30:00.000Z',
    turns: 6.1,
    driftArcsecPerMinute: [0.18],
    declinationDriftArcsecPerMinute: -0.15,
    seeingArcsec: 0.55,
    hourAngleDegrees: 17,
    sideOfPier: 'east',
    temperatureCelsius: 3,
    senseProof: proofOf('lower'),
    startWormAngleDegrees: 251,
    beltPhaseDegrees: 310,
    pulleyPhaseDegrees: 150,
    strayPoints: [{ atSeconds: 2210, offsetSkyArcsec: -6 }],
    seed: 20261107,
  },
  {
    ...USUAL,
    key: '2026-11-14',
    name: SAMPLE_NAME,
    fileName: 'hillside-1114.csv',
    recordedBy: 'mira',
    startedAt: SAMPLE_STARTED_AT,
    isSample: true,
    turns: 6,
    driftArcsecPerMinute: [0.35],
    declinationDriftArcsecPerMinute: -0.21,
    seeingArcsec: 0.5,
    hourAngleDegrees: -19,
    sideOfPier: 'west',
    temperatureCelsius: 2,
    senseProof: proofOf('higher'),
    startWormAngleDegrees: 3,
    beltPhaseDegrees: 140,
    pulleyPhaseDegrees: 65,
    seed: 20261114,
  },
  {
    ...USUAL,
    key: '2026-11-21',
    name: '21 November, unguided, east of the meridian, mesh eased',
    fileName: 'hillside-1121.csv',
    recordedBy: 'tomas',
    startedAt: '2026-11-21T21:20:00.000Z',
    isMeshEased: true,
    turns: 6.2,
    driftArcsecPerMinute: [0.46],
    declinationDriftArcsecPerMinute: -0.19,
    seeingArcsec: 0.5,
    hourAngleDegrees: -15,
    sideOfPier: 'west',
    temperatureCelsius: -1,
    senseProof: proofOf('higher'),
    startWormAngleDegrees: 96,
    beltPhaseDegrees: 60,
    pulleyPhaseDegrees: 222,
    strayPoints: [{ atSeconds: 1300, offsetSkyArcsec: 7 }],
    seed: 20261121,
  },
  {
    ...USUAL,
    key: '2026-11-28',
    name: '28 November, unguided, west of the meridian, mesh eased',
    fileName: 'hillside-1128.csv',
    recordedBy: 'mira',
    startedAt: '2026-11-28T22:02:00.000Z',
    isMeshEased: true,
    turns: 5.6,
    driftArcsecPerMinute: [-0.22, 0.006],
    declinationDriftArcsecPerMinute: 0.12,
    seeingArcsec: 0.65,
    hourAngleDegrees: 26,
    sideOfPier: 'east',
    temperatureCelsius: -3,
    senseProof: proofOf('lower'),
    startWormAngleDegrees: 184,
    beltPhaseDegrees: 205,
    pulleyPhaseDegrees: 88,
    gaps: [{ startSeconds: 1850, endSeconds: 1880 }],
    seed: 20261128,
  },
]

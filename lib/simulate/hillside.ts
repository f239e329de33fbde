import { axisArcsecConversion, type SimulatedGear, type SimulatedHarmonic } from './options'
import type { Conversion, DriveTrain } from '@/lib/analysis/types'

/** The club mount of the demo, an invented one: wheel of 152 teeth, a belt of 90 from 60 on the worm to 22 on the motor. */
export const HILLSIDE_DRIVE_TRAIN: DriveTrain = {
  axisKind: 'worm',
  wheelTeeth: 152,
  wormStarts: 1,
  stages: [{ kind: 'belt', name: 'Motor belt', drivenTeeth: 60, drivingTeeth: 22, beltTeeth: 90 }],
}

/** Orders of what stands in front of the worm: the belt turns 60/90 times per turn of it, the motor pulley 60/22 times. */
export const HILLSIDE_BELT_ORDER = 60 / 90
export const HILLSIDE_MOTOR_PULLEY_ORDER = 60 / 22

/** The worm before its mesh was eased, phases from the index mark. */
export const HILLSIDE_HARMONICS_AS_FOUND: SimulatedHarmonic[] = [
  { order: 1, amplitudeArcsec: 7.4, phaseDegrees: 34 },
  { order: 2, amplitudeArcsec: 1.75, phaseDegrees: 106 },
  { order: 3, amplitudeArcsec: 0.6, phaseDegrees: 327 },
  { order: 4, amplitudeArcsec: 0.27, phaseDegrees: 118 },
]

/** And after: the second harmonic fell from 1.75″ to 0.8″, the rest is the same worm. */
export const HILLSIDE_HARMONICS_EASED: SimulatedHarmonic[] = HILLSIDE_HARMONICS_AS_FOUND.map((harmonic) =>
  harmonic.order === 2 ? { ...harmonic, amplitudeArcsec: 0.8 } : harmonic,
)

/** Belt and motor pulley, which meet the start of a run at any phase. */
export function hillsideGears(beltPhaseDegrees: number, pulleyPhaseDegrees: number): SimulatedGear[] {
  return [
    { name: 'Belt', order: HILLSIDE_BELT_ORDER, amplitudeArcsec: 0.6, phaseDegrees: beltPhaseDegrees },
    {
      name: 'Motor pulley',
      order: HILLSIDE_MOTOR_PULLEY_ORDER,
      amplitudeArcsec: 0.75,
      phaseDegrees: pulleyPhaseDegrees,
    },
  ]
}

/** The club's camera: 1.55″/px, known to 1 %; its rows run so that a growing column means an axis that is ahead. */
export function hillsideConversion(given: Partial<Conversion> = {}): Conversion {
  return {
    ...axisArcsecConversion(2),
    displacementUnit: 'px',
    imageScaleArcsecPerPx: 1.55,
    imageScaleUncertaintyPercent: 1,
    declinationDegrees: 8.9,
    declinationUncertaintyDegrees: 0.1,
    frame: 'sky',
    ...given,
  }
}

import { z } from 'zod'

/** What is known of one recording beside its numbers; every field may be unknown (null) but the three with an 'unknown' of their own. */
export const runFactsSchema = z.object({
  startedAt: z.iso.datetime({ offset: true }).nullable(),
  hourAngleDegrees: z.number().min(-180).max(180).nullable(),
  sideOfPier: z.enum(['east', 'west', 'unknown']),
  trackingRate: z.enum(['sidereal', 'solar', 'lunar', 'unknown']),
  /** Whether a periodic-error correction was playing in the mount while recording. */
  mountCorrection: z.enum(['off', 'on', 'unknown']),
  mountCorrectionTable: z.string().max(200).nullable(),
  guiding: z.enum(['off', 'logged', 'unknown']),
  temperatureCelsius: z.number().min(-80).max(80).nullable(),
  loadAndBalance: z.string().max(500).nullable(),
  /** How the sense of the displacement was proven; null where it is only assumed. */
  senseProof: z.string().max(500).nullable(),
})

export type RunFacts = z.infer<typeof runFactsSchema>

export function unknownRunFacts(): RunFacts {
  return {
    startedAt: null,
    hourAngleDegrees: null,
    sideOfPier: 'unknown',
    trackingRate: 'unknown',
    mountCorrection: 'unknown',
    mountCorrectionTable: null,
    guiding: 'unknown',
    temperatureCelsius: null,
    loadAndBalance: null,
    senseProof: null,
  }
}

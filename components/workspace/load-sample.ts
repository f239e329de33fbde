import { newWorkId, type KeptWork } from '@/lib/client/kept-work'
import { unknownRunFacts } from '@/lib/schemas/run-facts'
import {
  SAMPLE_CONVERSION,
  SAMPLE_DRIVE_TRAIN,
  SAMPLE_FILE_NAME,
  SAMPLE_IMPORT,
  SAMPLE_NAME,
  SAMPLE_STARTED_AT,
} from '@/lib/simulate/sample'

/** The sample run with all that is known of it. */
export async function loadSample(): Promise<KeptWork> {
  const response = await fetch(`/${SAMPLE_FILE_NAME}`)
  if (!response.ok) throw new Error('The sample run could not be fetched. Try again in a moment.')
  return {
    version: 1,
    id: newWorkId(),
    fileName: `${SAMPLE_NAME}.csv`,
    bytes: new Uint8Array(await response.arrayBuffer()),
    settings: SAMPLE_IMPORT,
    conversion: SAMPLE_CONVERSION,
    facts: {
      ...unknownRunFacts(),
      startedAt: SAMPLE_STARTED_AT,
      trackingRate: 'sidereal',
      mountCorrection: 'off',
      guiding: 'off',
    },
    driveTrain: SAMPLE_DRIVE_TRAIN,
  }
}

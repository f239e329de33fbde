import { SIDEREAL_DAY_SECONDS } from '@/lib/analysis/constants'
import type { DriveTrain } from '@/lib/analysis/types'
import { formatNumber } from '@/lib/units'
import { finding, worm, type Finding } from './finding'
import { counted } from './words'

/** What the teeth say before anything is recorded. */
export function driveFinding({ wheelTeeth, wormStarts, stages }: DriveTrain): Finding {
  if (wheelTeeth === null) {
    return finding`The worm period is not known yet: the wheel’s teeth are missing`
  }
  const period = formatNumber((wormStarts * SIDEREAL_DAY_SECONDS) / wheelTeeth, 2, { unit: 's' })
  const upstream = stages.length === 0 ? '' : `, driven through ${counted(stages.length, 'stage')}`
  return finding`A wheel of ${String(wheelTeeth)} teeth turns its worm once in ${worm(period)}${upstream}`
}

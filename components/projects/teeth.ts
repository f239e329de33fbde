import { SIDEREAL_DAY_SECONDS } from '@/lib/analysis/constants'
import { formatNumber } from '@/lib/units'

/** Worm period in seconds of UT: starts · sidereal day / teeth; null where a count is not a positive whole number. */
export function wormPeriodSeconds(wheelTeeth: number | null, wormStarts = 1): number | null {
  if (wheelTeeth === null || !Number.isInteger(wheelTeeth) || wheelTeeth < 1) return null
  if (!Number.isInteger(wormStarts) || wormStarts < 1) return null
  return (wormStarts * SIDEREAL_DAY_SECONDS) / wheelTeeth
}

/** “566.87 s”, as it stands beside a count of teeth. */
export function wormPeriodText(wheelTeeth: number | null, wormStarts = 1): string {
  return formatNumber(wormPeriodSeconds(wheelTeeth, wormStarts), 2, { unit: 's' })
}

import type { AnalysisResult, Recipe } from '@/lib/analysis/types'
import { tableAngleDegrees } from '@/lib/figures/worm-angle'
import { formatNumber, formatPercent } from '@/lib/units'
import { finding, joinFindings, limit, worm, type Finding } from './finding'
import { reasonSentence } from './reason-sentence'
import { arcsec, degrees, senseMark } from './words'

/** What the table takes off turns it was not made from, and what it does where the axis is furthest ahead. */
export function correctionFinding(result: AnalysisResult, recipe: Recipe): Finding {
  const { table, worm: wormResult } = result
  if (!table || !wormResult)
    return finding`${reasonSentence({ reason: result.tableReason ?? result.wormReason ?? 'no-period' })}`
  if (table.orders.length === 0)
    return finding`No harmonic is certain enough for a table: it would add nothing but noise.`
  const { heldOutReduction, peakToPeakBeforeArcsec, peakToPeakAfterArcsec } = table.rehearsal
  const rehearsal =
    heldOutReduction === null
      ? finding`On its own run it leaves ${worm(arcsec(peakToPeakAfterArcsec))} of ${arcsec(peakToPeakBeforeArcsec)}; there are too few turns to rehearse it on others.`
      : heldOutReduction > 0
        ? finding`Rehearsed on turns it was not made from, it removes ${worm(formatPercent(heldOutReduction))} of the RMS.`
        : finding`Rehearsed on turns it was not made from, it ${limit(`adds ${formatPercent(-heldOutReduction)}`)} to the RMS.`
  const angle = tableAngleDegrees(wormResult.furthestAheadDegrees, { table, run: result.run })
  const sense = senseMark(recipe.conversion.senseBasis)
  const acts =
    recipe.table.gain === 1
      ? 'there the table holds it back'
      : `there the table holds it back by ${formatNumber(recipe.table.gain * wormResult.furthestAheadArcsec, 1, { unit: '″' })}`
  const place = finding`At ${degrees(Math.round(angle) % 360)} the axis runs ${arcsec(wormResult.furthestAheadArcsec)} ahead${sense}; ${acts}.`
  return joinFindings([rehearsal, place])
}

/** Before a table leaves: what must be known about its sign, or null where the sense is proven. */
export function assumedSenseWarning(recipe: Recipe): string | null {
  if (recipe.conversion.senseBasis === 'proven') return null
  return 'The sense of this recording is only assumed. If it is the other way round, this table doubles the error instead of removing it. Prove it with one deliberate guide pulse to the west: the star must jump east.'
}

/** Why a run gives only an addition to the table in the mount; null where no correction was playing. */
export function additionOnlyWarning(mountCorrection: 'off' | 'on' | 'unknown'): string | null {
  if (mountCorrection === 'off') return null
  return mountCorrection === 'on'
    ? 'A correction was playing in the mount during this run. What is left is no table by itself: it can only be added to the one that was in.'
    : 'It is not known whether a correction was playing in the mount during this run. The table can only be an addition to whatever was in.'
}

/** Said beside every download. */
export const TABLE_CAUTIONS: readonly string[] = [
  'Keep a copy of the table that is in the mount before you replace it.',
  'A table of the wrong sign doubles the error; one with the wrong zero can do as much. Load it, record again, compare.',
  'Before an unattended run: cables slack, nothing that can meet the pier past the meridian, counterweights and their stop tight, tube balanced.',
  'Never point an uncovered telescope near the Sun; a test by day is made with the cap on.',
  'Power off and clutches as the maker directs before touching gears. The maker’s manual and a qualified technician come before anything shown here, and opening a mount may end its warranty.',
]

import type { RehearsedTable } from '@/lib/schemas/kept-figures'
import { formatPercent, formatSignificant } from '@/lib/units'
import { finding, limit, worm, type Finding } from './finding'
import { arcsec } from './words'

/** The sentence over a kept correction table. */
export function tableFinding(table: RehearsedTable | null, binCount: number): Finding {
  if (!table) return finding`A correction table of ${String(binCount)} bins; it was not rehearsed here`
  const { peakToPeakBeforeArcsec, peakToPeakAfterArcsec, heldOutReduction } = table.rehearsal
  if (heldOutReduction === null) {
    return finding`Too few turns to rehearse this table on others; its bins alone would leave ${worm(arcsec(peakToPeakAfterArcsec))} of ${arcsec(peakToPeakBeforeArcsec)}`
  }
  if (heldOutReduction <= 0) {
    return finding`On turns it was not made from, this table ${limit(`adds ${formatPercent(-heldOutReduction)}`)} to the RMS: do not load it`
  }
  return finding`Rehearsed on turns it was not made from, the table takes ${worm(formatPercent(heldOutReduction))} off the RMS`
}

/** Whether playing the table turn after turn lets the axis creep. */
export function closureFinding(closureError: number, quantity: 'position' | 'rate'): Finding {
  const size = Math.abs(closureError)
  if (size < 1e-6) return finding`It closes to zero over a turn, so the axis does not creep from turn to turn.`
  const what = quantity === 'position' ? 'position' : 'sum of its rates'
  return finding`Over a turn its ${what} is off by ${limit(formatSignificant(size, 2))}: the axis creeps by that much in each turn.`
}

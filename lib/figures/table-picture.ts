import { SIDEREAL_RATE_ARCSEC_PER_SECOND } from '@/lib/analysis/constants'
import type { AnalysisResult, TableResult, TableSettings, WormResult } from '@/lib/analysis/types'
import { wrapDegrees } from '@/lib/units'
import { runAngleDegrees } from './worm-angle'
import { wormErrorArcsec, wormRateArcsecPerSecond } from './worm-curve'

export interface TablePicture {
  /** `left` is where the bar begins, in [0, 360). */
  bars: { index: number; angleDegrees: number; left: number; value: number }[]
  /** The worm's own error in the table's unit and along its angle. */
  curve: { angleDegrees: number; value: number }[]
  unit: string
  unitName: string
}

/** A table as bars over its own angle, with the error it is made against in the same unit. */
export function tablePicture(table: TableResult, worm: WormResult, run: AnalysisResult['run']): TablePicture {
  const { unit } = table.settings
  const width = 360 / table.bins.length
  return {
    bars: table.bins
      .map(({ index, angleDegrees, value }) => ({
        index,
        angleDegrees,
        value,
        left: Math.min(wrapDegrees(angleDegrees), 360 - width),
      }))
      .sort((a, b) => a.left - b.left),
    curve: Array.from({ length: 361 }, (_, angleDegrees) => {
      const angle = runAngleDegrees(angleDegrees, { table, run })
      const rate = () => wormRateArcsecPerSecond(worm.harmonics, angle, table.wormPeriodSeconds)
      const value =
        unit === 'arcsec'
          ? wormErrorArcsec(worm.harmonics, angle)
          : unit === 'arcsec-per-second'
            ? rate()
            : (100 * rate()) / SIDEREAL_RATE_ARCSEC_PER_SECOND
      return { angleDegrees, value }
    }),
    unit: UNITS[unit],
    unitName: unit.replaceAll('-', '_'),
  }
}

const UNITS: Record<TableSettings['unit'], string> = {
  arcsec: '″',
  'arcsec-per-second': '″/s',
  'percent-sidereal': '\u202f% of sidereal',
}

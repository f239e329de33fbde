import type { KeyFigure } from '@/components/ui/figure-strip'
import type { Estimate } from '@/lib/analysis/types'
import type { OverviewFigures } from '@/lib/schemas/kept-figures'
import { estimateParts, formatPercent } from '@/lib/units'

/** The key figures of the latest analysed run, with their standard errors. */
export function overviewKeyFigures({ worm, turn }: OverviewFigures): KeyFigure[] {
  if (!worm) return []
  const fundamental = worm.harmonics.find(({ order }) => order === 1)
  return [
    keyFigure('Worm period', worm.periodSeconds, 's'),
    ...(fundamental ? [keyFigure('Worm amplitude', fundamental.amplitudeArcsec, '″')] : []),
    keyFigure('Worm, peak to peak', worm.peakToPeakArcsec, '″'),
    keyFigure('Steepest rate', worm.steepestRateArcsecPerSecond, '″/s'),
    { label: 'A table takes off other turns', value: formatPercent(turn?.heldOutReduction ?? null) },
  ]
}

function keyFigure(label: string, estimate: Estimate, unit: string): KeyFigure {
  const parts = estimateParts(estimate, { unit, significantDigits: 3 })
  const scale = parts.scale === null ? '' : ` × ${parts.scale}`
  return {
    label,
    value: parts.value,
    uncertainty: parts.error ?? undefined,
    unit: scale + parts.unit,
  }
}

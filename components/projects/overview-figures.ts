import type { KeyFigure } from '@/components/ui/figure-strip'
import type { Estimate } from '@/lib/analysis/types'
import {
  displacementUnitOf,
  PLAIN_DISPLAY,
  shownDisplacement,
  shownSwing,
  swingWord,
  type Display,
} from '@/lib/display-units'
import type { OverviewFigures } from '@/lib/schemas/kept-figures'
import { estimateParts, formatPercent } from '@/lib/units'

/** The key figures of the latest analysed run, with their standard errors. */
export function overviewKeyFigures({ worm, turn }: OverviewFigures, display: Display = PLAIN_DISPLAY): KeyFigure[] {
  if (!worm) return []
  const unit = displacementUnitOf(display)
  const fundamental = worm.harmonics.find(({ order }) => order === 1)
  return [
    keyFigure('Worm period', worm.periodSeconds, 's'),
    ...(fundamental
      ? [keyFigure(fundamentalLabel(display), shownSwing(fundamental.amplitudeArcsec, display), unit)]
      : []),
    keyFigure('Worm, peak to peak', shownDisplacement(worm.peakToPeakArcsec, display), unit),
    keyFigure('Steepest rate', worm.steepestRateArcsecPerSecond, '″/s'),
    { label: 'A table takes off other turns', value: formatPercent(turn?.heldOutReduction ?? null) },
  ]
}

/** Beside the peak-to-peak of the whole worm that of its fundamental must say whose it is. */
function fundamentalLabel(display: Display): string {
  return swingWord(display) === 'amplitude' ? 'Worm amplitude' : 'Its fundamental, peak to peak'
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

import type { AnalysisResult, Estimate } from '@/lib/analysis/types'
import { PLAIN_DISPLAY, displacementUnitOf, shownDisplacement, type Display } from '@/lib/display-units'
import { ABSENT, estimateParts, formatNumber } from '@/lib/units'

export interface KeyFigureText {
  label: string
  value: string
  uncertainty?: string
  unit?: string
}

/**
 * The five figures over the sheet: worm period, worm peak to peak, steepest rate, drift, what the fit leaves. Rates stay in arc
 * seconds, to be held against the rate of a guider, which is a matter of the axis.
 */
export function keyFigures(result: AnalysisResult, display: Display = PLAIN_DISPLAY): KeyFigureText[] {
  const { worm, drift, residual, scaleUncertaintyPercent } = result
  const unit = displacementUnitOf(display)
  const shown = (arcsec: Estimate) => shownDisplacement(arcsec, display)
  // The pixels of the recording do not depend on what is known of their scale.
  const scale =
    scaleUncertaintyPercent === null || unit === 'px' ? '' : ` (scale ± ${shortPercent(scaleUncertaintyPercent)})`
  return [
    figure('Worm period', worm?.periodSeconds ?? null, 's'),
    figure(`Worm, peak to peak${scale}`, worm ? shown(worm.peakToPeakArcsec) : null, unit),
    figure('Steepest rate', worm?.steepestRateArcsecPerSecond ?? null, '″/s'),
    figure('Drift', perMinute(drift.rateArcsecPerSecond), '″/min', true),
    figure('Left after the fit, RMS', shown({ value: residual.rmsArcsec, stderr: null }), unit),
  ]
}

export function perMinute(rate: Estimate): Estimate {
  return { value: 60 * rate.value, stderr: rate.stderr === null ? null : 60 * rate.stderr }
}

function figure(label: string, estimate: Estimate | null, unit: string, isSigned = false): KeyFigureText {
  if (estimate === null) return { label, value: ABSENT }
  const parts = estimateParts(estimate, { isSigned, significantDigits: 2 })
  const scaled = parts.scale === null ? '' : `× ${parts.scale} `
  return {
    label,
    value: parts.value,
    ...(parts.error === null ? {} : { uncertainty: parts.error }),
    unit: scaled + unit,
  }
}

function shortPercent(percent: number): string {
  return formatNumber(percent, percent < 1 ? 2 : percent < 10 && percent % 1 !== 0 ? 1 : 0, { unit: '%' })
}

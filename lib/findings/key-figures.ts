import type { AnalysisResult, Estimate } from '@/lib/analysis/types'
import { ABSENT, estimateParts, formatNumber } from '@/lib/units'

export interface KeyFigureText {
  label: string
  value: string
  uncertainty?: string
  unit?: string
}

/** The five figures over the sheet: worm period, worm peak to peak, steepest rate, drift, what the fit leaves. */
export function keyFigures(result: AnalysisResult): KeyFigureText[] {
  const { worm, drift, residual, scaleUncertaintyPercent } = result
  const scale = scaleUncertaintyPercent === null ? '' : ` (scale ± ${shortPercent(scaleUncertaintyPercent)})`
  return [
    figure('Worm period', worm?.periodSeconds ?? null, 's'),
    figure(`Worm, peak to peak${scale}`, worm?.peakToPeakArcsec ?? null, '″'),
    figure('Steepest rate', worm?.steepestRateArcsecPerSecond ?? null, '″/s'),
    figure('Drift', perMinute(drift.rateArcsecPerSecond), '″/min', true),
    figure('Left after the fit, RMS', { value: residual.rmsArcsec, stderr: null }, '″'),
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

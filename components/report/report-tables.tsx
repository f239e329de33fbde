import { SmallTable } from '@/components/bench/aside'
import type { AnalysisResult, TableResult } from '@/lib/analysis/types'
import { countWord, harmonicName } from '@/lib/findings/words'
import { ABSENT, formatEstimate, formatNumber, formatPercent, formatProbability } from '@/lib/units'

export function HarmonicsTable({ worm }: { worm: NonNullable<AnalysisResult['worm']> }) {
  return (
    <SmallTable
      caption="Harmonics of the worm; phases at the first used sample"
      head={['harmonic', 'period, s', 'amplitude, ″', 'phase, °']}
      rows={worm.harmonics.map(({ order, periodSeconds, amplitudeArcsec, phaseDegrees, isPhaseMeaningful }) => [
        harmonicName(order),
        formatNumber(periodSeconds, 2),
        formatEstimate(amplitudeArcsec),
        isPhaseMeaningful ? formatEstimate(phaseDegrees) : 'not certain',
      ])}
    />
  )
}

export function LinesTable({ lines }: Pick<AnalysisResult, 'lines'>) {
  if (lines.length === 0) return null
  return (
    <SmallTable
      caption="Lines beside the worm"
      head={['source', 'swings per turn', 'period, s', 'amplitude, ″', 'chance']}
      rows={lines.map(({ source, order, periodSeconds, amplitudeArcsec, falseAlarmProbability, isUnresolved }) => [
        `${source ?? 'unexplained'}${isUnresolved ? ', not told apart' : ''}`,
        order ? formatEstimate(order) : ABSENT,
        formatEstimate(periodSeconds),
        formatEstimate(amplitudeArcsec),
        formatProbability(falseAlarmProbability),
      ])}
    />
  )
}

export function PredictionsTable({ turn }: { turn: NonNullable<AnalysisResult['turn']> }) {
  if (turn.predictions.length === 0) return null
  return (
    <SmallTable
      caption={`Each turn foretold by the other ${countWord(turn.predictions.length - 1)}`}
      head={['turn', 'RMS, ″', 'left, ″', 'less']}
      rows={turn.predictions.map(({ turnNumber, rmsBeforeArcsec, rmsLeftArcsec }) => [
        turnNumber,
        formatNumber(rmsBeforeArcsec, 2),
        formatNumber(rmsLeftArcsec, 2),
        formatPercent(rmsBeforeArcsec > 0 ? 1 - rmsLeftArcsec / rmsBeforeArcsec : null),
      ])}
    />
  )
}

export function RehearsalTable({ table }: { table: TableResult }) {
  return (
    <SmallTable
      caption="A table played as written, on this run"
      head={['harmonic', 'before, ″', 'after, ″']}
      rows={table.rehearsal.orders.map(({ order, beforeArcsec, afterArcsec, isIncluded }) => [
        isIncluded ? harmonicName(order) : `${harmonicName(order)}, left in`,
        formatNumber(beforeArcsec, 2),
        formatNumber(afterArcsec, 3),
      ])}
    />
  )
}

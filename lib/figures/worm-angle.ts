import type { AnalysisResult, TableResult } from '@/lib/analysis/types'
import { wrapDegrees } from '@/lib/units'

export interface AngleFrame {
  table: Pick<TableResult, 'originTimeSeconds' | 'wormPeriodSeconds' | 'settings'>
  run: Pick<AnalysisResult['run'], 'firstUsedTimeSeconds'>
}

/**
 * The angle a table lists for a worm angle counted from the first used sample: offset ± (θ − θ_0), with θ_0 = 360°·(t_0 −
 * t_first)/P for the table's zero at t_0; minus where the listed angle falls with time. In [0°, 360°).
 */
export function tableAngleDegrees(runAngleDegrees: number, frame: AngleFrame): number {
  const { settings } = frame.table
  const direction = settings.angleDirection === 'increasing' ? 1 : -1
  return wrapDegrees(settings.offsetDegrees + direction * (runAngleDegrees - zeroDegrees(frame)))
}

/** The other way: worm angle counted from the first used sample for an angle that a table lists. In [0°, 360°). */
export function runAngleDegrees(listedDegrees: number, frame: AngleFrame): number {
  const { settings } = frame.table
  const direction = settings.angleDirection === 'increasing' ? 1 : -1
  return wrapDegrees(zeroDegrees(frame) + direction * (listedDegrees - settings.offsetDegrees))
}

function zeroDegrees({ table, run }: AngleFrame): number {
  return (360 * (table.originTimeSeconds - run.firstUsedTimeSeconds)) / table.wormPeriodSeconds
}

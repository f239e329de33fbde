import type { CleanedTrack } from './clean'
import type { ConvertedRun } from './convert'
import {
  includedHarmonics,
  makeCorrectionTable,
  originFromWormAngle,
  playedTable,
  tableNodes,
  tableOrigin,
} from './correction-table'
import { leaveOneTurnOut } from './fold'
import type { FoldInput } from './fold'
import { slipCurve } from './rehearsal'
import { playAt } from './table-playback'
import type {
  AnalysisResult,
  AnalysisViews,
  AnalysisWarning,
  Reason,
  Recipe,
  RunColumns,
  TableResult,
  TableSettings,
} from './types'
import { warning } from './warnings'

export interface TableOutcome {
  table: TableResult | null
  reason: Reason | null
  slip: AnalysisViews['slip']
  warnings: AnalysisWarning[]
  /** The table as played at worm angles counted from the first used sample; null without a table. */
  playedArcsec(angleDegrees: Float64Array): Float64Array | null
}

/** Slips that the chart shows, in degrees. */
const SLIP_DEGREES = Float64Array.from({ length: 61 }, (_, i) => 3 * i - 90)

/** The correction table of a result with its rehearsal on turns left out, and what its pictures need. */
export function makeTable(input: {
  columns: RunColumns
  recipe: Recipe
  prepared: { converted: ConvertedRun; cleaned: CleanedTrack }
  result: AnalysisResult
  folded: { foldInput: FoldInput | null; usefulOrders: readonly number[] }
}): TableOutcome {
  const { columns, recipe, prepared, result, folded } = input
  const none = (reason: Reason): TableOutcome => ({
    table: null,
    reason,
    slip: null,
    warnings: [],
    playedArcsec: () => null,
  })
  const { worm } = result
  if (worm === null || folded.foldInput === null) return none(result.wormReason ?? 'no-period')
  const settings = recipe.table
  const { firstUsedTimeSeconds } = result.run
  const periodSeconds = worm.periodSeconds.value
  const defaultOrders = worm.harmonics
    .filter(({ order, isPhaseMeaningful }) => isPhaseMeaningful && folded.usefulOrders.includes(order))
    .map(({ order }) => order)
  const recordedZero = wormAngleOrigin(columns, prepared, periodSeconds)
  const tableInput = {
    harmonics: worm.harmonics,
    periodSeconds,
    firstUsedTimeSeconds,
    settings,
    defaultOrders,
    wormAngleOriginSeconds: recordedZero?.originSeconds ?? null,
  }
  const origin = tableOrigin(tableInput)
  if (!origin.ok) return none(origin.reason)
  const { included, all } = includedHarmonics(tableInput, origin.seconds)
  if (included.length === 0) return none('singular')
  const orders = included.map(({ order }) => order)
  const leftOut = leaveOneTurnOut(
    { ...folded.foldInput, originSeconds: origin.seconds },
    worm.harmonics.map(({ order }) => order),
    (harmonics) => {
      const chosen = harmonics.filter(({ order }) => orders.includes(order))
      const table = playedTable(tableNodes(chosen, settings), settings)
      return (angle) => -playAt(table, angle / (2 * Math.PI))
    },
  )
  const table = makeCorrectionTable({ ...tableInput, heldOutReduction: leftOut.ok ? leftOut.heldOutReduction : null })
  if ('ok' in table) return none(table.reason)
  const played = playedTable(tableNodes(included, settings), settings)
  const originTurns = (origin.seconds - firstUsedTimeSeconds) / periodSeconds
  return {
    table,
    reason: null,
    warnings: directionWarnings(settings, recordedZero),
    slip: slipCurve(played, all, SLIP_DEGREES),
    playedArcsec: (angleDegrees) => angleDegrees.map((degrees) => playAt(played, degrees / 360 - originTurns)),
  }
}

interface RecordedZero {
  originSeconds: number
  direction: TableSettings['angleDirection']
}

/** A table that counts from the recorded angle must count it in the direction in which it was recorded. */
function directionWarnings(settings: TableSettings, recorded: RecordedZero | null): AnalysisWarning[] {
  if (settings.origin.kind !== 'worm-angle-column' || recorded === null) return []
  if (recorded.direction === settings.angleDirection) return []
  return [warning('angle-direction-differs', { recorded: recorded.direction === 'increasing' ? 'rising' : 'falling' })]
}

function wormAngleOrigin(
  columns: RunColumns,
  { converted, cleaned }: { converted: ConvertedRun; cleaned: CleanedTrack },
  periodSeconds: number,
): RecordedZero | null {
  const { wormAngleDegrees } = columns
  if (wormAngleDegrees === null) return null
  const rows = cleaned.keptIndices
  const origin = originFromWormAngle({
    timeSeconds: Float64Array.from(rows, (row) => converted.track.timeSeconds[row]),
    wormAngleDegrees: Float64Array.from(rows, (row) => wormAngleDegrees[row]),
    periodSeconds,
  })
  return origin.ok ? origin : null
}

import type { AnalysisResult, Reason } from '@/lib/analysis/types'
import { reasonSentence } from '@/lib/findings/reason-sentence'
import { warningSentence } from '@/lib/findings/warning-sentence'
import type { Recording } from './read-recording'

export interface ReportWarning {
  code: string
  message: string
}

export interface ReportInput {
  result: AnalysisResult
  recording: Pick<Recording, 'fileSha256' | 'skipped'>
  assumptions: ReportWarning[]
}

/** The object that the command prints: arc seconds of the axis, seconds, degrees; what cannot be had is null. */
export function analysisReport({ result, recording, assumptions }: ReportInput) {
  const { worm, turn, drift, residual, spans, run } = result
  const leftOut = countLeftOut(recording.skipped, result.leftOut)
  return {
    engine: { version: result.engineVersion },
    file: {
      sha256: recording.fileSha256,
      recordings: 1,
      rows: result.used + leftOut.reduce((sum, { count }) => sum + count, 0),
      used: result.used,
      leftOut,
    },
    run: {
      durationSeconds: run.durationSeconds,
      medianCadenceSeconds: run.medianCadenceSeconds,
      turns: run.turns,
    },
    drift: { degree: drift.degree, coefficients: drift.coefficients },
    worm: worm && {
      periodSeconds: worm.periodSeconds,
      peakToPeakArcsec: worm.peakToPeakArcsec,
      steepestRateArcsecPerSecond: worm.steepestRateArcsecPerSecond,
      harmonics: worm.harmonics.map(({ order, amplitudeArcsec, phaseDegrees, isPhaseMeaningful }) => ({
        order,
        amplitudeArcsec,
        phaseDegrees: isPhaseMeaningful ? phaseDegrees : null,
      })),
    },
    lines: result.lines.map((line) => ({
      periodSeconds: line.periodSeconds,
      order: line.order?.value ?? null,
      amplitudeArcsec: line.amplitudeArcsec,
      phaseDegrees: line.phaseDegrees,
      falseAlarmProbability: line.falseAlarmProbability,
      label: line.source,
    })),
    residual: {
      rmsArcsec: residual.rmsArcsec,
      lagOneCorrelation: residual.lagOneCorrelation,
      seeingFloorArcsec: residual.seeingFloorArcsec,
    },
    spans: {
      rawArcsec: spans.rawArcsec,
      afterDriftArcsec: spans.afterDriftArcsec,
      afterWormArcsec: spans.afterWormArcsec,
      afterLinesArcsec: spans.afterLinesArcsec,
      rawWithoutWormArcsec: spans.rawWithoutWormArcsec,
      driftArcsec: spans.driftArcsec,
    },
    turn: turn && {
      repeatability: turn.repeatability,
      heldOutReduction: turn.heldOutReduction,
      scatter: turn.scatter,
    },
    warnings: [...assumptions, ...absences(result), ...result.warnings.map(said)],
  }
}

/** Rows that reading and cleaning left out, one entry for each reason; comments are no rows. */
function countLeftOut(skipped: Recording['skipped'], leftOut: AnalysisResult['leftOut']) {
  const counts = new Map<string, number>()
  for (const { reason, count } of [...skipped, ...leftOut]) {
    if (reason !== 'comment' && count > 0) counts.set(reason, (counts.get(reason) ?? 0) + count)
  }
  return [...counts].map(([reason, count]) => ({ reason, count }))
}

function said(warning: AnalysisResult['warnings'][number]): ReportWarning {
  return { code: warning.code, message: warningSentence(warning).text }
}

/** One warning for each figure that is null, with the reason word. */
function absences(result: AnalysisResult): ReportWarning[] {
  const absent: ReportWarning[] = []
  const tell = (what: string, reason: Reason) =>
    absent.push({ code: reason, message: `${what} ${reasonSentence({ reason })}` })
  if (result.worm === null) {
    tell('There is no worm figure.', result.wormReason ?? 'no-period')
    const interval = result.wormPeriodIntervalSeconds
    if (interval) {
      const [from, to] = interval.map((seconds) => seconds.toFixed(1))
      absent.push({ code: 'period-interval', message: `The period lies between ${from} and ${to} s.` })
    }
    return absent
  }
  for (const { order, isPhaseMeaningful } of result.worm.harmonics) {
    if (isPhaseMeaningful) continue
    const message = `The phase of order ${order} is not told: its amplitude is below three standard errors.`
    absent.push({ code: 'out-of-range', message })
  }
  if (result.turn === null) tell('Turns are not compared.', 'short-run')
  else if (result.turn.heldOutReduction === null) tell('No turn is foretold by the others.', 'short-run')
  return absent
}

import { finding, joinFindings, worm, type Finding } from './finding'
import { arcsec, capitalised, counted, countWord } from './words'

/*
 * The sentence over each list. Lists carry figures without their standard errors; those stand with the analysis.
 */

interface Dated {
  updatedAt: string
}

const latest = <Row extends Dated>(rows: readonly Row[]): Row =>
  rows.reduce((newest, row) => (row.updatedAt > newest.updatedAt ? row : newest))

export function projectsFinding(projects: readonly (Dated & { name: string })[]): Finding {
  if (projects.length === 0) return finding`No mount is described yet`
  const { name } = latest(projects)
  if (projects.length === 1) return finding`You work on one mount, ${name}`
  return finding`You work on ${countWord(projects.length)} mounts; ${name} changed last`
}

interface ListedRun {
  status: 'uploaded' | 'ready'
  analysisCount: number
  conversion: { senseBasis: 'proven' | 'assumed' } | null
}

export function runsFinding(runs: readonly ListedRun[]): Finding {
  if (runs.length === 0) return finding`No run has been brought in yet`
  const unread = runs.filter(({ status }) => status === 'uploaded').length
  const waiting = runs.filter(({ status, analysisCount }) => status === 'ready' && analysisCount === 0).length
  const assumed = runs.filter(({ conversion }) => conversion?.senseBasis === 'assumed').length
  const parts = [finding`${capitalised(counted(runs.length, 'run'))}`]
  if (unread > 0) parts.push(finding`${countWord(unread)} not read yet`)
  if (waiting > 0) parts.push(finding`${countWord(waiting)} without an analysis`)
  if (assumed > 0) parts.push(finding`${countWord(assumed)} with the sense only assumed`)
  if (parts.length === 1) parts.push(runs.length === 1 ? finding`read and analysed` : finding`all read and analysed`)
  return joinFindings(parts, ', ')
}

interface ListedAnalysis extends Dated {
  runName: string
  createdAt: string
  wormAmplitudeArcsec: number | null
  peakToPeakArcsec: number | null
}

export function analysesFinding(analyses: readonly ListedAnalysis[]): Finding {
  if (analyses.length === 0) return finding`No analysis has been saved yet`
  const count = capitalised(counted(analyses.length, 'analysis', 'analyses'))
  const swings = analyses.flatMap(({ peakToPeakArcsec }) => (peakToPeakArcsec === null ? [] : [peakToPeakArcsec]))
  if (swings.length === 0) return finding`${count}, none with a figure for the worm`
  const [least, most] = [Math.min(...swings), Math.max(...swings)]
  if (arcsec(least) === arcsec(most)) return finding`${count}: the worm swings the axis by ${worm(arcsec(most))}`
  return finding`${count}: the worm’s swing lies between ${worm(arcsec(least))} and ${worm(arcsec(most))}`
}

interface ListedCorrection {
  createdAt: string
  name: string
  senseBasis: 'proven' | 'assumed'
}

export function correctionsFinding(corrections: readonly ListedCorrection[]): Finding {
  if (corrections.length === 0) return finding`No correction table has been made yet`
  const count = capitalised(counted(corrections.length, 'correction table'))
  const assumed = corrections.filter(({ senseBasis }) => senseBasis === 'assumed').length
  if (assumed === 0) return finding`${count}, made from runs whose sense is proven`
  if (assumed === corrections.length) {
    return finding`${count}, made from ${corrections.length === 1 ? 'a run' : 'runs'} whose sense is only assumed`
  }
  return finding`${count}, ${countWord(assumed)} of them from a sense that is only assumed`
}

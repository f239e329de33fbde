import { finding, joinFindings, worm, type Finding } from './finding'
import { arcsec, capitalised, counted, countWord } from './words'

/*
 * The sentence over each list. It speaks of all there is, whatever is filtered; the counts come with the list.
 */

interface ProjectCounts {
  all: number
  overview: { archived: number; lastChangedName: string | null }
}

export function projectsFinding({ all, overview: { archived, lastChangedName } }: ProjectCounts): Finding {
  if (lastChangedName === null) return finding`No mount is described yet`
  if (all === 1) return finding`You work on one mount, ${lastChangedName}${archived === 1 ? ', which is archived' : ''}`
  const put = archived === 0 ? '' : `, ${countWord(archived)} of them archived`
  return finding`You work on ${countWord(all)} mounts${put}; ${lastChangedName} changed last`
}

interface RunCounts {
  all: number
  overview: { unread: number; withoutAnalysis: number; assumedSense: number }
}

export function runsFinding({ all, overview: { unread, withoutAnalysis, assumedSense } }: RunCounts): Finding {
  if (all === 0) return finding`No run has been brought in yet`
  const parts = [finding`${capitalised(counted(all, 'run'))}`]
  if (unread > 0) parts.push(finding`${countWord(unread)} not read yet`)
  if (withoutAnalysis > 0) parts.push(finding`${countWord(withoutAnalysis)} without an analysis`)
  if (assumedSense > 0) parts.push(finding`${countWord(assumedSense)} with the sense only assumed`)
  if (parts.length === 1) parts.push(all === 1 ? finding`read and analysed` : finding`all read and analysed`)
  return joinFindings(parts, ', ')
}

interface AnalysisCounts {
  all: number
  overview: { leastPeakToPeakArcsec: number | null; mostPeakToPeakArcsec: number | null }
}

export function analysesFinding({ all, overview }: AnalysisCounts): Finding {
  if (all === 0) return finding`No analysis has been saved yet`
  const count = capitalised(counted(all, 'analysis', 'analyses'))
  const { leastPeakToPeakArcsec: least, mostPeakToPeakArcsec: most } = overview
  if (least === null || most === null) return finding`${count}, none with a figure for the worm`
  if (arcsec(least) === arcsec(most)) return finding`${count}: the worm swings the axis by ${worm(arcsec(most))}`
  return finding`${count}: the worm’s swing lies between ${worm(arcsec(least))} and ${worm(arcsec(most))}`
}

interface CorrectionCounts {
  all: number
  overview: { assumedSense: number }
}

export function correctionsFinding({ all, overview: { assumedSense } }: CorrectionCounts): Finding {
  if (all === 0) return finding`No correction table has been made yet`
  const count = capitalised(counted(all, 'correction table'))
  if (assumedSense === 0) return finding`${count}, made from runs whose sense is proven`
  if (assumedSense === all)
    return finding`${count}, made from ${all === 1 ? 'a run' : 'runs'} whose sense is only assumed`
  return finding`${count}, ${countWord(assumedSense)} of them from a sense that is only assumed`
}

export function auditFinding({ all }: { all: number }): Finding {
  if (all === 0) return finding`Nothing has been done in this project yet`
  return finding`Who did what: ${counted(all, 'entry', 'entries')} in the log of this project`
}
